import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { evaluateRule } from '../../../scoring/rules/evaluate.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { bundledEntry, problemOf } from './problems.ts'

const large = 'w50-7-newton-2-2-3-3-7'
const split = 'w50-74-fan-1-3-10-13-13'
const rules = [
  'score sum(d in divisors : d.cubic * d.cubic)\nreport least = min(c in curves : c.least)',
  'require count(d in divisors : d.delPezzo) >= 2\nscore count(d in divisors : d.cubic > 0)\nhit any(d in divisors : d.k3)',
  'require all(d in divisors : d.c2 >= 0)\nscore mean(p in pairs : sqrt(abs(p.aab)))\nreport smallest = min(d in divisors : d.volume)',
]

/** Carried on in segments of the sizes given, in turn, through JSON. */
function run(problem: ReturnType<typeof problemOf>, seed: number, sizes: readonly number[]): SearchState {
  let state = startState(problem, seed)
  for (let n = 0; state.ended === null && state.evaluations < state.budget; n++) {
    const size = sizes[n % sizes.length]
    state = JSON.parse(JSON.stringify(advance(problem, state, size).state)) as SearchState
  }
  return state
}

describe('line searches', () => {
  it.each(rules)('end the same however segments cut the lines: %s', (rule) => {
    const problem = problemOf([large, split], rule, 'lines', { budget: 160, keep: 12, sample: 20 })
    expect(run(problem, 4, [1, 7, 2])).toEqual(run(problem, 4, [1000]))
  })

  it.each(rules)(
    'list what the rule says of the canonical representative, with heights inside it: %s',
    (rule) => {
      const problem = problemOf([large], rule, 'lines', { budget: 150, keep: 15 })
      const { finds, state } = advance(problem, startState(problem, 2), 150)
      const form = problem.polytopes.at(0)
      expect(finds.length).toBe(15)
      for (const { classKey, heights, outcome } of finds) {
        const cls = fineClass(form.polytope, heights)
        if (cls === undefined) throw new Error('listed heights are fine')
        expect(isGeneric(cls, heights)).toBe(true)
        const canonical = canonicalClass(form, cls)
        expect([canonical.key, canonical.class]).toEqual([classKey, cls])
        expect(outcome).toEqual(evaluateRule(problem.rule, buildCandidate(form, cls, classKey)))
      }
      expect(new Set(finds.map(({ classKey }) => classKey)).size).toBe(15)
      expect(state.feasible + state.infeasible + state.undefined).toBe(150)
    },
  )

  it('count every class once, whichever road it is met on', () => {
    const problem = problemOf(['r5-1819'], 'score sum(d in divisors : d.cubic)', 'lines', {
      budget: 5000,
      keep: 500,
      patience: 300,
    })
    const { state } = advance(problem, startState(problem, 1), 5000)
    expect(state.ended).toBe('space-exhausted')
    const all = problemOf(['r5-1819'], 'score sum(d in divisors : d.cubic)', 'exhaustive', {
      budget: 5000,
      keep: 500,
    })
    const whole = advance(all, startState(all, 1), 5000).state
    expect(state.evaluations).toBe(state.top.length)
    expect(state.top.map(({ classKey }) => classKey).sort()).toEqual(
      whole.top.map(({ classKey }) => classKey).sort(),
    )
    expect(bundledEntry('r5-1819').key).toBe(state.top[0].polytopeKey)
  })
})
