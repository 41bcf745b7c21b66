import { In, type EntityManager } from 'typeorm'
import { overlapSizes, type Comparison, type SharedCandidate } from '../../shared/comparisons.ts'
import { CandidateRecord } from '../entities/candidate.ts'
import { Find } from '../entities/find.ts'
import { Search } from '../entities/search.ts'
import { outcomesOf } from './finds.ts'
import { readSearch } from './searches.ts'

/** Shared candidates that are listed. */
const listed = 100

/** Searches of one campaign side by side, with what the lists of their best have in common. */
export async function compareSearches(
  manager: EntityManager,
  campaignId: string,
  ids: readonly string[],
): Promise<Comparison> {
  const searches: Comparison['searches'] = []
  for (const id of ids) {
    const { top, shortlists, events, ...search } = await readSearch(manager, campaignId, id)
    void [top, shortlists, events]
    searches.push(search)
  }
  const records = await manager.find(Search, {
    select: { id: true, scopeHash: true, scoringHash: true },
    where: { id: In([...ids]) },
  })
  const scorings = new Set(records.map(({ scoringHash }) => scoringHash))
  const scopes = new Set(records.map(({ scopeHash }) => scopeHash))
  const sameScoring = scorings.size === 1
  const ranks = await ranksOf(manager, ids)
  const shared = sharedCandidates(ranks)
  return {
    searches,
    sameScoring,
    sameNull: sameScoring && scopes.size === 1,
    overlaps: overlapSizes.map((best) => ({ best, shared: overlap(ranks, best) })),
    shared: await described(manager, shared.slice(0, listed), sameScoring ? records[0].scoringHash : null),
    sharedTotal: shared.length,
  }
}

/** For each search, its kept candidates with their ranks from 1. */
async function ranksOf(manager: EntityManager, ids: readonly string[]): Promise<Map<string, number>[]> {
  const finds = await manager.find(Find, {
    select: { searchId: true, candidateKey: true, rank: true },
    where: { searchId: In([...ids]) },
  })
  return ids.map(
    (id) =>
      new Map(
        finds.filter(({ searchId }) => searchId === id).map(({ candidateKey, rank }) => [candidateKey, rank]),
      ),
  )
}

/** The matrix of how many of the best candidates each two searches have in common. */
export function overlap(ranks: readonly ReadonlyMap<string, number>[], best: number): number[][] {
  const tops = ranks.map((rank) => [...rank].filter(([, place]) => place <= best).map(([key]) => key))
  return tops.map((keys) =>
    ranks.map((other) => keys.filter((key) => (other.get(key) ?? Infinity) <= best).length),
  )
}

export type SharedRanks = Pick<SharedCandidate, 'candidateKey' | 'ranks'>

/** Candidates kept by at least two searches: by their best rank, then by the sum of ranks, then by key. */
export function sharedCandidates(ranks: readonly ReadonlyMap<string, number>[]): SharedRanks[] {
  const keys = new Set(ranks.flatMap((rank) => [...rank.keys()]))
  return [...keys]
    .map((candidateKey) => {
      const places = ranks.map((rank) => rank.get(candidateKey) ?? null)
      const held = places.filter((place) => place !== null)
      return { candidateKey, ranks: places, held, sum: held.reduce((a, b) => a + b, 0) }
    })
    .filter(({ held }) => held.length > 1)
    .sort(
      (a, b) =>
        Math.min(...a.held) - Math.min(...b.held) ||
        b.held.length - a.held.length ||
        a.sum - b.sum ||
        (a.candidateKey < b.candidateKey ? -1 : 1),
    )
    .map(({ candidateKey, ranks: places }) => ({ candidateKey, ranks: places }))
}

async function described(
  manager: EntityManager,
  rows: readonly SharedRanks[],
  scoringHash: string | null,
): Promise<SharedCandidate[]> {
  const keys = rows.map(({ candidateKey }) => candidateKey)
  const candidates = await manager.find(CandidateRecord, {
    where: { key: In(keys) },
    relations: { polytope: true },
  })
  const byKey = new Map(candidates.map((candidate) => [candidate.key, candidate]))
  const outcomes = scoringHash === null ? new Map() : await outcomesOf(manager, scoringHash, keys)
  return rows.flatMap(({ candidateKey, ranks }) => {
    const polytope = byKey.get(candidateKey)?.polytope
    if (!polytope) return []
    const { key: polytopeKey, h11, h21 } = polytope
    return [{ candidateKey, polytopeKey, h11, h21, ranks, outcome: outcomes.get(candidateKey) ?? null }]
  })
}
