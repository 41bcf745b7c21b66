import fc from 'fast-check'
import type {
  Expression,
  PathExpression,
  ReportColumn,
  RuleTree,
  Statement,
} from '../../../scoring/rules/ast.ts'
import { isReserved } from '../../../scoring/rules/words.ts'

const span = { from: 0, to: 0 }
const name = (text: string) => ({ text, ...span })

const word = fc
  .oneof(
    fc.constantFrom('x', 'reach', 'k3', 'log10', 'divisors', 'metric', '_', 'e5'),
    fc.stringMatching(/^[a-zA-Z_][a-zA-Z0-9_]{0,6}$/),
  )
  .filter((text) => !isReserved(text))

const path: fc.Arbitrary<PathExpression> = fc
  .array(word, { minLength: 1, maxLength: 3 })
  .map((words) => ({ kind: 'path', names: words.map(name), ...span }))

const numbers: fc.Arbitrary<Expression> = fc.oneof(
  fc.maxSafeNat().map((value): Expression => ({ kind: 'number', value, integer: true, ...span })),
  fc
    .double({ min: 0, noNaN: true, noDefaultInfinity: true })
    .map((value): Expression => ({ kind: 'number', value: Math.abs(value), integer: false, ...span })),
)

/** Any tree the grammar can write, sensible or not: chains of comparisons never start with a bare comparison. */
export const expressions = fc.letrec<{ expression: Expression }>((tie) => {
  const inner = tie('expression')
  const binary = (make: (left: Expression, right: Expression) => Expression) =>
    fc.tuple(inner, inner).map(([l, r]) => make(l, r))
  return {
    expression: fc.oneof(
      { maxDepth: 5, withCrossShrink: true },
      numbers,
      path,
      fc.boolean().map((value): Expression => ({ kind: 'truth', value, ...span })),
      inner.map((operand): Expression => ({ kind: 'negation', operand, ...span })),
      inner.map((operand): Expression => ({ kind: 'not', operand, ...span })),
      fc
        .constantFrom('+', '-', '*', '/', '^')
        .chain((operator) =>
          binary((left, right) => ({ kind: 'arithmetic', operator: operator as '+', left, right, ...span })),
        ),
      fc
        .constantFrom('and', 'or')
        .chain((operator) =>
          binary((left, right) => ({ kind: 'logic', operator: operator as 'and', left, right, ...span })),
        ),
      binary((value, otherwise) => ({ kind: 'fallback', value, otherwise, ...span })),
      fc
        .array(fc.tuple(fc.constantFrom('<', '<=', '>', '>=', '==', '!='), inner), {
          minLength: 1,
          maxLength: 3,
        })
        .chain((links) =>
          inner.map((first): Expression => ({
            kind: 'comparison',
            operands: [first, ...links.map(([, operand]) => operand)],
            operators: links.map(([operator]) => operator as '<'),
            ...span,
          })),
        ),
      fc
        .tuple(
          word,
          fc.array(inner, { maxLength: 2 }),
          fc.option(fc.tuple(word, path, fc.option(inner, { nil: undefined }), inner), { nil: undefined }),
        )
        .map(([called, operands, bound]): Expression => {
          if (!bound) return { kind: 'call', name: name(called), operands, ...span }
          const [variable, set, condition, body] = bound
          const binder = { variable: name(variable), set, ...(condition ? { condition } : {}), body, ...span }
          return { kind: 'call', name: name(called), operands, binder, ...span }
        }),
    ),
  }
}).expression

const labels = fc.string({ unit: 'grapheme', maxLength: 12 }).filter((text) => !/[\n\r]/.test(text))
const comments = fc
  .string({ unit: 'grapheme-ascii', maxLength: 12 })
  .map((text) => text.trim())
  .filter((text) => !text.startsWith('#'))

const column: fc.Arbitrary<ReportColumn> = fc
  .tuple(fc.option(word, { nil: undefined }), expressions)
  .map(([given, value]) => ({ ...(given === undefined ? {} : { name: name(given) }), value, ...span }))

type Bare = { readonly kind: Statement['kind'] } & Record<string, unknown>

const bare: fc.Arbitrary<Bare> = fc.oneof(
  fc
    .tuple(fc.array(word, { maxLength: 2 }), fc.double({ noNaN: true, noDefaultInfinity: true }))
    .map(([words, value]) => ({
      kind: 'at' as const,
      words: words.map(name),
      value: value + 0,
      valueSpan: span,
    })),
  fc.tuple(expressions, fc.option(labels, { nil: undefined })).map(([condition, label]) => ({
    kind: 'require' as const,
    condition,
    ...(label === undefined ? {} : { label: { text: label, ...span } }),
  })),
  fc.tuple(word, expressions).map(([given, value]) => ({ kind: 'let' as const, name: name(given), value })),
  expressions.map((value) => ({ kind: 'score' as const, value })),
  fc.array(column, { minLength: 1, maxLength: 3 }).map((columns) => ({ kind: 'report' as const, columns })),
  expressions.map((condition) => ({ kind: 'hit' as const, condition })),
)

/** Whole rules with comments and blank lines. */
export const ruleTrees: fc.Arbitrary<RuleTree> = fc
  .tuple(
    fc.array(
      fc.tuple(
        bare,
        fc.array(comments, { maxLength: 2 }),
        fc.option(comments, { nil: undefined }),
        fc.boolean(),
      ),
      { minLength: 1, maxLength: 5 },
    ),
    fc.array(comments, { maxLength: 2 }),
  )
  .map(([statements, closing]) => ({
    closing,
    statements: statements.map(
      ([statement, before, trailing, blankBefore], at) =>
        ({
          ...statement,
          ...span,
          layout: {
            comments: before,
            ...(trailing === undefined ? {} : { trailing }),
            blankBefore: blankBefore && at > 0,
          },
        }) as unknown as Statement,
    ),
  }))
