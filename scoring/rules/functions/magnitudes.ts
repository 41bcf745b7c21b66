import type { RuleFunction } from './ruleFunction.ts'

const x = [{ name: 'x', type: 'number' }] as const
const several = [
  { name: 'a', type: 'number' },
  { name: 'b', type: 'number' },
] as const

/** Size, sign and comparison of single values. */
export const magnitudes: readonly RuleFunction[] = [
  {
    name: 'abs',
    parameters: x,
    result: 'common',
    description: 'Absolute value.',
    formula: '|x|',
    apply: Math.abs,
  },
  {
    name: 'sign',
    parameters: x,
    result: 'integer',
    description: 'Sign: -1, 0 or 1.',
    formula: '\\mathrm{sgn}\\,x',
    apply: Math.sign,
  },
  {
    name: 'min',
    parameters: several,
    variadic: true,
    result: 'common',
    description: 'The smallest of two or more values.',
    formula: '\\min(a, b, \\dots)',
    apply: Math.min,
  },
  {
    name: 'max',
    parameters: several,
    variadic: true,
    result: 'common',
    description: 'The largest of two or more values.',
    formula: '\\max(a, b, \\dots)',
    apply: Math.max,
  },
  {
    name: 'indicator',
    parameters: [{ name: 'condition', type: 'truth' }],
    result: 'integer',
    description: '1 where a condition is true, 0 where it is false.',
    formula: '\\mathbf 1[\\,\\cdot\\,]',
    apply: (condition) => condition,
  },
]
