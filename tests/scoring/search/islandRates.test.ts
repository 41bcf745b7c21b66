import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { enrichment, isEasy, rarityOf, searchRate } from '../../../scoring/search/islandRates.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import type { MethodName } from '../../../scoring/search/methods.ts'
import { searchStatistics } from '../../../scoring/search/searchStatistics.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { problemOf, ruleOf } from './problems.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { rateOf, type Rate } from '../../../scoring/search/statistics.ts'

const rate = (hits: number, size: number): Rate => rateOf(hits, size) as Rate

describe('hit rate of a search', () => {
  it('has no interval under five islands, and none at all without evaluations', () => {
    const island = { hits: 3, evaluations: 10 }
    expect(searchRate([island, island, island, island])).toEqual({
      hits: 12,
      evaluations: 40,
      rate: 0.3,
      islands: 4,
      interval: null,
    })
    expect(searchRate(new Array(5).fill(island))?.interval).toEqual([0.3, 0.3])
    expect(searchRate([{ hits: 0, evaluations: 0 }])).toBeNull()
    // No hit at all: the rule of three, since resampling zeros gives zeros.
    expect(searchRate(new Array(6).fill({ hits: 0, evaluations: 50 }))?.interval).toEqual([0, 0.01])
  })

  it('lies inside its interval, which does not depend on the order of islands by much', () => {
    const island = fc.record({
      hits: fc.integer({ min: 0, max: 50 }),
      evaluations: fc.integer({ min: 50, max: 200 }),
    })
    fc.assert(
      fc.property(fc.array(island, { minLength: 5, maxLength: 12 }), (islands) => {
        const found = searchRate(islands)
        if (!found?.interval) throw new Error('no interval')
        const [low, high] = found.interval
        expect(low).toBeLessThanOrEqual(found.rate)
        expect(high).toBeGreaterThanOrEqual(found.rate)
        expect(low).toBeGreaterThanOrEqual(0)
        expect(high).toBeLessThanOrEqual(1)
        expect(searchRate(islands)).toEqual(found)
      }),
      { numRuns: 20 },
    )
  })

  it('covers the true rate of correlated islands about as often as it says', () => {
    const stream = new RandomStream(seededState(8))
    let covered = 0
    const [trials, islands, truth] = [200, 16, 0.3]
    for (let n = 0; n < trials; n++) {
      // All of an island's evaluations share its luck.
      const drawn = Array.from({ length: islands }, () => {
        const luck = stream.uniform() < 0.5 ? truth - 0.2 : truth + 0.2
        return {
          hits: Array.from({ length: 50 }).filter(() => stream.uniform() < luck).length,
          evaluations: 50,
        }
      })
      const [low, high] = searchRate(drawn)?.interval ?? [1, 0]
      if (low <= truth && truth <= high) covered++
    }
    // 95 % of 200 is 190, standard deviation 3; with so few islands resampling covers a little less.
    expect(covered).toBeGreaterThan(176)
    expect(covered).toBeLessThanOrEqual(200)
  })
})

describe('enrichment', () => {
  it('is the ratio of the rates, its ends the worse of each against the better of the other', () => {
    const islands = [5, 6, 7, 8, 9].map((hits) => ({ hits, evaluations: 20 }))
    const search = searchRate(islands)
    if (!search?.interval) throw new Error('no interval')
    const nullRate = rate(20, 1000)
    const { ratio, interval } = enrichment(search, nullRate)
    expect(ratio).toBeCloseTo(0.35 / 0.02, 9)
    expect(interval).toEqual([search.interval[0] / nullRate.high, search.interval[1] / nullRate.low])
  })

  it('has a lower end only where the null has no hit', () => {
    const search = searchRate(new Array(6).fill({ hits: 10, evaluations: 100 }))
    if (search === null) throw new Error('no rate')
    expect(enrichment(search, rate(0, 3000))).toEqual({ ratio: null, interval: [0.1 / 0.001, null] })
  })
})

describe('rarity and ease', () => {
  it('counts null candidates at least as good, and else says below 3 / n', () => {
    expect(rarityOf(2, [1, 2, 3, 4], 1000)).toMatchObject({ hits: 3, rate: 0.003, isBoundOnly: false })
    expect(rarityOf(5, [1, 2, 3, 4], 1000)).toEqual({
      hits: 0,
      size: 1000,
      rate: 0,
      low: 0,
      high: 0.003,
      isBoundOnly: true,
    })
    expect(rarityOf(5, [], 0)).toBeNull()
  })

  it('calls a rule easy only when the null leaves no doubt', () => {
    expect(isEasy(rate(80, 1000))).toBe(true)
    expect(isEasy(rate(6, 100))).toBe(false)
    expect(isEasy(rate(0, 100))).toBe(false)
  })
})

describe('statistics of a search', () => {
  const ids = ['w9-39-newton-7-7-8-9-11']
  const rule = 'score volume hit volume > 20'
  const statesOf = (method: MethodName, islands: number, budget: number): SearchState[] => {
    const problem = problemOf(ids, rule, method, { budget, islands })
    return Array.from(
      { length: islands },
      (_, n) => advance(problem, startState(problem, 1, n), Infinity).state,
    )
  }
  const checked = ruleOf(rule)
  const [sample] = statesOf('random', 1, 15)

  it('are exact for an enumeration, whatever the method that made it', () => {
    for (const method of ['exhaustive', 'auto'] as const) {
      const states = statesOf(method, 6, 100)
      const { law, exact, rate, enrichment: found } = searchStatistics(states, sample, checked)
      expect(exact).toBe(true)
      expect(law).toMatch(/^exhaustive: /)
      expect(rate).toMatchObject({ evaluations: 16, islands: 6, interval: null })
      expect(rate?.hits).toBe(states.reduce((sum, { hits }) => sum + hits, 0))
      expect(found?.interval).toBeNull()
    }
  })

  it('name the law of a sample, and none for a guided search', () => {
    expect(searchStatistics(statesOf('uniform', 1, 8), sample, checked).law).toMatch(
      /uniform over the classes before/,
    )
    const guided = searchStatistics(statesOf('annealing', 1, 8), null, checked)
    expect(guided).toMatchObject({ law: null, exact: false, hitLine: 'rule', enrichment: null, rarity: null })
  })

  it('take the null sample’s 99 % quantile for a line where the rule has none', () => {
    const plain = { hit: null }
    const states = statesOf('annealing', 1, 8)
    expect(searchStatistics(states, null, plain)).toMatchObject({ hitLine: null, rate: null })
    const found = searchStatistics(states, sample, plain)
    expect(found).toMatchObject({ hitLine: 'quantile', rateFrom: 'all', rate: { evaluations: 8 } })
  })
})
