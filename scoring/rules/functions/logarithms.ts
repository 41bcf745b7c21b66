import type { RuleFunction } from './ruleFunction.ts'

const x = [{ name: 'x', type: 'number' }] as const
const ofPositive = (f: (x: number) => number) => (value: number) => (value > 0 ? f(value) : NaN)

/** Logarithms, exponential, root. */
export const logarithms: readonly RuleFunction[] = [
  {
    name: 'log10',
    parameters: x,
    result: 'number',
    description: 'Logarithm to base 10.',
    formula: '\\log_{10} x',
    undefinedWhen: 'needs a positive number',
    apply: ofPositive(Math.log10),
  },
  {
    name: 'log',
    parameters: x,
    result: 'number',
    description: 'Natural logarithm.',
    formula: '\\ln x',
    undefinedWhen: 'needs a positive number',
    apply: ofPositive(Math.log),
  },
  {
    name: 'exp',
    parameters: x,
    result: 'number',
    description: 'Exponential.',
    formula: 'e^x',
    undefinedWhen: 'goes beyond the largest number',
    apply: Math.exp,
  },
  {
    name: 'sqrt',
    parameters: x,
    result: 'number',
    description: 'Square root.',
    formula: '\\sqrt{x}',
    undefinedWhen: 'needs a number that is not negative',
    apply: Math.sqrt,
  },
]
