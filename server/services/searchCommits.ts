import type { SampledRow } from '../../scoring/index.ts'
import { In, type EntityManager } from 'typeorm'
import type { SearchProgress } from '../../shared/searches.ts'
import { Search } from '../entities/search.ts'
import { SearchIsland } from '../entities/searchIsland.ts'
import { heldBy, nextBeat, thisProcess } from '../jobs/lease.ts'
import type { SegmentFind, SegmentOutput } from '../jobs/segment.ts'
import { recordSearchEvent } from './searchEvents.ts'

/** A find of a search with the lowest island that made it. */
export interface IslandFind extends SegmentFind {
  readonly island: number
}

export interface SegmentCommit {
  readonly searchId: string
  readonly scoringHash: string
  readonly island: number
  /** Segments this island had committed when the segment began. */
  readonly segment: number
  readonly output: SegmentOutput
  readonly progress: SearchProgress
  /** The search's best distinct candidates, when they changed. */
  readonly finds: readonly IslandFind[] | null
  readonly finished: boolean
}

/**
 * Commits a segment: the island's state, the search's progress and its finds, all or nothing. A segment that
 * ended after the search was paused is kept, too; one of a cancelled search is not, nor one of a search that another
 * process works on now. Returns the search's state
 * afterwards, or null when nothing was committed.
 */
export async function commitSegment(
  manager: EntityManager,
  commit: SegmentCommit,
): Promise<Search['state'] | null> {
  const { searchId, island, segment, output, progress, finds } = commit
  const search = await manager.findOne(Search, {
    select: { id: true, state: true, leaseOwner: true },
    where: { id: searchId },
  })
  if (search === null || search.state === 'cancelled') return null
  // Another process took it over while this one gave no sign of life.
  if (search.leaseOwner !== null && search.leaseOwner !== thisProcess) return null
  const { affected } = await manager.update(
    SearchIsland,
    { searchId, number: island, segment },
    {
      segment: segment + 1,
      state: output.state,
      progress: JSON.stringify(output.progress),
      done: output.done,
    },
  )
  if (affected === 0) return null
  if (finds !== null) await storeFinds(manager, commit.searchId, commit.scoringHash, finds)
  await storeSampled(manager, searchId, island, output.sampled)
  const active = search.state === 'running' || search.state === 'queued'
  const state = commit.finished ? 'finished' : active ? 'running' : search.state
  const holding = state === 'running'
  await manager.update(
    Search,
    { id: searchId },
    {
      state,
      progress,
      evaluations: progress.evaluations,
      best: progress.best,
      workMilliseconds: () => `workMilliseconds + ${Math.round(output.milliseconds)}`,
      leaseOwner: holding ? thisProcess : null,
      leaseBeat: holding ? nextBeat : null,
      ...(state === 'finished' ? { finishedAt: new Date().toISOString() } : {}),
    },
  )
  if (state === 'finished') await recordSearchEvent(manager, searchId, 'finished')
  return state
}

/**
 * Takes a search that is free (`holder` null) or was left behind by `holder` for this process; false when it was
 * paused, cancelled or taken by another process meanwhile.
 */
export async function takeLease(
  manager: EntityManager,
  searchId: string,
  holder: string | null,
): Promise<boolean> {
  const before = await manager.findOne(Search, {
    select: { id: true, evaluations: true },
    where: { id: searchId },
  })
  const { affected } = await manager.update(
    Search,
    { id: searchId, state: In(['queued', 'running']), leaseOwner: heldBy(holder) },
    { state: 'running', leaseOwner: thisProcess, leaseBeat: nextBeat },
  )
  if (!affected) return false
  if (holder !== null && holder !== thisProcess) await recordSearchEvent(manager, searchId, 'taken-over')
  else if (before?.evaluations === 0) await recordSearchEvent(manager, searchId, 'started')
  return true
}

/** Keeps what was committed, and says why the search cannot go on. */
export async function failSearch(
  manager: EntityManager,
  searchId: string,
  failure: { readonly code: string; readonly message: string },
): Promise<void> {
  const { affected } = await manager.update(
    Search,
    { id: searchId, state: In(['queued', 'running']) },
    {
      state: 'failed',
      failureCode: failure.code,
      failureMessage: failure.message,
      leaseOwner: null,
      leaseBeat: null,
      finishedAt: new Date().toISOString(),
    },
  )
  if (affected) await recordSearchEvent(manager, searchId, 'failed', { note: failure.message })
}

/** Puts the finds of a search in the place of those it had. */
export async function storeFinds(
  manager: EntityManager,
  searchId: string,
  scoringHash: string,
  finds: readonly IslandFind[],
): Promise<void> {
  const before = await manager.query<{ candidateKey: string }[]>(
    'SELECT candidateKey FROM find WHERE searchId = ?',
    [searchId],
  )
  const known = new Set(before.map(({ candidateKey }) => candidateKey))
  await storeCandidates(
    manager,
    scoringHash,
    finds.filter(({ candidateKey }) => !known.has(candidateKey)),
  )
  await manager.query('DELETE FROM find WHERE searchId = ?', [searchId])
  const rows = finds.map(({ candidateKey, island }, place) => [candidateKey, place + 1, island])
  await manager.query(
    `INSERT INTO find (searchId, candidateKey, rank, island)
     SELECT ?, value ->> 0, value ->> 1, value ->> 2 FROM json_each(?)`,
    [searchId, JSON.stringify(rows)],
  )
}

/** A later row of a place replaces the one before. */
async function storeSampled(
  manager: EntityManager,
  searchId: string,
  island: number,
  sampled: readonly SampledRow[],
): Promise<void> {
  if (sampled.length === 0) return
  const rows = sampled.map((row) => [
    row.place,
    row.classKey,
    row.polytopeKey,
    row.kind,
    row.value,
    row.heights,
  ])
  await manager.query(
    `INSERT OR REPLACE INTO search_sample
       (searchId, island, place, candidateKey, polytopeKey, kind, value, heights)
     SELECT ?, ?, value ->> 0, value ->> 1, value ->> 2, value ->> 3, value ->> 4, value ->> 5 FROM json_each(?)`,
    [searchId, island, JSON.stringify(rows)],
  )
}

/**
 * Candidates are stored once; their values once per scoring hash. The rows go to SQLite as one JSON text: built
 * one by one they would hold up the requests that wait for the same thread.
 */
export async function storeCandidates(
  manager: EntityManager,
  scoringHash: string,
  finds: readonly SegmentFind[],
): Promise<void> {
  if (finds.length === 0) return
  await storeHeights(manager, finds)
  const values = finds.map(({ candidateKey, outcome }) => [candidateKey, JSON.stringify(outcome)])
  await manager.query(
    `INSERT OR IGNORE INTO candidate_value (candidateKey, scoringHash, outcome)
     SELECT value ->> 0, ?, value ->> 1 FROM json_each(?)`,
    [scoringHash, JSON.stringify(values)],
  )
}

/** Candidates with heights that tie nowhere; those that are stored keep theirs. */
export async function storeHeights(
  manager: EntityManager,
  finds: readonly Pick<SegmentFind, 'candidateKey' | 'polytopeKey' | 'heights'>[],
): Promise<void> {
  const candidates = finds.map(({ candidateKey, polytopeKey, heights }) => [
    candidateKey,
    polytopeKey,
    JSON.stringify(heights),
  ])
  await manager.query(
    `INSERT OR IGNORE INTO candidate ("key", polytopeKey, heights)
     SELECT value ->> 0, value ->> 1, value ->> 2 FROM json_each(?)`,
    [JSON.stringify(candidates)],
  )
}
