import type { EntityManager } from 'typeorm'
import { startLimit, type GivenStart } from '../../scoring/index.ts'
import type { StartsFrom, StartsSource } from '../../shared/searchRunning.ts'
import type { CandidateRecord } from '../entities/candidate.ts'
import { Find } from '../entities/find.ts'
import { ImportedCandidate } from '../entities/importedCandidate.ts'
import { Search } from '../entities/search.ts'
import { SearchStart } from '../entities/searchStart.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { ShortlistEntry } from '../entities/shortlistEntry.ts'
import { notFound, unprocessable } from '../problems.ts'

/** Candidates to begin a search from, the best first, and what they are called. */
export interface ResolvedStarts {
  readonly kind: StartsFrom['kind']
  /** Of the shortlist or search. */
  readonly id: string | null
  readonly name: string
  readonly starts: readonly GivenStart[]
}

/**
 * The candidates a search is to begin from: entries of a shortlist by rank, the best of a search, or imported ones.
 *
 * @throws Refusal 404 for a list that the campaign does not have; 422 for candidates that are not on it, for none, and
 *   for more than 500
 */
export async function resolveStarts(
  manager: EntityManager,
  campaignId: string,
  source: StartsSource,
): Promise<ResolvedStarts> {
  if (source.kind === 'same') return sameStarts(manager, campaignId, source.id)
  const { name, candidates } = await listed(manager, campaignId, source)
  const wanted = 'candidateKeys' in source ? source.candidateKeys : undefined
  const chosen = wanted && new Set(wanted)
  const present = new Set(candidates.map(({ key }) => key))
  const missing = wanted?.find((key) => !present.has(key))
  if (missing !== undefined) {
    throw unprocessable('no-such-start', 'A candidate to begin from is not on this list.', {
      path: 'starts.candidateKeys',
      found: missing,
    })
  }
  const starts = candidates
    .filter(({ key }) => chosen === undefined || chosen.has(key))
    .map(({ key, polytopeKey, heights }) => ({ classKey: key, polytopeKey, heights }))
  if (starts.length === 0) {
    throw unprocessable('no-starts', 'There is no candidate on this list to begin from.', { path: 'starts' })
  }
  if (starts.length > startLimit) {
    throw unprocessable(
      'too-many-starts',
      `A search begins from at most ${startLimit} candidates, and these are ${starts.length}: select some of them.`,
      { path: 'starts', found: starts.length },
    )
  }
  return { kind: source.kind, id: 'id' in source ? source.id : null, name, starts }
}

/** What an earlier search began from. */
async function sameStarts(
  manager: EntityManager,
  campaignId: string,
  searchId: string,
): Promise<ResolvedStarts> {
  const search = await manager.findOneBy(Search, { campaignId, id: searchId })
  if (search === null) throw notFound('search')
  if (search.startsFrom === null) {
    throw unprocessable('no-starts', 'That search began by itself.', { path: 'starts' })
  }
  const { kind, id, name } = search.startsFrom
  return { kind, id, name, starts: await readStarts(manager, searchId) }
}

async function listed(
  manager: EntityManager,
  campaignId: string,
  source: Exclude<StartsSource, { kind: 'same' }>,
): Promise<{ readonly name: string; readonly candidates: readonly CandidateRecord[] }> {
  switch (source.kind) {
    case 'shortlist': {
      const shortlist = await manager.findOneBy(Shortlist, { campaignId, id: source.id })
      if (shortlist === null) throw notFound('shortlist')
      const entries = await manager.find(ShortlistEntry, {
        where: { shortlistId: source.id },
        relations: { candidate: true },
        order: { rank: 'ASC' },
      })
      return { name: shortlist.name, candidates: entries.flatMap(({ candidate }) => candidate ?? []) }
    }
    case 'search': {
      const search = await manager.findOneBy(Search, { campaignId, id: source.id })
      if (search === null) throw notFound('search')
      const finds = await manager.find(Find, {
        where: { searchId: source.id },
        relations: { candidate: true },
        order: { rank: 'ASC' },
        take: source.size,
      })
      return { name: search.name, candidates: finds.flatMap(({ candidate }) => candidate ?? []) }
    }
    case 'imported': {
      const rows = await manager.find(ImportedCandidate, {
        where: { campaignId },
        relations: { candidate: true },
        order: { createdAt: 'DESC', candidateKey: 'ASC' },
      })
      return { name: 'imported candidates', candidates: rows.flatMap(({ candidate }) => candidate ?? []) }
    }
  }
}

/** @throws Refusal start-outside-scope */
export function requireInScope(starts: readonly GivenStart[], polytopeKeys: readonly string[]): void {
  const scope = new Set(polytopeKeys)
  const outside = starts.filter(({ polytopeKey }) => !scope.has(polytopeKey))
  if (outside.length === 0) return
  const those = outside.length === starts.length ? 'None' : `${starts.length - outside.length}`
  throw unprocessable(
    'start-outside-scope',
    `${those} of the ${starts.length} candidates to begin from lie on polytopes of the scope. Take their polytopes into it, or begin from others.`,
    { path: 'starts', found: outside[0].polytopeKey },
  )
}

/** What a search that is there begins from, in order. */
export async function readStarts(manager: EntityManager, searchId: string): Promise<GivenStart[]> {
  const rows = await manager.find(SearchStart, { where: { searchId }, order: { place: 'ASC' } })
  return rows.map(({ candidateKey, polytopeKey, heights }) => ({
    polytopeKey,
    classKey: candidateKey,
    heights,
  }))
}

export async function storeStarts(
  manager: EntityManager,
  searchId: string,
  starts: readonly GivenStart[],
): Promise<void> {
  const rows = starts.map(({ classKey, polytopeKey, heights }, n) => [
    n + 1,
    classKey,
    polytopeKey,
    JSON.stringify(heights),
  ])
  await manager.query(
    `INSERT INTO search_start (searchId, place, candidateKey, polytopeKey, heights)
     SELECT ?, value ->> 0, value ->> 1, value ->> 2, value ->> 3 FROM json_each(?)`,
    [searchId, JSON.stringify(rows)],
  )
}
