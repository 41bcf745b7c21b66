import type { StatementKind } from './ast.ts'
import { opensStatement } from './words.ts'

/** One word, number, string, comment or sign of the text. */
export interface Token {
  readonly kind: 'word' | 'number' | 'string' | 'comment' | 'sign'
  readonly text: string
  readonly from: number
  readonly to: number
}

const TOKEN =
  /#[^\n]*|[a-zA-Z_][a-zA-Z0-9_]*|[0-9]+(?:\.[0-9]+)?(?:[eE][+-]?[0-9]+)?|"(?:[^"\\\n]|\\[^\n])*"|<=|>=|==|!=|[^\s]/gu

/** Splits a text into tokens, by the same lexical rules as the grammar. Anything else is a sign of one character. */
export function tokenise(text: string): Token[] {
  const tokens: Token[] = []
  for (const match of text.matchAll(TOKEN)) {
    const first = match[0]
    const kind =
      first[0] === '#'
        ? 'comment'
        : /^[a-zA-Z_]/.test(first)
          ? 'word'
          : /^[0-9]/.test(first)
            ? 'number'
            : first[0] === '"' && first.length > 1
              ? 'string'
              : 'sign'
    tokens.push({ kind, text: first, from: match.index, to: match.index + first.length })
  }
  return tokens
}

/** The part of a text from one statement's reserved word up to the next one's. */
export interface Segment {
  /** Absent for text before the first statement. */
  readonly keyword?: StatementKind
  readonly from: number
  /** End of the last token that is no comment. */
  readonly to: number
  readonly tokens: readonly Token[]
  /** Comments inside the segment, between its first and last token. */
  readonly inner: readonly Token[]
  /** Comments after the last token. */
  readonly after: readonly Token[]
}

/**
 * Cuts a text into statements. Reserved words open statements wherever they stand (except after a dot, where
 * they can only be a wrong field), so an error in one statement never swallows the next.
 */
export function cutIntoSegments(text: string): Segment[] {
  const groups: { keyword?: StatementKind; tokens: Token[]; comments: Token[] }[] = [
    { tokens: [], comments: [] },
  ]
  let previous: Token | undefined
  for (const token of tokenise(text)) {
    if (token.kind === 'comment') {
      groups[groups.length - 1].comments.push(token)
      continue
    }
    if (token.kind === 'word' && opensStatement(token.text) && previous?.text !== '.')
      groups.push({ keyword: token.text, tokens: [], comments: [] })
    groups[groups.length - 1].tokens.push(token)
    previous = token
  }
  return groups.map(({ keyword, tokens, comments }) => {
    const to = tokens.length > 0 ? tokens[tokens.length - 1].to : 0
    return {
      keyword,
      from: tokens.length > 0 ? tokens[0].from : 0,
      to,
      tokens,
      inner: comments.filter((comment) => comment.from < to),
      after: comments.filter((comment) => comment.from >= to),
    }
  })
}
