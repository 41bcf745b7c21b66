import { describe, expect, it } from 'vitest'
import { type NullSummary } from '../../shared/nullSamples.ts'
import { type SearchProgress } from '../../shared/searches.ts'
import { numberOf } from '../../src/routes/search/HowRare.tsx'
import {
  againstNull,
  enrichmentText,
  expectedBestOf,
  levelsReached,
  rarenessIn,
  rarenessText,
} from '../../src/lib/againstNull.ts'

const sample: NullSummary = {
  law: 'quadratic-noise/1: ...',
  seed: 1,
  size: 100,
  evaluated: 100,
  complete: true,
  feasible: 100,
  infeasible: 0,
  undefined: 0,
  median: 1,
  best: 9,
  quantile99: 8,
  quantile999: 8.9,
  histogram: null,
  hit: { hits: 1, size: 100, rate: 0.01, low: 0.002, high: 0.054 },
  expectedBest: [
    [10, 5],
    [100, 9],
  ],
  ranked: [
    [9, 0, 1],
    [8, 1, 2],
    [4, 2, 40],
  ],
}

const progressOf = (
  islands: readonly { evaluations: number; given?: number; hits?: number; unsure?: number }[],
) =>
  ({
    islands: islands.map((island) => ({ best: null, exhausted: false, ...island })),
    curve: [
      [1, 3],
      [12, 8.5],
    ],
    exhausted: false,
  }) as unknown as SearchProgress

describe('a search against its null', () => {
  const search = (islands: Parameters<typeof progressOf>[0]) => ({
    progress: progressOf(islands),
    null: sample,
    ownHitLine: false,
    method: 'annealing',
  })

  it('has a rate only when the hits of all islands are known, and an interval from five islands on', () => {
    expect(againstNull(search([{ evaluations: 10, hits: 1 }, { evaluations: 10 }])).rate).toBeNull()
    const two = againstNull(search(new Array(2).fill({ evaluations: 10, hits: 2, unsure: 1 })))
    expect(two).toMatchObject({ rate: { rate: 0.2, interval: null }, unsure: 2, easy: false })
    const five = againstNull(search(new Array(5).fill({ evaluations: 10, hits: 2 })))
    expect(five.rate?.interval).toEqual([0.2, 0.2])
    expect(five.enrichment && enrichmentText(five.enrichment, false)).toBe('20 times (3.70 to 100, 95 %)')
    expect(two.enrichment && enrichmentText(two.enrichment, false)).toBe('20 times')
    expect(enrichmentText({ ratio: null, interval: [0, null] }, false)).toBe('neither has a hit')
  })

  it('leaves out what the search was given', () => {
    const given = search([
      { evaluations: 30, given: 10, hits: 5 },
      { evaluations: 5, given: 5 },
    ])
    expect(againstNull(given).rate).toMatchObject({ hits: 5, evaluations: 20, rate: 0.25 })
  })

  it('calls a rule easy whose own hit line the null often meets', () => {
    const often = { ...sample, hit: { hits: 30, size: 100, rate: 0.3, low: 0.22, high: 0.4 } }
    const easy = { ...search([{ evaluations: 10, hits: 9 }]), null: often, ownHitLine: true }
    expect(againstNull(easy).easy).toBe(true)
    expect(againstNull({ ...easy, ownHitLine: false }).easy).toBe(false)
  })

  it('says after how many evaluations each level was reached', () => {
    expect(levelsReached(search([]), sample)).toEqual([
      { name: '99 % quantile', level: 8, evaluations: 12 },
      { name: '99.9 % quantile', level: 8.9, evaluations: null },
      { name: 'best', level: 9, evaluations: null },
    ])
  })

  it('expects a best of as many, and only a bound beyond the sample', () => {
    expect(expectedBestOf(sample, 100)).toEqual({ score: 9, isBound: false })
    expect(expectedBestOf(sample, 101)).toEqual({ score: 9, isBound: true })
    expect(expectedBestOf(sample, 31)?.score).toBeCloseTo(5 + 4 * Math.log10(3.1), 12)
    expect(expectedBestOf(sample, 5)).toBeNull()
  })

  it('says how rare a score is, with its error', () => {
    const say = (score: number) => {
      const rare = rarenessIn(sample, score)
      return rare && rarenessText(rare)
    }
    expect(say(9.5)).toBe('none of 100 is as good: below 3.0 % (95 %)')
    expect(say(8)).toMatch(/^2 of 100 at least as good: 2\.0 % \(0\.55 % to 7\.0 %, 95 %\)$/)
    expect(rarenessIn({ ...sample, ranked: undefined }, 8)).toBeNull()
  })
})

describe('a typed score', () => {
  it.each([
    ['-4.6', -4.6],
    [' −4.6 ', -4.6],
    ['1e-3', 0.001],
    ['.5', 0.5],
    ['', null],
    ['-', null],
    ['4,6', null],
    ['Infinity', null],
  ])('%j is %s', (text, value) => {
    expect(numberOf(text)).toBe(value)
  })
})
