import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { enumerateClasses, orbitsOf } from '../../../scoring/geometry/enumeration.ts'
import { isFacetGeneric } from '../../../scoring/geometry/fans/facetGenericHeights.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { evaluateRule } from '../../../scoring/rules/evaluate.ts'
import { compareOutcomes } from '../../../scoring/rules/outcome.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { heightsOfCode } from '../../../scoring/search/heightsCode.ts'
import { OutcomeMemo } from '../../../scoring/search/memo.ts'
import { methodNames } from '../../../scoring/search/methods.ts'
import { problemDigest, type SearchProblem } from '../../../scoring/search/problem.ts'
import type { SampledRow, SearchState } from '../../../scoring/search/state.ts'
import { problemOf } from './problems.ts'

const scope = ['w12-30-newton-5-7-7-8-9', 'w10-64-fan-1-2-4-5-5', 'r4-0100', 'r5-0200']
/** A scope with no more classes than the budget below. */
const smallScope = ['w10-64-fan-1-2-4-5-5', 'r4-0100', 'r5-0200', 'r3-0010']
const rule = `
  require polytope.points <= 17                              label "few points"
  require min(d in divisors : d.volume) >= 0.05              label "no tiny cycle"
  score log10(metric.divisor.top) + 0.01 * count(d in divisors : d.k3)
  hit log10(metric.divisor.top) > -3
`

function throughJson(state: SearchState): SearchState {
  return JSON.parse(JSON.stringify(state)) as SearchState
}

/** A whole run in one segment. */
function undisturbed(problem: SearchProblem, seed: number): string {
  return JSON.stringify(advance(problem, startState(problem, seed), Infinity).state)
}

describe.each(methodNames)('segments of method %s', (method) => {
  const polytopes = method === 'exhaustive' ? smallScope : scope
  const problem = problemOf(polytopes, rule, method, { budget: 60, keep: 10, patience: 40, sample: 20 })
  const memo = new OutcomeMemo()

  it('never change the result, however a run is cut', () => {
    const whole = new Map<number, string>()
    const cut = fc.record({
      evaluations: fc.integer({ min: 0, max: 25 }),
      proposals: fc.integer({ min: 1, max: 60 }),
    })
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 3 }), fc.array(cut, { maxLength: 12 }), (seed, cuts) => {
        let expected = whole.get(seed)
        if (expected === undefined) whole.set(seed, (expected = undisturbed(problem, seed)))
        let state = startState(problem, seed)
        for (const { evaluations, proposals } of cuts) {
          state = throughJson(advance(problem, state, evaluations, { proposals, memo }).state)
        }
        expect(JSON.stringify(advance(problem, state, Infinity, { memo }).state)).toBe(expected)
      }),
      { numRuns: 10 },
    )
  })

  it('do nothing once a run is over', () => {
    const { state } = advance(problem, startState(problem, 2), Infinity)
    expect(state.ended !== null || state.evaluations === 60).toBe(true)
    expect(advance(problem, state, 100).state).toEqual(throughJson(state))
  })

  it('refuse the state of another problem', () => {
    const state = startState(problem, 1)
    const other = { ...problem, settings: { ...problem.settings, keep: 11 } }
    expect(() => advance(other, state, 1)).toThrow(InputError)
  })

  it('keep the best distinct candidates in order, each with heights that give it', () => {
    const { finds, state } = advance(problem, startState(problem, 3), Infinity)
    expect(finds.length).toBe(10)
    expect(new Set(finds.map((find) => find.classKey)).size).toBe(10)
    for (const [n, { polytopeKey, classKey, outcome, heights }] of finds.entries()) {
      if (n > 0) {
        const before = finds[n - 1]
        expect(compareOutcomes(before.outcome, before.classKey, outcome, classKey)).toBeLessThan(0)
      }
      const form = problem.polytopes.at(problem.polytopes.keys.indexOf(polytopeKey))
      const cls = fineClass(form.polytope, heights)
      if (cls === undefined) throw new Error('kept heights are not fine')
      expect(isGeneric(cls, heights)).toBe(true)
      expect(isFacetGeneric(cls, heights)).toBe(true)
      const canonical = canonicalClass(form, cls)
      expect(canonical.class).toBe(cls)
      expect(canonical.key).toBe(classKey)
      const again = evaluateRule(problem.rule, buildCandidate(form, cls, classKey))
      expect(JSON.stringify(again)).toBe(JSON.stringify(outcome))
    }
    expect(state.feasible + state.infeasible + state.undefined).toBe(state.evaluations)
    expect(state.sample.offered).toBe(state.evaluations)
  })

  it('hand out what enters the uniform sample, with heights that give it', () => {
    const rows = new Map<number, SampledRow>()
    let state = startState(problem, 4)
    for (let n = 0; n < 40; n++) {
      const segment = advance(problem, state, 3, { memo, sampled: true, proposals: 200 })
      state = throughJson(segment.state)
      for (const row of segment.sampled) rows.set(row.place, row)
    }
    const kept = [...rows].sort(([a], [b]) => a - b).map(([, row]) => row)
    expect(kept.map(({ place, heights, ...row }) => (void place, void heights, row))).toEqual(
      state.sample.rows,
    )
    expect(state.evaluations).toBeGreaterThan(20)
    for (const { polytopeKey, classKey, heights } of kept) {
      const form = problem.polytopes.at(problem.polytopes.keys.indexOf(polytopeKey))
      const cls = fineClass(form.polytope, heightsOfCode(heights))
      expect(cls && canonicalClass(form, cls)).toMatchObject({ key: classKey, class: cls })
    }
    expect(advance(problem, startState(problem, 4), 5).sampled).toEqual([])
  })
})

