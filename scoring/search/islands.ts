import { compareOutcomes } from '../rules/outcome.ts'
import { findOf, type Find, type KeptFind } from './find.ts'
import { Histogram, type HistogramView } from './histogram.ts'
import type { PolytopeSource } from './polytopeSource.ts'
import type { SearchProblem } from './problem.ts'
import { mergedProgress, type SearchProgressReport } from './progress.ts'
import type { SearchState } from './state.ts'

/** Islands taken together. */
export interface MergedIslands {
  readonly progress: SearchProgressReport
  /** The best distinct candidates over all islands, best first. */
  readonly top: readonly Find[]
  readonly histogram: HistogramView | null
  /** Reasons of undefined candidates, and failed requirements, with how many candidates had each. */
  readonly reasons: readonly (readonly [string, number])[]
  readonly failures: readonly (readonly [string, number])[]
}

/**
 * Merges the states of a search's islands, in the order of islands. Evaluations are added up: a class that two
 * islands scored counts twice there and once in the list of the best.
 *
 * @param source the polytopes of the search; without it heights are left as they are in the states, and may tie
 *   in facets
 */
export function mergeIslands(
  states: readonly SearchState[],
  keep = Infinity,
  source?: PolytopeSource,
  problem?: Pick<SearchProblem, 'settings' | 'extensions'>,
): MergedIslands {
  const ordered = [...states].sort((a, b) => a.island - b.island)
  const histogram = new Histogram()
  for (const state of ordered) histogram.addAll(state.histogram)
  return {
    progress: mergedProgress(ordered, problem),
    top: mergedTop(ordered, keep).map((row) => findOf(row, source)),
    histogram: histogram.view(),
    reasons: added(ordered.map((state) => state.reasons)),
    failures: added(ordered.map((state) => state.failures)),
  }
}

function mergedTop(states: readonly SearchState[], keep: number): readonly KeptFind[] {
  const byKey = new Map<string, KeptFind>()
  for (const state of states) {
    // Islands reach a class by other heights; the first one's are kept.
    for (const row of state.top) if (!byKey.has(row.classKey)) byKey.set(row.classKey, row)
  }
  return [...byKey.values()]
    .sort((a, b) => compareOutcomes(a.outcome, a.classKey, b.outcome, b.classKey))
    .slice(0, keep)
}

function added(lists: readonly (readonly (readonly [string, number])[])[]): [string, number][] {
  const sums = new Map<string, number>()
  for (const list of lists) for (const [name, count] of list) sums.set(name, (sums.get(name) ?? 0) + count)
  return [...sums].sort((a, b) => b[1] - a[1])
}
