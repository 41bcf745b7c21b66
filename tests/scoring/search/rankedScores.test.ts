import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { rankedScores, rarenessOf } from '../../../scoring/search/rankedScores.ts'
import { rateOf } from '../../../scoring/search/statistics.ts'

const sorted = (values: readonly number[]): number[] => [...values].sort((a, b) => a - b)
const score = fc.oneof(fc.integer({ min: 0, max: 6 }), fc.double({ min: -9, max: 9, noNaN: true }))

describe('how rare a score is', () => {
  it('bounds the number of candidates at least as good, closely', () => {
    fc.assert(
      fc.property(
        fc.array(score, { maxLength: 400 }),
        fc.array(score, { maxLength: 20 }),
        (values, asked) => {
          const ranked = rankedScores(sorted(values))
          for (const line of [...asked, ...values.slice(0, 20)]) {
            const rare = rarenessOf(line, ranked, 500)
            const count = values.filter((value) => value >= line).length
            if (rare === null) throw new Error('a sample of 500 has a rate')
            expect(rare.least).toBeLessThanOrEqual(count)
            expect(rare.most).toBeGreaterThanOrEqual(count)
            expect(rare.most - rare.least).toBeLessThanOrEqual(Math.max(0, Math.sqrt(rare.least) / 2))
            expect(rare.low).toBeLessThanOrEqual(count / 500)
            expect(rare.high).toBeGreaterThanOrEqual(rateOf(count, 500)?.high ?? 1)
          }
        },
      ),
      { numRuns: 60 },
    )
  })

  it('lists few of many scores, and every one of a few', () => {
    const many = Array.from({ length: 10_000 }, (_, n) => n / 7)
    expect(rankedScores(many).length).toBeLessThan(500)
    expect(rankedScores([1, 1, 1, 2, 2, 5])).toEqual([
      [5, 0, 1],
      [2, 1, 3],
      [1, 3, 6],
    ])
  })

  it('gives only a bound where no candidate is as good', () => {
    const ranked = rankedScores([1, 2, 3])
    expect(rarenessOf(4, ranked, 1000)).toMatchObject({ least: 0, most: 0, rate: 0, low: 0, high: 0.003 })
    expect(rarenessOf(3, ranked, 1000)).toMatchObject({ least: 1, most: 1, rate: 0.001 })
    expect(rarenessOf(0, ranked, 1000)).toMatchObject({ least: 3, most: 3 })
    expect(rarenessOf(1, [], 20)).toMatchObject({ least: 0, high: 0.15 })
    expect(rarenessOf(1, [], 0)).toBeNull()
  })
})
