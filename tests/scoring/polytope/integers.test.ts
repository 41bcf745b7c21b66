import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  compareLexicographic,
  gcd,
  gcdBig,
  gcdOf,
  roundedQuotient,
} from '../../../scoring/geometry/integers.ts'
import { linearForm } from '../../../scoring/geometry/linearForm.ts'

const integer = fc.integer({ min: -5000, max: 5000 })

describe('integers', () => {
  it('gcd is the greatest common divisor, in doubles and in big integers', () => {
    fc.assert(
      fc.property(integer, integer, (a, b) => {
        const common = gcd(a, b)
        expect(gcdBig(BigInt(a), BigInt(b))).toBe(BigInt(common))
        if (a === 0 && b === 0) return expect(common).toBe(0)
        let expected = 0
        for (let d = 1; d <= 5000; d++) if (a % d === 0 && b % d === 0) expected = d
        expect(common).toBe(expected)
      }),
    )
    expect(gcdOf([12, -18, 0, 30])).toBe(6)
    expect(gcdOf([0, 0])).toBe(0)
  })

  it('roundedQuotient is the nearest integer, halves towards zero', () => {
    fc.assert(
      fc.property(integer, fc.integer({ min: 1, max: 60 }), (a, b) => {
        const quotient = a / b
        const half = Math.abs(quotient % 1) === 0.5
        const expected = half ? Math.trunc(quotient) : Math.round(quotient)
        expect(roundedQuotient(BigInt(a), BigInt(b))).toBe(BigInt(expected))
      }),
    )
  })

  it('compareLexicographic orders vectors', () => {
    expect(compareLexicographic([1, 2, 3], [1, 2, 3])).toBe(0)
    expect(compareLexicographic([1, 2, 3], [1, 3, 0])).toBeLessThan(0)
    expect(compareLexicographic([2, 0, 0], [1, 9, 9])).toBeGreaterThan(0)
  })

  it('linearForm writes a form', () => {
    expect(linearForm([1, -1, 0, 3], 'x')).toBe('x1 - x2 + 3 x4')
    expect(linearForm([-2n, 0n, 1n], 'e')).toBe('-2 e1 + e3')
    expect(linearForm([0, 0], 'x')).toBe('0')
  })
})
