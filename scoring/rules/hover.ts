import type { OwnName } from './ownNames.ts'
import { referenceEntries, type ReferenceEntry } from './reference.ts'
import { pathEndingAt, setOf, surroundingsAt } from './surroundings.ts'
import { tokenise } from './segments.ts'

/** What the editor shows over a word: its reference entry, or a line about a local name. */
export interface HoverResult {
  readonly from: number
  readonly to: number
  readonly title: string
  readonly text: string
  readonly entry?: ReferenceEntry
  /** Of a name given with `let`, where it is known. */
  readonly own?: OwnName
}

const ENTRIES = referenceEntries()

/** What stands at `position`, or null. Works on texts that are half written; `names` as for completions. */
export function hoverAt(text: string, position: number, names: readonly OwnName[] = []): HoverResult | null {
  const tokens = tokenise(text).filter((token) => token.kind !== 'comment')
  const at = tokens.findIndex((token) => token.from <= position && position < token.to)
  if (at < 0) return null
  const token = tokens[at]
  const about = (entry: ReferenceEntry | undefined, from: number, to: number): HoverResult | null =>
    entry ? { from, to, title: entry.form, text: entry.description, entry } : null
  if (token.kind === 'sign')
    return about(
      ENTRIES.find((entry) => entry.id === token.text),
      token.from,
      token.to,
    )
  if (token.kind !== 'word') return null

  const around = surroundingsAt(text, token.from)
  const words = pathEndingAt(tokens, at)
  const [first] = words
  const binds = tokens[at + 1]?.text === 'in'
  if (around.variables.has(first) || (binds && words.length === 1)) {
    if (words.length === 1) {
      const set =
        around.variables.get(first) ?? (binds ? setAfter(tokens, at + 1, around.variables) : undefined)
      const title = set ? `${first} in ${set.name}` : first
      return { from: token.from, to: token.to, title, text: set?.description ?? 'The variable of a fold.' }
    }
    const owner =
      words.length === 2 ? around.variables.get(first) : setOf(words.slice(0, -1), around.variables)
    const field = words[words.length - 1]
    return about(
      ENTRIES.find((entry) => entry.kind === 'field' && entry.of === owner?.name && entry.name === field),
      token.from,
      token.to,
    )
  }
  if (tokens[at + 1]?.text === '(' && words.length === 1) {
    const folds = /^\s*\(\s*(?:[^(),:]*,\s*)?[a-zA-Z_][a-zA-Z0-9_]*\s+in\b/.test(text.slice(token.to))
    const kinds = folds ? ['fold'] : ['function', 'relation', 'fold']
    for (const kind of kinds) {
      const entry = ENTRIES.find((candidate) => candidate.kind === kind && candidate.name === first)
      if (entry) return about(entry, token.from, token.to)
    }
  }
  const defined = tokens[at - 1]?.text === 'let'
  if ((around.lets.includes(first) || defined) && words.length === 1) {
    const own = names.find(({ name }) => name === first)
    const { from, to } = token
    return { from, to, title: first, text: definitionOf(text, first), ...(own ? { own } : {}) }
  }

  let end = at
  while (tokens[end + 1]?.text === '.' && tokens[end + 2]?.kind === 'word') end += 2
  const whole = pathEndingAt(tokens, end)
  const start = tokens[end - 2 * (whole.length - 1)].from
  const named = ENTRIES.find((entry) => entry.id === whole.join('.') && entry.kind !== 'field')
  return named ? about(named, start, tokens[end].to) : null
}

function setAfter(
  tokens: ReturnType<typeof tokenise>,
  inAt: number,
  variables: Parameters<typeof setOf>[1],
): ReturnType<typeof setOf> {
  let end = inAt + 1
  while (tokens[end + 1]?.text === '.' && tokens[end + 2]?.kind === 'word') end += 2
  return tokens[end]?.kind === 'word' ? setOf(pathEndingAt(tokens, end), variables) : undefined
}

/** The line that defines a name. */
function definitionOf(text: string, name: string): string {
  const line = text.split('\n').find((candidate) => new RegExp(`^\\s*let\\s+${name}\\b`).test(candidate))
  return line?.replace(/#.*$/, '').trim() ?? 'A name given with `let`.'
}
