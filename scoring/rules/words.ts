import type { StatementKind } from './ast.ts'

/** A reserved word with what it does; the first group opens statements. */
export interface Keyword {
  readonly word: string
  readonly form: string
  readonly description: string
}

export const STATEMENT_KEYWORDS: readonly (Keyword & { readonly word: StatementKind })[] = [
  {
    word: 'at',
    form: 'at volume 1000',
    description:
      'Where on the ray through the reference point all quantities are taken: `at scale s`, `at volume v` or `at smallest divisor t`. Without it, scale 1.',
  },
  {
    word: 'require',
    form: 'require condition label "name"',
    description: 'A condition every candidate must meet. The label is optional and names it in tables.',
  },
  {
    word: 'let',
    form: 'let name = expression',
    description: 'A name for an expression, used below its definition. It is computed once per candidate.',
  },
  {
    word: 'score',
    form: 'score expression',
    description: 'What the search makes as large as it can. Exactly one.',
  },
  {
    word: 'report',
    form: 'report name = expression, expression',
    description: 'Extra columns for the shortlist. They do not influence the search.',
  },
  {
    word: 'hit',
    form: 'hit condition',
    description:
      'What counts as found; its rate is compared with the null sample. Without it: a score above the 99 % quantile of the null.',
  },
]

export const EXPRESSION_KEYWORDS: readonly Keyword[] = [
  {
    word: 'and',
    form: 'a and b',
    description: 'True when both are. False as soon as one is false, even if the other is undefined.',
  },
  {
    word: 'or',
    form: 'a or b',
    description: 'True when one is. True as soon as one is true, even if the other is undefined.',
  },
  { word: 'not', form: 'not a', description: 'True when a is false. Binds more loosely than comparisons.' },
  { word: 'true', form: 'true', description: 'The true truth value.' },
  { word: 'false', form: 'false', description: 'The false truth value.' },
  { word: 'in', form: 'x in set', description: 'Joins a variable to the set it runs through.' },
  {
    word: 'where',
    form: 'x in set where condition',
    description: 'Keeps only the elements that meet a condition.',
  },
  {
    word: 'else',
    form: 'a else b',
    description: 'a where it is defined, b where it is not. Binds most loosely of all.',
  },
  { word: 'label', form: 'label "name"', description: 'Names a condition.' },
]

/** Operators, for the reference. Precedence falls from top to bottom. */
export const OPERATORS: readonly Keyword[] = [
  {
    word: '^',
    form: 'a ^ b',
    description:
      'Power; groups to the right. Exact for an integer and a literal exponent that is an integer, zero or more.',
  },
  { word: '-', form: '-a, a - b', description: 'Negative, difference. -x^2 is -(x^2). Exact for integers.' },
  { word: '*', form: 'a * b', description: 'Product. Exact for integers.' },
  { word: '/', form: 'a / b', description: 'Quotient, always a number. Undefined when b is zero.' },
  { word: '+', form: 'a + b', description: 'Sum. Exact for integers.' },
  { word: '<', form: 'a < b', description: 'Less than. Comparisons may be chained: 1 < a < b <= 3.' },
  { word: '<=', form: 'a <= b', description: 'At most.' },
  { word: '>', form: 'a > b', description: 'More than.' },
  { word: '>=', form: 'a >= b', description: 'At least.' },
  {
    word: '==',
    form: 'a == b',
    description:
      'Equal: integers, truth values, or elements of the same set. For numbers write abs(a - b) <= e.',
  },
  {
    word: '!=',
    form: 'a != b',
    description: 'Not equal: integers, truth values, or elements of the same set.',
  },
]

const reserved = new Set(
  [...STATEMENT_KEYWORDS, ...EXPRESSION_KEYWORDS].map((keyword) => keyword.word as string),
)
const openers = new Set(STATEMENT_KEYWORDS.map((keyword) => keyword.word as string))

/** True for words that cannot be names. */
export const isReserved = (word: string): boolean => reserved.has(word)

/** True for words that open a statement. */
export const opensStatement = (word: string): word is StatementKind => openers.has(word)
