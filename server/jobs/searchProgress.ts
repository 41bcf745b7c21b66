import { hitsAbove, interleaved, islandBudget, mergedSurrogate } from '../../scoring/index.ts'
import type { SearchProgress } from '../../shared/searches.ts'
import { compareCandidates } from '../services/finds.ts'
import type { IslandFind } from '../services/searchCommits.ts'
import type { IslandProgress, SegmentFind } from './segment.ts'

export interface Pace {
  readonly evaluationsPerSecond: number | null
  readonly budget: number
  readonly hitLine: HitLine
}

/** What counts as a hit: what the rule says, or scores above a quantile of the null; null while that is not known. */
export type HitLine = 'rule' | number | null

/** The search's progress from that of its islands; the order in which these were reported does not matter. */
export function mergeProgress(islands: readonly (IslandProgress | null)[], pace: Pace): SearchProgress {
  const begun = islands.filter((island) => island !== null)
  const total = (
    name: 'evaluations' | 'proposals' | 'accepted' | 'restarts' | 'feasible' | 'infeasible' | 'undefined',
  ) => begun.reduce((sum, island) => sum + island[name], 0)
  const scored = begun.filter((island) => island.best !== null)
  const leader = scored.reduce<IslandProgress | null>(
    (best, island) => (best === null || Number(island.best) > Number(best.best) ? island : best),
    null,
  )
  const evaluations = total('evaluations')
  const { evaluationsPerSecond } = pace
  const shares = islands.map((island) => island?.budget ?? NaN)
  const sum = shares.reduce((total, share) => total + share, 0)
  // An exhaustive search has counted what there is to do, which may be less than it was allowed.
  const budget = Number.isNaN(sum) ? pace.budget : sum
  // What an exhausted island leaves of its share is never used.
  const left = islands.reduce(
    (all, island, n) =>
      all +
      (island?.exhausted
        ? 0
        : Math.max(0, shareOf(pace.budget, islands.length, n, island) - (island?.evaluations ?? 0))),
    0,
  )
  return {
    budget,
    given: begun.reduce((all, island) => all + (island.given ?? 0), 0),
    evaluations,
    proposals: total('proposals'),
    accepted: total('accepted'),
    restarts: total('restarts'),
    feasible: total('feasible'),
    infeasible: total('infeasible'),
    undefined: total('undefined'),
    best: leader?.best ?? null,
    bestKey: leader?.bestKey ?? null,
    curve: interleaved(begun).map(([at, score]) => [at, score]),
    islands: islands.map((island) => ({
      evaluations: island?.evaluations ?? 0,
      ...(island && islandHits(island, pace.hitLine)),
      ...(island?.given ? { given: island.given } : {}),
      best: island?.best ?? null,
      exhausted: island?.exhausted ?? false,
    })),
    surrogate: mergedSurrogate(begun.map((island) => island.surrogate ?? null)),
    exhausted: islands.every((island) => island?.exhausted === true),
    evaluationsPerSecond,
    secondsLeft: evaluationsPerSecond ? left / evaluationsPerSecond : null,
  }
}

/** What an island may evaluate: as it said itself, or its part of the whole before its first report. */
function shareOf(budget: number, islands: number, number: number, island: IslandProgress | null): number {
  return island?.budget ?? islandBudget({ budget, islands }, number)
}

/** An island's hits; none where they are not known, or not counted by the version that ran it. */
export function islandHits(
  { hits, histogram }: Pick<IslandProgress, 'hits' | 'histogram'>,
  line: HitLine,
): { hits?: number; unsure?: number } {
  if (line === 'rule') return hits === undefined ? {} : { hits }
  if (line === null || histogram === undefined) return {}
  const { hits: above, unsure } = hitsAbove(histogram, line)
  return unsure === 0 ? { hits: above } : { hits: above, unsure }
}

/**
 * The best distinct candidates of all islands: what was known, with one island's list taken in. Since the lists
 * of islands only improve, the outcome does not depend on the order in which they come.
 */
export function mergeFinds(
  known: readonly IslandFind[],
  island: number,
  finds: readonly SegmentFind[],
  keep: number,
): IslandFind[] {
  const best = new Map(known.map((find) => [find.candidateKey, find]))
  for (const find of finds) {
    const earlier = best.get(find.candidateKey)
    if (!earlier || island < earlier.island) best.set(find.candidateKey, { ...find, island })
  }
  return [...best.values()].sort(compareCandidates).slice(0, keep)
}

/** Whether two lists name the same finds in the same order. */
export function sameFinds(a: readonly IslandFind[], b: readonly IslandFind[]): boolean {
  return (
    a.length === b.length &&
    a.every(({ candidateKey, island }, i) => candidateKey === b[i].candidateKey && island === b[i].island)
  )
}
