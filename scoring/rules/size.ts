import type { IssueDraft } from './issues.ts'
import { RULE_LIMITS } from './limits.ts'
import type { Segment } from './segments.ts'

const OPERATORS = new Set([
  '+',
  '-',
  '*',
  '/',
  '^',
  '<',
  '<=',
  '>',
  '>=',
  '==',
  '!=',
  'and',
  'or',
  'not',
  'else',
])

/**
 * Is a statement too large to be parsed? Looked at before parsing, because the parser itself gives up on very
 * long chains of operators and very deep brackets, and would call that a syntax error.
 */
export function statementTooLarge({ tokens }: Segment): IssueDraft | undefined {
  let operators = 0
  let depth = 0
  for (const { kind, text, from, to } of tokens) {
    if (kind === 'sign' || kind === 'word') {
      if (text === '(') depth++
      else if (text === ')') depth--
      else if (OPERATORS.has(text)) operators++
    }
    if (depth > RULE_LIMITS.nesting)
      return {
        code: 'too-deep',
        message: `more than ${RULE_LIMITS.nesting} brackets stand inside each other, the limit for one rule; \`let\` can name an inner part`,
        from,
        to,
      }
    if (operators > RULE_LIMITS.operators)
      return {
        code: 'too-many-operators',
        message: `this statement has more than ${RULE_LIMITS.operators} operators, the limit for one statement; \`let\` can name parts of it`,
        from,
        to,
      }
  }
  return undefined
}
