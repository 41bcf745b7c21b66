import { gcd } from '../../geometry/integers.ts'
import type { RuleFunction } from './ruleFunction.ts'

const x = [{ name: 'x', type: 'number' }] as const
const two = [
  { name: 'a', type: 'integer' },
  { name: 'b', type: 'integer' },
] as const

const exact = (round: (x: number) => number) => (value: number) => {
  const result = round(value)
  return Math.abs(result) <= Number.MAX_SAFE_INTEGER ? result : NaN
}

/** From numbers to integers, and divisibility. */
export const wholeNumbers: readonly RuleFunction[] = [
  {
    name: 'floor',
    parameters: x,
    result: 'integer',
    description: 'The largest integer that is at most x.',
    formula: '\\lfloor x \\rfloor',
    undefinedWhen: 'goes beyond the exact integers (2^53)',
    apply: exact(Math.floor),
  },
  {
    name: 'ceil',
    parameters: x,
    result: 'integer',
    description: 'The smallest integer that is at least x.',
    formula: '\\lceil x \\rceil',
    undefinedWhen: 'goes beyond the exact integers (2^53)',
    apply: exact(Math.ceil),
  },
  {
    name: 'round',
    parameters: x,
    result: 'integer',
    description: 'The nearest integer; halves go away from zero.',
    formula: '\\mathrm{sgn}(x)\\lfloor |x| + \\tfrac12 \\rfloor',
    undefinedWhen: 'goes beyond the exact integers (2^53)',
    apply: exact((value) => Math.sign(value) * Math.round(Math.abs(value))),
  },
  {
    name: 'mod',
    parameters: two,
    result: 'integer',
    description: 'Remainder of a divided by b, between 0 and |b| - 1.',
    formula: 'a \\bmod b',
    undefinedWhen: 'needs a divisor that is not zero',
    apply: (a, b) => {
      const remainder = a % b
      return remainder < 0 ? remainder + Math.abs(b) : remainder
    },
  },
  {
    name: 'gcd',
    parameters: two,
    result: 'integer',
    description: 'Greatest common divisor; gcd(0, b) is |b|.',
    formula: '\\gcd(a, b)',
    apply: gcd,
  },
]
