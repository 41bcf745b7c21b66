import type { Span } from './ast.ts'
import { findObservable } from '../observables/registry.ts'
import { findFold } from './folds.ts'
import { findFunction } from './functions/registry.ts'
import { isGroup } from './scope.ts'
import { type Token, tokenise } from './segments.ts'
import { isReserved, opensStatement } from './words.ts'

/** A name that a rule gives itself, with every place where it stands. */
export interface RenamableName {
  readonly name: string
  /** Given with `let`, or the variable of a fold. */
  readonly kind: 'let' | 'variable'
  /** In the order of the text, the definition among them. */
  readonly spans: readonly Span[]
}

/** The name at `position`, or null where none of the rule's own stands. Works on texts that are half written. */
export function nameAt(text: string, position: number): RenamableName | null {
  const tokens = tokenise(text).filter(({ kind }) => kind !== 'comment')
  const at = tokens.findIndex(({ kind, from, to }) => kind === 'word' && from <= position && position <= to)
  if (at < 0 || isReserved(tokens[at].text) || tokens[at - 1]?.text === '.') return null
  const name = tokens[at].text
  const uses = tokens.flatMap((_, i) => (isUse(tokens, i, name) ? [i] : []))
  if (!uses.includes(at)) return null
  const fold = foldAround(tokens, at, name)
  if (fold) {
    const inside = uses.filter((i) => fold.from < i && i < fold.to)
    return { name, kind: 'variable', spans: inside.map((i) => spanOf(tokens[i])) }
  }
  const given = uses.some((i) => tokens[i - 1]?.text === 'let')
  return given ? { name, kind: 'let', spans: uses.map((i) => spanOf(tokens[i])) } : null
}

/** Why `next` cannot take the place of `name`, in words; null when it can. */
export function nameProblem(text: string, name: string, next: string): string | null {
  if (!/^[a-zA-Z_][a-zA-Z0-9_]*$/.test(next))
    return 'A name has letters, digits and underscores, and does not start with a digit.'
  if (next === name) return null
  if (isReserved(next)) return `“${next}” is a word of the language.`
  if (findFunction(next) || findFold(next)) return `“${next}” is a function.`
  if (findObservable(next)) return `“${next}” is an observable.`
  if (isGroup(next)) return `“${next}” is the name of a group of observables.`
  const tokens = tokenise(text)
  const taken = tokens.some(
    (token, at) =>
      token.text === next &&
      token.kind === 'word' &&
      (tokens[at - 1]?.text === 'let' || tokens[at + 1]?.text === 'in'),
  )
  return taken ? `The rule has a name “${next}” already.` : null
}

const spanOf = ({ from, to }: Token): Span => ({ from, to })

/** A word that is the name: neither a field, nor the name of a report's column. */
function isUse(tokens: readonly Token[], at: number, name: string): boolean {
  const { kind, text } = tokens[at]
  if (kind !== 'word' || text !== name || tokens[at - 1]?.text === '.') return false
  return tokens[at + 1]?.text !== '=' || tokens[at - 1]?.text === 'let'
}

/** The brackets of the fold that binds the name at a token, as places of tokens; null when none does. */
function foldAround(
  tokens: readonly Token[],
  at: number,
  name: string,
): { readonly from: number; readonly to: number } | null {
  let depth = 0
  for (let i = at; i >= 0; i--) {
    const { text, kind } = tokens[i]
    if (kind === 'word' && opensStatement(text) && tokens[i - 1]?.text !== '.') return null
    if (text === ')' && i < at) depth += 1
    else if (text === '(' && depth > 0) depth -= 1
    else if (text === '(') {
      const to = closing(tokens, i)
      if (binds(tokens, i, to, name)) return { from: i, to }
    }
  }
  return null
}

/** Does the bracket itself, and none inside it, hold `name in`? */
function binds(tokens: readonly Token[], from: number, to: number, name: string): boolean {
  let depth = 0
  for (let i = from + 1; i < to; i++) {
    if (tokens[i].text === '(') depth += 1
    else if (tokens[i].text === ')') depth -= 1
    else if (depth === 0 && tokens[i].text === name && tokens[i + 1]?.text === 'in') return true
  }
  return false
}

/** The bracket that closes the one at `from`, or the end of its statement. */
function closing(tokens: readonly Token[], from: number): number {
  let depth = 0
  for (let i = from; i < tokens.length; i++) {
    const { text, kind } = tokens[i]
    if (text === '(') depth += 1
    else if (text === ')' && --depth === 0) return i
    else if (kind === 'word' && opensStatement(text) && tokens[i - 1].text !== '.') return i
  }
  return tokens.length
}
