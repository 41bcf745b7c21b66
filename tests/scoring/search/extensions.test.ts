import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { OutcomeMemo } from '../../../scoring/search/memo.ts'
import { methodNames } from '../../../scoring/search/methods.ts'
import type { SearchProblem } from '../../../scoring/search/problem.ts'
import { SeenTable } from '../../../scoring/search/seenTable.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { problemOf } from './problems.ts'

const ids = ['w20-17-newton-4-4-5-5-7', 'w12-30-newton-5-7-7-8-9']
const memo = new OutcomeMemo()
const throughJson = (state: SearchState) => JSON.parse(JSON.stringify(state)) as SearchState

describe.each(methodNames.filter((name) => name !== 'exhaustive'))(
  'an extension of a search by %s',
  (method) => {
    const base = problemOf(ids, 'score volume', method, { budget: 50, keep: 5, patience: 40, sample: 10 })
    const extended = (extensions: readonly number[]): SearchProblem => ({ ...base, extensions })
    const whole = advance(extended([30, 20]), startState(base, 2), Infinity, { memo }).state

    it('goes on from where the budget was used up, whenever it was asked for', () => {
      expect(whole.evaluations).toBe(100)
      expect(whole.extended).toEqual({ by: [30, 20], begun: 80 })
      // Asked for when the search had ended, twice.
      let state = throughJson(advance(base, startState(base, 2), Infinity, { memo }).state)
      expect(state.evaluations).toBe(50)
      state = throughJson(advance(extended([30]), state, Infinity, { memo }).state)
      expect(state.evaluations).toBe(80)
      state = advance(extended([30, 20]), state, Infinity, { memo }).state
      expect(JSON.stringify(state)).toBe(JSON.stringify(whole))
    })

    it('gives the same result however the run is cut, and whenever it became known', () => {
      const cut = fc.record({
        evaluations: fc.integer({ min: 0, max: 40 }),
        proposals: fc.integer({ min: 1, max: 80 }),
        known: fc.integer({ min: 0, max: 2 }),
      })
      fc.assert(
        fc.property(fc.array(cut, { maxLength: 8 }), (cuts) => {
          let state = startState(base, 2)
          let known = 0
          for (const { evaluations, proposals, known: now } of cuts) {
            known = Math.max(known, now)
            const problem = extended([30, 20].slice(0, known))
            state = throughJson(advance(problem, state, evaluations, { proposals, memo }).state)
          }
          state = advance(extended([30, 20]), state, Infinity, { memo }).state
          expect(JSON.stringify(state)).toBe(JSON.stringify(whole))
        }),
        { numRuns: 4 },
      )
    })

    it('is counted in the budget from the time it is known', () => {
      const { progress } = advance(extended([30]), startState(base, 2), 50, { memo })
      expect(progress).toMatchObject({ evaluations: 50, budget: 80, done: false })
    })
  },
)

describe('extensions', () => {
  const base = problemOf(ids, 'score volume', 'annealing', { budget: 21, islands: 2, descents: 2 })

  it('are shared out among islands as the budget is', () => {
    const problem = { ...base, extensions: [7] }
    const ends = [0, 1].map(
      (island) => advance(problem, startState(problem, 1, island), Infinity, { memo }).state,
    )
    expect(ends.map(({ evaluations }) => evaluations)).toEqual([15, 13])
  })

  it('bring annealing as many descents again', () => {
    const one = { ...base, settings: { ...base.settings, islands: 1, budget: 60 } }
    const { state } = advance({ ...one, extensions: [60] }, startState(one, 1), Infinity, { memo })
    expect(state.chain).toMatchObject({ descent: 3 })
    expect(state.restarts).toBeGreaterThanOrEqual(3)
  })

  it('do not wake an island that has nothing left to find', () => {
    const small = problemOf(['r3-0010'], 'score volume', 'annealing', { budget: 1000, patience: 50 })
    const { state, progress } = advance({ ...small, extensions: [10] }, startState(small, 1), Infinity)
    expect(state.ended).toBe('space-exhausted')
    expect(state.extended).toBeUndefined()
    expect(progress.done).toBe(true)
  })

  it('that a state has taken in are not taken back', () => {
    const { state } = advance({ ...base, extensions: [10] }, startState(base, 1), Infinity, { memo })
    expect(() => advance({ ...base, extensions: [11] }, state, 1)).toThrow(InputError)
    expect(() => advance(base, state, 1)).toThrow(/extended by 10/)
  })
})

describe('a table of classes seen', () => {
  it('keeps its classes when it grows', () => {
    fc.assert(
      fc.property(
        fc.uniqueArray(fc.tuple(fc.nat(), fc.nat()), { maxLength: 30, selector: String }),
        (keys) => {
          const table = new SeenTable(256)
          for (const [n, [high, low]] of keys.entries()) table.add(high, low, 1 + (n % 9), n)
          const grown = table.grown(1024)
          expect(grown.used).toBe(table.used)
          for (const [high, low] of keys) expect(grown.find(high, low)).toEqual(table.find(high, low))
          expect(grown.state().capacity).toBe(1024)
        },
      ),
      { numRuns: 20 },
    )
  })
})
