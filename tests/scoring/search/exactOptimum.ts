import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromWeights } from '../../../scoring/geometry/weights.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { OutcomeMemo } from '../../../scoring/search/memo.ts'
import { feasibleKind, meritOf } from '../../../scoring/search/merit.ts'
import type { MethodName } from '../../../scoring/search/methods.ts'
import { polytopeSource, type PolytopeSource } from '../../../scoring/search/polytopeSource.ts'
import { searchSettingsSchema } from '../../../scoring/search/settings.ts'
import { ruleOf } from './problems.ts'

/** A polytope by its weight system, and how many 2-face classes it has before symmetry. */
interface NamedPolytope {
  readonly name: string
  readonly weights: readonly number[]
  readonly side: 'fan' | 'newton'
  readonly classes: number
}

/** Two of the bundled ones, the only ones with 1,000 to 10,000 classes, and three more. Classes counted by us. */
export const namedPolytopes: readonly NamedPolytope[] = [
  { name: '5,7,7,8,9 newton', weights: [5, 7, 7, 8, 9], side: 'newton', classes: 2520 },
  { name: '1,2,5,7,7 fan', weights: [1, 2, 5, 7, 7], side: 'fan', classes: 1560 },
  { name: '1,4,5,6,7 fan', weights: [1, 4, 5, 6, 7], side: 'fan', classes: 1800 },
  { name: '2,3,5,5,8 fan', weights: [2, 3, 5, 5, 8], side: 'fan', classes: 2646 },
  { name: '1,1,3,7,10 fan', weights: [1, 1, 3, 7, 10], side: 'fan', classes: 4992 },
]

export const optimumRules = {
  divisor: 'score log10(metric.divisor.top)',
  basis: 'score log10(metric.basis.top)',
  pattern: 'score count(p in pairs where p.aab == -1 and p.abb == -1 : p.a.rigid and p.b.rigid)',
} as const

export interface ExactOptimum {
  readonly best: number
  /** Distinct candidates, modulo automorphisms. */
  readonly candidates: number
  /** A tenth of them. */
  readonly budget: number
  readonly polytopes: PolytopeSource
  readonly rule: string
  readonly memo: OutcomeMemo
}

/** The best score of all candidates, by enumeration. */
export function exactOptimum({ weights, side, classes }: NamedPolytope, rule: string): ExactOptimum {
  const form = normalForm(polytopeFromWeights(weights, side))
  const vertices = Array.from({ length: form.polytope.vertexCount }, (_, v) => [
    ...form.polytope.points.subarray(4 * v, 4 * v + 4),
  ])
  const polytopes = polytopeSource([{ key: form.key, vertices }])
  const memo = new OutcomeMemo(classes)
  const settings = searchSettingsSchema.parse({ budget: classes, keep: 1, sample: 0 })
  const problem = { polytopes, rule: ruleOf(rule), method: 'exhaustive' as const, settings }
  const { state } = advance(problem, startState(problem, 1), Infinity, { memo })
  if (state.ended !== 'space-exhausted') throw new Error('the enumeration did not end')
  const best = state.curve[state.curve.length - 1][1]
  const candidates = state.evaluations
  return { best, candidates, budget: Math.floor(candidates / 10), polytopes, rule, memo }
}

/** Evaluations until a search with that budget has found the optimum; null when it has not. */
export function searchFor(optimum: ExactOptimum, method: MethodName, seed: number): number | null {
  const { polytopes, rule, memo, best, budget } = optimum
  const settings = searchSettingsSchema.parse({ budget, keep: 1, sample: 0 })
  const problem = { polytopes, rule: ruleOf(rule), method, settings }
  let count = 0
  let found: number | null = null
  advance(problem, startState(problem, seed), Infinity, {
    memo,
    observe({ outcome }) {
      count++
      const { kind, value } = meritOf(outcome)
      if (found === null && kind === feasibleKind && value >= best) found = count
    },
  })
  return found
}
