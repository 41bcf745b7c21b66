import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { OutcomeMemo } from '../../../scoring/search/memo.ts'
import { methodNames, usesStarts } from '../../../scoring/search/methods.ts'
import { problemDigest, type SearchProblem } from '../../../scoring/search/problem.ts'
import { searchStatistics } from '../../../scoring/search/searchStatistics.ts'
import { startsOfIsland, type GivenStart } from '../../../scoring/search/givenStarts.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { problemOf } from './problems.ts'

const ids = ['w20-17-newton-4-4-5-5-7', 'w12-30-newton-5-7-7-8-9']
const rule = 'score log10(metric.divisor.top) hit log10(metric.divisor.top) > -3'
const memo = new OutcomeMemo()
const throughJson = (state: SearchState) => JSON.parse(JSON.stringify(state)) as SearchState

/** The best candidates of an earlier search over the same scope. */
const earlier = advance(
  problemOf(ids, rule, 'annealing', { budget: 120, keep: 9 }),
  startState(problemOf(ids, rule, 'annealing', { budget: 120, keep: 9 }), 4),
  Infinity,
  { memo },
)
const starts: GivenStart[] = earlier.finds.map(({ polytopeKey, classKey, heights }) => ({
  polytopeKey,
  classKey,
  heights,
}))

const warm = (method: (typeof methodNames)[number], settings: object = {}): SearchProblem => ({
  ...problemOf(ids, rule, method, { budget: 90, patience: 40, sample: 90, keep: 10, ...settings }),
  starts,
})
const run = (problem: SearchProblem, island = 0) =>
  advance(problem, startState(problem, 1, island), Infinity, { memo }).state

const guided = methodNames.filter((name) => usesStarts(name) && name !== 'uniform')

describe.each(guided)('a search by %s that is given candidates', (method) => {
  const problem = warm(method)
  const whole = run(problem)

  it('scores them first and never ends below the best of them', () => {
    expect(whole.given?.scored).toBe(starts.length)
    expect(whole.given?.evaluations).toBe(starts.length)
    expect(whole.curve[0][0]).toBe(1)
    const first = throughJson(advance(problem, startState(problem, 1), starts.length, { memo }).state)
    expect(first.top.map(({ classKey }) => classKey).sort()).toEqual(starts.map((one) => one.classKey).sort())
    expect(whole.curve.at(-1)?.[1]).toBeGreaterThanOrEqual(earlier.progress.best ?? Infinity)
  })

  it('counts none of them as a hit of its own', () => {
    const given = new Set(starts.map(({ classKey }) => classKey))
    expect(whole.sample.rows.filter(({ classKey }) => given.has(classKey))).toEqual([])
    expect(whole.sample.offered).toBe(whole.evaluations - starts.length)
    const fresh = whole.sample.rows.filter(({ value }) => value > -3)
    expect(whole.hits).toBe(fresh.length)
    const { rate, given: counted } = searchStatistics([whole], null, problem.rule)
    expect(rate?.evaluations).toBe(whole.evaluations - starts.length)
    expect(counted).toBe(starts.length)
  })

  it('gives the same result however it is cut', () => {
    const cut = fc.record({
      evaluations: fc.integer({ min: 0, max: 25 }),
      proposals: fc.integer({ min: 1, max: 60 }),
    })
    fc.assert(
      fc.property(fc.array(cut, { maxLength: 8 }), (cuts) => {
        let state = startState(problem, 1)
        for (const { evaluations, proposals } of cuts)
          state = throughJson(advance(problem, state, evaluations, { proposals, memo }).state)
        state = advance(problem, state, Infinity, { memo }).state
        expect(JSON.stringify(state)).toBe(JSON.stringify(whole))
      }),
      { numRuns: 4 },
    )
  })
})

describe('given candidates', () => {
  it('are dealt out to the islands in turn, and shared where they are few', () => {
    expect(startsOfIsland(5, 2, 0)).toEqual([0, 2, 4])
    expect(startsOfIsland(5, 2, 1)).toEqual([1, 3])
    expect([0, 1, 2, 3].map((island) => startsOfIsland(2, 4, island))).toEqual([[0], [1], [0], [1]])
    const two = warm('annealing', { islands: 2 })
    const islands = [run(two, 0), run(two, 1)]
    expect(islands.map(({ given }) => given?.scored)).toEqual([5, 4])
    const total = islands.reduce((sum, { given }) => sum + (given?.evaluations ?? 0), 0)
    // A candidate that one island was given is no fresh find of the other.
    expect(total).toBeGreaterThanOrEqual(starts.length)
  })

  it('make nothing of methods whose law allows no choice of where to begin', () => {
    for (const method of ['random', 'exhaustive'] as const) {
      expect(usesStarts(method)).toBe(false)
      const bare = problemOf(['r4-0100'], 'score volume', method, { budget: 300 })
      expect(run({ ...bare, starts: [] }).top).toEqual(run(bare).top)
    }
    const random = warm('random', { budget: 40 })
    const { starts: none, ...cold } = random
    expect(none).toBe(starts)
    const [a, b] = [run(random), run(cold)]
    expect(a.given).toBeUndefined()
    expect(a.top).toEqual(b.top)
    expect(a.hits).toBe(b.hits)
  })

  it('decide where a uniform walk begins on each polytope', () => {
    const problem = warm('uniform')
    const first = advance(problem, startState(problem, 1), 2, { memo }).state
    const begun = new Set(first.top.map(({ classKey }) => classKey))
    const expected = problem.polytopes.keys.flatMap(
      (key) => starts.find((one) => one.polytopeKey === key) ?? [],
    )
    expect(expected.filter(({ classKey }) => begun.has(classKey)).length).toBeGreaterThan(0)
  })

  it('are part of what a state belongs to', () => {
    const problem = warm('annealing')
    const fewer = { ...problem, starts: starts.slice(1) }
    expect(problemDigest(fewer)).not.toBe(problemDigest(problem))
    expect(() => advance(fewer, startState(problem, 1), 1)).toThrow(InputError)
  })

  it('are refused outside the scope, twice, beyond 500, and with heights of another candidate', () => {
    const problem = warm('annealing')
    const code = (given: readonly GivenStart[]) => {
      try {
        const other = { ...problem, starts: given }
        advance(other, startState(other, 1), 5, { memo })
        return null
      } catch (error) {
        if (!(error instanceof InputError)) throw error
        return error.code
      }
    }
    const [first, second] = starts
    expect(code([{ ...first, polytopeKey: '0'.repeat(32) }])).toBe('start.not-in-scope')
    expect(code([first, first])).toBe('start.twice')
    expect(code(new Array<GivenStart>(501).fill(first))).toBe('search.too-many-starts')
    expect(code([{ ...first, classKey: second.classKey }])).toBe('start.other-key')
    expect(code([{ ...first, heights: first.heights.map(() => 0) }])).toBe('start.not-fine')
  })
})
