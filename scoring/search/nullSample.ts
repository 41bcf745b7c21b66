import type { CheckedRule } from '../rules/checkedRule.ts'
import { advance, startState } from './advance.ts'
import { Histogram, type HistogramView } from './histogram.ts'
import type { IslandHooks } from './island.ts'
import { feasibleKind } from './merit.ts'
import { lawOfState, lawText, usualNullLaw, type NullLawName } from './nullLaws.ts'
import type { SearchProblem } from './problem.ts'
import { rankedScores, type RankedScores } from './rankedScores.ts'
import { searchSettingsSchema } from './settings.ts'
import type { SearchState } from './state.ts'
import { bestRange, expectedBest, medianOf, quantileOf, rateOf, type Rate } from './statistics.ts'

/** Most candidates of one null sample. */
export const nullSizeLimit = 10_000

/** The same rule on candidates that nobody selected, summed up. */
export interface NullSummary {
  /** Name and description of the law by which they were drawn. */
  readonly law: string
  readonly seed: number
  /** Distinct candidates asked for, and evaluated. */
  readonly size: number
  readonly evaluated: number
  /** All evaluated, or none is left to find. */
  readonly complete: boolean
  readonly feasible: number
  readonly infeasible: number
  readonly undefined: number
  /** Of those that have a score. */
  readonly median: number | null
  readonly best: number | null
  /** 99 % quantile; candidates without a score rank below all others. */
  readonly quantile99: number | null
  /** The same at 99.9 %. */
  readonly quantile999: number | null
  readonly histogram: HistogramView | null
  /** Rate of the rule's `hit`, or without one of scores above `quantile99`. */
  readonly hit: Rate | null
  readonly hitLine: 'rule' | 'quantile'
  /** Expected best score among n distinct candidates: [n, score]. See `expectedBest`. */
  readonly expectedBest: readonly (readonly [number, number])[]
  /** 90 % range of the best score among n candidates: [n, low, high]. See `bestRange`. */
  readonly bestRange: readonly (readonly [n: number, low: number, high: number | null])[]
  /** How many candidates are at least as good as a score. */
  readonly ranked: RankedScores
}

/** The problem whose run is a null sample of `size` candidates: method random, every evaluation kept. */
export function nullProblem(
  scope: Pick<SearchProblem, 'polytopes' | 'rule'>,
  size: number,
  keep = 20,
  law: NullLawName = usualNullLaw,
): SearchProblem {
  return {
    polytopes: scope.polytopes,
    rule: scope.rule,
    method: 'random',
    settings: searchSettingsSchema.parse({ budget: size, islands: 1, keep, sample: size, law }),
  }
}

/**
 * Draws a null sample to its end. In portions: `startState` of `nullProblem`, `advance` as often as needed, and
 * `nullSummary` of each state.
 */
export function nullSample(
  scope: Pick<SearchProblem, 'polytopes' | 'rule'>,
  seed: number,
  size: number,
  hooks: IslandHooks = {},
  law: NullLawName = usualNullLaw,
): { readonly state: SearchState; readonly summary: NullSummary } {
  const problem = nullProblem(scope, size, undefined, law)
  const { state } = advance(problem, startState(problem, seed), size, hooks)
  return { state, summary: nullSummary(state, scope.rule) }
}

/** @param state of a run of `nullProblem`, at any time */
export function nullSummary(state: SearchState, rule: Pick<CheckedRule, 'hit'>): NullSummary {
  const scores = state.sample.rows
    .filter((row) => row.kind === feasibleKind)
    .map((row) => row.value)
    .sort((a, b) => a - b)
  const evaluated = state.evaluations
  const quantile99 = quantileOf(scores, evaluated, 0.99)
  const above = quantile99 === null ? null : scores.filter((score) => score > quantile99).length
  const hits = rule.hit === null ? above : state.hits
  return {
    law: lawText(lawOfState(state.chain)),
    seed: state.seed,
    size: state.budget,
    evaluated,
    complete: evaluated >= state.budget || state.ended !== null,
    feasible: state.feasible,
    infeasible: state.infeasible,
    undefined: state.undefined,
    median: medianOf(scores),
    best: scores.at(-1) ?? null,
    quantile99,
    quantile999: quantileOf(scores, evaluated, 0.999),
    histogram: new Histogram(state.histogram).view(),
    hit: hits === null ? null : rateOf(hits, evaluated),
    hitLine: rule.hit === null ? 'quantile' : 'rule',
    expectedBest: sizesUpTo(evaluated).flatMap((n) => {
      const score = expectedBest(scores, evaluated, n)
      return score === null ? [] : [[n, score] as const]
    }),
    bestRange: sizesUpTo(evaluated).flatMap((n) => {
      const range = bestRange(scores, evaluated, n)
      return range === null ? [] : [[n, ...range] as const]
    }),
    ranked: rankedScores(scores),
  }
}

/** 1, 2, 3, 5, 7, 10, 15, 20, 30, ... up to n, and n. */
function sizesUpTo(n: number): number[] {
  const sizes = new Set<number>()
  for (let decade = 1; decade <= n; decade *= 10) {
    for (const factor of [1, 1.5, 2, 3, 5, 7]) {
      const size = Math.floor(factor * decade)
      if (size <= n) sizes.add(size)
    }
  }
  if (n > 0) sizes.add(n)
  return [...sizes].sort((a, b) => a - b)
}
