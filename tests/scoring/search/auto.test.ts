import { describe, expect, it } from 'vitest'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { mergeIslands } from '../../../scoring/search/islands.ts'
import { OutcomeMemo } from '../../../scoring/search/memo.ts'
import { feasibleKind } from '../../../scoring/search/merit.ts'
import type { SearchProblem } from '../../../scoring/search/problem.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { problemOf } from './problems.ts'

const run = (problem: SearchProblem, seed = 1, memo?: OutcomeMemo): SearchState =>
  advance(problem, startState(problem, seed), Infinity, { memo }).state

interface AutoChain {
  readonly phase: string
  readonly arms: readonly {
    readonly method: string
    readonly polytope: number | null
    readonly counts: { readonly evaluations: number; readonly best: { readonly value: number } }
  }[]
  readonly round: readonly number[]
}
const chainOf = (state: SearchState): AutoChain => state.chain as unknown as AutoChain

describe('auto', () => {
  it('enumerates a scope that has no more classes than the budget, shared out among islands', () => {
    const ids = ['w10-64-fan-1-2-4-5-5', 'r4-0100', 'w9-39-newton-7-7-8-9-11']
    const problem = problemOf(ids, 'score volume', 'auto', { budget: 100, islands: 2 })
    const exact = run(problemOf(ids, 'score volume', 'exhaustive', { budget: 100 }))
    const states = [0, 1].map((island) => advance(problem, startState(problem, 1, island), Infinity).state)
    expect(states.map((state) => chainOf(state).phase)).toEqual(['enumeration', 'enumeration'])
    const { progress, top } = mergeIslands(states)
    expect(progress).toMatchObject({ evaluations: exact.evaluations, exhausted: true })
    expect(top.map(({ classKey }) => classKey)).toEqual(exact.top.map(({ classKey }) => classKey))
  })

  it('gives up counting when there are more, and lets the better half of its arms go on', () => {
    const problem = problemOf(['w20-17-newton-4-4-5-5-7'], 'score volume', 'auto', { budget: 450 })
    const state = run(problem)
    const { phase, arms, round } = chainOf(state)
    expect(state.evaluations).toBe(450)
    expect(phase).toBe('arms')
    expect(arms.map(({ method }) => method)).toEqual(['annealing', 'genetic', 'tempering'])
    expect(arms.reduce((sum, { counts }) => sum + counts.evaluations, 0)).toBe(450)
    expect(round.length).toBe(2)
    const best = Math.max(...arms.map(({ counts }) => counts.best.value))
    expect(round.map((n) => arms[n].counts.best.value)).toContain(best)
    expect(best).toBe(state.curve[state.curve.length - 1][1])
  })

  it('begins with annealing, which a small budget is left to', () => {
    const { phase, arms } = chainOf(
      run(problemOf(['w35-11-newton-2-3-3-5-5'], 'score h11', 'auto', { budget: 40 })),
    )
    expect(phase).toBe('arms')
    expect(arms.map(({ method, counts }) => [method, counts.evaluations])).toEqual([['annealing', 40]])
  })

  it('scouts many polytopes and spends its budget on those that do well', () => {
    const ids = [
      ...Array.from({ length: 30 }, (_, n) => `r5-0${100 + n}`),
      'w18-18-newton-4-5-5-6-7',
      'w20-17-newton-4-4-5-5-7',
    ]
    const problem = problemOf(
      ids,
      'require polytope.points > 8 score h11 + 0.1 * count(d in divisors : d.rigid)',
      'auto',
      {
        budget: 400,
        sample: 1000,
      },
    )
    const state = run(problem)
    const { phase, arms } = chainOf(state)
    expect(phase).toBe('arms')
    expect(arms.some(({ polytope }) => polytope === 31)).toBe(true)
    const last = problem.polytopes.keys[31]
    const there = state.sample.rows.filter(({ polytopeKey }) => polytopeKey === last)
    expect(there.length).toBeGreaterThan(150)
    expect(state.sample.rows.every(({ kind }) => kind === feasibleKind)).toBe(true)
  })

  it('ends when the rule refuses every polytope', () => {
    const problem = problemOf(['r4-0100', 'r5-0200'], 'require h11 > 9 score volume', 'auto', { budget: 50 })
    expect(run(problem).ended).toBe('no-polytope-passes')
  })
})

describe('parallel tempering', () => {
  it('beats as many random candidates, and repeats to the bit', () => {
    const ids = ['w50-7-newton-2-2-3-3-7']
    const rule = 'score log10(metric.divisor.top)'
    const memo = new OutcomeMemo()
    const best = (state: SearchState): number => state.curve[state.curve.length - 1][1]
    const problem = problemOf(ids, rule, 'tempering', { budget: 150 })
    const random = run(problemOf(ids, rule, 'random', { budget: 150 }), 1, memo)
    const state = run(problem, 1, memo)
    expect(best(state)).toBeGreaterThan(best(random))
    expect(JSON.stringify(run(problem, 1, memo))).toBe(JSON.stringify(state))
  })
})
