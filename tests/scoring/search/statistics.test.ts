import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bestRange, expectedBest, quantileOf, rateOf } from '../../../scoring/search/statistics.ts'

describe('rate with interval', () => {
  it('agrees with a worked example of the score interval', () => {
    // Newcombe 1998, Statistics in Medicine 17, 857: 81 of 263 (method 3): 0.2553 to 0.3662.
    const rate = rateOf(81, 263)
    expect(rate?.rate).toBeCloseTo(0.308, 3)
    expect(rate?.low).toBeCloseTo(0.2553, 4)
    expect(rate?.high).toBeCloseTo(0.3662, 4)
  })

  it('uses the rule of three without hits and has no rate without a sample', () => {
    expect(rateOf(0, 2000)).toEqual({ hits: 0, size: 2000, rate: 0, low: 0, high: 0.0015 })
    expect(rateOf(0, 2)?.high).toBe(1)
    expect(rateOf(0, 0)).toBeNull()
  })
})

describe('expected best of n', () => {
  it('equals the mean over all subsets', () => {
    const scores = fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 1, maxLength: 7 })
    fc.assert(
      fc.property(
        scores,
        fc.integer({ min: 0, max: 3 }),
        fc.integer({ min: 1, max: 10 }),
        (values, missing, n) => {
          const sorted = [...values].sort((a, b) => a - b)
          const all: (number | null)[] = [...new Array<null>(missing).fill(null), ...sorted]
          const size = all.length
          let [draws, covered, sum] = [0, 0, 0]
          for (let subset = 0; subset < 1 << size; subset++) {
            const chosen = all.filter((_, i) => (subset >> i) & 1)
            if (chosen.length !== n) continue
            draws++
            const scored = chosen.filter((value) => value !== null)
            if (scored.length === 0) continue
            covered++
            sum += Math.max(...scored)
          }
          const expected = expectedBest(sorted, size, n)
          if (draws === 0 || covered / draws < 0.5) expect(expected).toBeNull()
          else expect(expected).toBeCloseTo(sum / covered, 9)
        },
      ),
    )
  })
})

describe('range of the best of n', () => {
  const scores = Array.from({ length: 2000 }, (_, i) => i + 1)

  it('holds nine in ten of the best of n independent draws', () => {
    // For a uniform distribution the best of n has the distribution function x^n.
    for (const n of [1, 5, 40]) {
      const [low, high] = bestRange(scores, 2000, n) ?? [Number.NaN, null]
      expect((low / 2000) ** n).toBeCloseTo(0.05, 1)
      expect(((high ?? Number.NaN) / 2000) ** n).toBeCloseTo(0.95, 1)
    }
  })

  it('leaves the upper end open where the sample is too small to know it', () => {
    // 2000 (1 - 0.95^(1/n)) falls below 1 between n = 102 and 103.
    expect(bestRange(scores, 2000, 102)?.[1]).toBe(1999)
    expect(bestRange(scores, 2000, 103)?.[1]).toBeNull()
    expect(bestRange(scores, 2000, 2000)?.[0]).toBe(1998)
  })

  it('ranks candidates without a score below all others', () => {
    expect(bestRange([7, 8], 100, 1)).toBeNull()
    expect(bestRange([7, 8], 100, 2)).toBeNull()
    expect(bestRange([6, 7, 8], 100, 100)).toEqual([6, null])
    expect(bestRange([], 100, 5)).toBeNull()
  })
})

describe('quantile', () => {
  it('ranks candidates without a score below all others', () => {
    expect(quantileOf([1, 2, 3, 4], 4, 0.5)).toBe(2.5)
    expect(quantileOf([5, 7], 101, 1)).toBe(7)
    expect(quantileOf([5, 7], 101, 0.985)).toBeNull()
    expect(quantileOf([5, 7], 101, 0.995)).toBeCloseTo(6, 9)
    expect(quantileOf([1], 100, 0.5)).toBeNull()
    expect(quantileOf([], 100, 0.5)).toBeNull()
  })
})