describe.each(['auto', 'annealing', 'tempering', 'genetic'] as const)(
  'method %s with a surrogate',
  (method) => {
    const problem = problemOf(scope, rule, method, { budget: 110, keep: 10, sample: 20, surrogate: true })
    const memo = new OutcomeMemo()

    it('gives the same result however a run is cut, and its surrogate has its say', () => {
      let chosen = 0
      fc.assert(
        fc.property(
          fc.integer({ min: 1, max: 3 }),
          fc.array(fc.integer({ min: 1, max: 40 }), { maxLength: 5 }),
          (seed, cuts) => {
            const whole = advance(problem, startState(problem, seed), Infinity, { memo }).state
            let state = startState(problem, seed)
            for (const proposals of cuts)
              state = throughJson(advance(problem, state, Infinity, { proposals, memo }).state)
            expect(JSON.stringify(advance(problem, state, Infinity, { memo }).state)).toBe(
              JSON.stringify(whole),
            )
            chosen += whole.surrogate?.chosen ?? 0
          },
        ),
        { numRuns: 4 },
      )
      expect(chosen).toBeGreaterThan(0)
    })

    it('lists what the rule says of each candidate, in its order', () => {
      const { finds } = advance(problem, startState(problem, 4), Infinity)
      for (const { polytopeKey, classKey, outcome, heights } of finds) {
        const form = problem.polytopes.at(problem.polytopes.keys.indexOf(polytopeKey))
        const cls = fineClass(form.polytope, heights)
        if (cls === undefined) throw new Error('kept heights are not fine')
        const again = evaluateRule(problem.rule, buildCandidate(form, cls, classKey))
        expect(JSON.stringify(again)).toBe(JSON.stringify(outcome))
      }
      for (const [n, { outcome, classKey }] of finds.slice(1).entries())
        expect(compareOutcomes(finds[n].outcome, finds[n].classKey, outcome, classKey)).toBeLessThan(0)
    })
  },
)

describe('a run without a surrogate', () => {
  const settings = { budget: 40, keep: 5, sample: 5 }

  it('is the same problem as before there was a choice, and its older states go on', () => {
    const problem = problemOf(scope, rule, 'annealing', settings)
    const { surrogate: off, ...older } = problem.settings
    expect(off).toBe(false)
    expect(problemDigest({ ...problem, settings: older as typeof problem.settings })).toBe(
      problemDigest(problem),
    )
    expect(problemDigest({ ...problem, settings: { ...problem.settings, surrogate: true } })).not.toBe(
      problemDigest(problem),
    )
    const { surrogate: none, ...state } = advance(problem, startState(problem, 1), 20).state
    expect(none).toBeNull()
    const straight = advance(problem, startState(problem, 1), Infinity).state
    expect(advance(problem, state as SearchState, Infinity).state).toEqual(straight)
  })

  it('is any run whose rule needs no reference point', () => {
    const problem = problemOf(scope, 'score count(d in divisors : d.rigid)', 'annealing', {
      ...settings,
      surrogate: true,
    })
    expect(advance(problem, startState(problem, 1), Infinity).state.surrogate).toBeNull()
  })
})

describe('the end of a run', () => {
  const small = ['r2-0001', 'r3-0010', 'r3-0020']

  it.each(methodNames)('comes when the space holds nothing new (%s)', (method) => {
    const problem = problemOf(small, 'score volume', method, { budget: 1000, patience: 60 })
    const { state } = advance(problem, startState(problem, 1), Infinity)
    let classes = 0
    for (let p = 0; p < problem.polytopes.count; p++) {
      const form = problem.polytopes.at(p)
      classes += orbitsOf(form, enumerateClasses(form.polytope).classes).size
    }
    expect(state.ended).toBe('space-exhausted')
    expect(state.evaluations).toBe(classes)
    expect(state.top.length).toBe(classes)
  })

  it('comes at once when the rule refuses every polytope', () => {
    const problem = problemOf(small, 'require h11 > 100 score volume', 'annealing', { budget: 50 })
    const { state } = advance(problem, startState(problem, 1), Infinity)
    expect(state.ended).toBe('no-polytope-passes')
    expect(state.evaluations).toBe(0)
  })

  it('leaves refused polytopes in the null sample', () => {
    const problem = problemOf(small, 'require h11 > 2 score volume', 'random', { budget: 50, patience: 60 })
    const { state } = advance(problem, startState(problem, 1), Infinity)
    expect(state.infeasible).toBeGreaterThan(0)
    expect(state.feasible).toBeGreaterThan(0)
  })
})
