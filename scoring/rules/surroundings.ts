import type { NumberSet, RecordSet } from '../observables/observable.ts'
import { findField, findObservable, recordSet } from '../observables/registry.ts'
import { type Token, tokenise } from './segments.ts'
import { isReserved, opensStatement } from './words.ts'

/** What surrounds a place in a text that may be half written. */
export interface Surroundings {
  /** Tokens that end at or before the place, comments left out; the word being typed is not among them. */
  readonly before: readonly Token[]
  /** The place is inside a comment or a label. */
  readonly inText: boolean
  /** Variables of the folds around, with what they run through (undefined when that is not known). */
  readonly variables: ReadonlyMap<string, RecordSet | NumberSet | undefined>
  /** Names given with `let` above. */
  readonly lets: readonly string[]
}

/** The set that names spell, seen from inside folds. */
export function setOf(
  names: readonly string[],
  variables: Surroundings['variables'],
): RecordSet | NumberSet | undefined {
  const [first, ...rest] = names
  if (variables.has(first)) {
    let owner = variables.get(first)
    for (const name of rest) {
      if (owner?.kind !== 'records') return undefined
      const field = findField(owner, name)
      owner = field && field.kind !== 'value' ? recordSet(field.of) : undefined
    }
    return rest.length > 0 ? owner : undefined
  }
  const observable = findObservable(names.join('.'))
  return observable?.kind === 'records' || observable?.kind === 'numbers' ? observable : undefined
}

/** The dotted name whose last word is token `at`, as words. */
export function pathEndingAt(tokens: readonly Token[], at: number): string[] {
  const words = [tokens[at].text]
  for (let i = at; i >= 2 && tokens[i - 1].text === '.' && tokens[i - 2].kind === 'word'; i -= 2)
    words.unshift(tokens[i - 2].text)
  return words
}

/** Reads a text up to `position`, without needing it to be complete. */
export function surroundingsAt(text: string, position: number): Surroundings {
  const all = tokenise(text.slice(0, position))
  const last = all[all.length - 1]
  const openText =
    last?.kind === 'comment' ||
    all.some((token) => token.text === '"' && !text.slice(token.from, position).includes('\n'))
  const unfinished = last?.kind === 'word' && last.to === position
  const before = all.filter((token) => token.kind !== 'comment' && !(unfinished && token === last))
  const lets: string[] = []
  /** One entry per open bracket: the variable it binds, if any. */
  const open: { name: string; set: RecordSet | NumberSet | undefined }[][] = [[]]
  const variables = () => new Map(open.flat().map(({ name, set }) => [name, set]))
  let pendingLet: string | undefined
  before.forEach((token, at) => {
    if (token.text === '(') open.push([])
    else if (token.text === ')' && open.length > 1) open.pop()
    else if (token.kind === 'word' && opensStatement(token.text) && before[at - 1]?.text !== '.') {
      if (pendingLet !== undefined) lets.push(pendingLet)
      pendingLet = token.text === 'let' && before[at + 1]?.kind === 'word' ? before[at + 1].text : undefined
      open.length = 0
      open.push([])
    } else if (token.text === 'in' && before[at - 1]?.kind === 'word') {
      let end = at + 1
      while (before[end + 1]?.text === '.' && before[end + 2]?.kind === 'word') end += 2
      const names =
        before[end]?.kind === 'word' && !isReserved(before[end].text) ? pathEndingAt(before, end) : []
      const set = names.length > 0 ? setOf(names, variables()) : undefined
      open[open.length - 1].push({ name: before[at - 1].text, set })
    }
  })
  return { before, inText: openText, variables: variables(), lets }
}
