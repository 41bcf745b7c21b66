import { describe, expect, it } from 'vitest'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { mergeIslands } from '../../../scoring/search/islands.ts'
import { OutcomeMemo } from '../../../scoring/search/memo.ts'
import { feasibleKind } from '../../../scoring/search/merit.ts'
import type { SearchProblem } from '../../../scoring/search/problem.ts'
import { problemOf } from './problems.ts'

/** Both islands of a search to their end. */
function searched(problem: SearchProblem, seed: number, memo?: OutcomeMemo) {
  const islands = [0, 1].map(
    (island) => advance(problem, startState(problem, seed, island), Infinity, { memo }).state,
  )
  return mergeIslands(islands)
}

describe('annealing', () => {
  // The long comparison, 2,000 evaluations with ten seeds, is tests/long/annealingAgainstNull.ts.
  it('beats the best of as many null candidates at (h11, h21) = (50, 7), and repeats to the bit', () => {
    const ids = ['w50-7-newton-2-2-3-3-7']
    const rule = 'score log10(metric.divisor.top)'
    const memo = new OutcomeMemo()
    const settings = { budget: 500, islands: 2, keep: 10 }
    const random = searched(problemOf(ids, rule, 'random', settings), 1, memo)
    const problem = problemOf(ids, rule, 'annealing', settings)
    const results = [1, 2, 3].map((seed) => searched(problem, seed, memo))
    for (const { progress } of results) {
      expect(progress.evaluations).toBe(500)
      expect(progress.best).toBeGreaterThan(random.progress.best ?? NaN)
    }
    expect(new Set(results.map(({ progress }) => progress.bestKey)).size).toBeGreaterThan(1)
    expect(JSON.stringify(searched(problem, 2))).toBe(JSON.stringify(results[1]))
  })

  it('finds its way into a feasible region that random candidates miss', () => {
    const ids = ['w20-17-newton-4-4-5-5-7']
    const rule = 'require quantile(0.5, d in divisors : d.volume) >= 150 score log10(metric.divisor.top)'
    const memo = new OutcomeMemo()
    const settings = { budget: 300, islands: 2, sample: 1000 }
    const random = problemOf(ids, rule, 'random', settings)
    expect(searched(random, 1, memo).progress.feasible).toBe(0)
    const guided = problemOf(ids, rule, 'annealing', settings)
    for (const seed of [1, 2]) expect(searched(guided, seed, memo).progress.feasible).toBeGreaterThan(0)
  })

  it('spends its budget where it pays when the scope has several polytopes', () => {
    const ids = ['r5-0100', 'w10-64-fan-1-2-4-5-5', 'w12-30-newton-5-7-7-8-9', 'w35-11-newton-2-3-3-5-5']
    const problem = problemOf(ids, 'score h11', 'annealing', { budget: 200, sample: 1000 })
    const { state } = advance(problem, startState(problem, 1), Infinity)
    const counts = new Map(problem.polytopes.keys.map((key) => [key, 0]))
    for (const { polytopeKey, kind } of state.sample.rows) {
      expect(kind).toBe(feasibleKind)
      counts.set(polytopeKey, (counts.get(polytopeKey) ?? 0) + 1)
    }
    const most = [...counts].sort((a, b) => b[1] - a[1])[0][0]
    expect(problem.polytopes.at(problem.polytopes.keys.indexOf(most)).polytope.hodge.h11).toBe(35)
    expect([...counts.values()].every((count) => count > 0)).toBe(true)
  })

  it('starts afresh for each descent', () => {
    const ids = ['w12-30-newton-5-7-7-8-9', 'w10-64-fan-1-2-4-5-5']
    const problem = problemOf(ids, 'score -volume', 'annealing', { budget: 60, descents: 3 })
    expect(advance(problem, startState(problem, 1), Infinity).state.restarts).toBe(2)
  })
})
