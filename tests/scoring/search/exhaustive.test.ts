import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { enumerateClasses, orbitsOf } from '../../../scoring/geometry/enumeration.ts'
import { ReverseSearch } from '../../../scoring/geometry/reverseSearch.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { mergeIslands } from '../../../scoring/search/islands.ts'
import type { SearchProblem } from '../../../scoring/search/problem.ts'
import { stateLimitBytes } from '../../../scoring/search/settings.ts'
import { bundledPolytopes } from '../../reference/bundledPolytopes.ts'
import { problemOf } from './problems.ts'

/** The canonical keys of a scope's candidates, by the walk that keeps a list of classes seen. */
function keysOf({ polytopes }: SearchProblem): string[] {
  const keys: string[] = []
  for (let p = 0; p < polytopes.count; p++) {
    const form = polytopes.at(p)
    keys.push(...orbitsOf(form, enumerateClasses(form.polytope).classes).keys())
  }
  return keys.sort()
}

describe('walk over all classes by reverse search', () => {
  const { polytopes } = problemOf(
    ['w8-44-newton-7-7-9-10-11', 'w9-39-newton-7-7-8-9-11', 'r4-0500', 'r5-0200', 'w8-77-fan-1-2-2-5-5'],
    'score volume',
    'random',
    { budget: 1 },
  )

  it.each([...polytopes.keys.keys()])('meets each class once (polytope %i)', (index) => {
    const form = polytopes.at(index)
    const names = [...enumerateClasses(form.polytope).classes].map(({ triangles }) => triangles.join())
    const met: string[] = []
    const walk = new ReverseSearch(form.polytope)
    do met.push(walk.class.triangles.join())
    while (walk.next())
    expect(met.sort()).toEqual(names.sort())
  })

  it('goes on from a stored position to the bit', () => {
    const { polytope } = polytopes.at(1)
    const whole = new ReverseSearch(polytope)
    let cut = new ReverseSearch(polytope)
    for (let more = true; more;) {
      cut = new ReverseSearch(polytope, JSON.parse(JSON.stringify(cut.position())))
      more = cut.next()
      expect(whole.next()).toBe(more)
      expect(cut.position()).toEqual(whole.position())
      expect(cut.heights).toEqual(whole.heights)
    }
  })
})

describe('exhaustive search', () => {
  const ids = ['r5-0200', 'w9-39-newton-7-7-8-9-11', 'w8-44-newton-7-7-9-10-11', 'w10-64-fan-1-2-4-5-5']

  it.each([1, 3])('scores every candidate once, shared out among %i islands', (islands) => {
    const problem = problemOf(ids, 'score volume', 'exhaustive', { budget: 500, islands, keep: 500 })
    const states = Array.from(
      { length: islands },
      (_, island) => advance(problem, startState(problem, 1, island), Infinity).state,
    )
    const { progress, top } = mergeIslands(states)
    const keys = keysOf(problem)
    expect(top.map(({ classKey }) => classKey).sort()).toEqual(keys)
    expect(progress).toMatchObject({
      evaluations: keys.length,
      budget: keys.length,
      exhausted: true,
      done: true,
    })
    const shares = states.map(({ evaluations }) => evaluations)
    expect(Math.max(...shares) - Math.min(...shares)).toBeLessThanOrEqual(1)
  })

  it('scores canonical representatives, whose keys are those of other methods', () => {
    const problem = problemOf([ids[1]], 'score volume', 'exhaustive', { budget: 100 })
    const form = problem.polytopes.at(0)
    const found = new Set<string>()
    advance(problem, startState(problem, 1), Infinity, { observe: ({ classKey }) => found.add(classKey) })
    const all = enumerateClasses(form.polytope).classes
    expect(form.automorphisms.length).toBeGreaterThan(1)
    for (const cls of all) expect(found).toContain(canonicalClass(form, cls).key)
  })

  it('counts only polytopes that the rule does not refuse', () => {
    const problem = problemOf(ids, 'require h11 < 9 score volume', 'exhaustive', { budget: 200 })
    const { state } = advance(problem, startState(problem, 1), Infinity)
    expect(state.infeasible).toBe(0)
    expect(state.evaluations).toBe(
      keysOf(problemOf([ids[0], ids[2]], 'score volume', 'random', { budget: 1 })).length,
    )
    const none = problemOf(ids, 'require h11 > 90 score volume', 'exhaustive', { budget: 200 })
    expect(advance(none, startState(none, 1), Infinity).state.ended).toBe('no-polytope-passes')
  })

  it('refuses a scope with more classes than its budget, without scoring any', () => {
    const problem = problemOf(ids, 'score volume', 'exhaustive', { budget: 60, islands: 2 })
    const refused = expect.objectContaining({ code: 'search.too-many-classes', found: 60 })
    for (const island of [0, 1]) {
      const scored: string[] = []
      const observe = ({ classKey }: { classKey: string }): unknown => scored.push(classKey)
      expect(() => advance(problem, startState(problem, 1, island), Infinity, { observe })).toThrow(refused)
      expect(scored).toEqual([])
    }
  })

  it('does not even count what is far too large', () => {
    const large = problemOf(['w491-11-newton-1-1-12-28-42'], 'score volume', 'exhaustive', { budget: 10 })
    expect(() => advance(large, startState(large, 1), Infinity)).toThrow(/h11 = 491 may have up to 10\^428/)
  })

  it('keeps a small state', () => {
    const id = 'w12-30-newton-5-7-7-8-9'
    const problem = problemOf([id], 'score volume', 'exhaustive', { budget: 2000 })
    const { state } = advance(problem, startState(problem, 1), Infinity, { proposals: 1500 })
    expect(state.evaluations).toBe(0)
    expect(JSON.stringify(state).length).toBeLessThan(stateLimitBytes / 50)
  })
})

describe('all polytopes with h11 up to 2', () => {
  // As in tests/reference/classCounts.test.ts, by the other walk.
  it('have 5 and 36 candidates', () => {
    for (const [h11, count] of [
      [1, 5],
      [2, 36],
    ]) {
      const ids = bundledPolytopes('small')
        .filter((polytope) => polytope.h11 === h11)
        .map(({ id }) => id)
      const problem = problemOf(ids, 'score h11', 'exhaustive', { budget: 500 })
      const { state } = advance(problem, startState(problem, 1), Infinity)
      expect(state.ended).toBe('space-exhausted')
      expect(state.evaluations).toBe(count)
    }
  })
})
