import { In, type EntityManager } from 'typeorm'
import type { OutcomeView } from '../../shared/outcomes.ts'
import type { ShortlistProvenance } from '../../shared/shortlists.ts'
import { CandidateValue } from '../entities/candidateValue.ts'
import { Rescoring } from '../entities/rescoring.ts'
import { Search } from '../entities/search.ts'
import { Shortlist } from '../entities/shortlist.ts'
import type { TargetVersion } from '../entities/targetVersion.ts'
import { heldBy, nextBeat, thisProcess } from '../jobs/lease.ts'
import type { DrawnList, Entrant } from './assemblies.ts'
import { insertShortlist } from './shortlistCommits.ts'
import { frozenSearches } from './shortlistGround.ts'

const open = In(['queued', 'running'])

/**
 * Takes a request that is free (`holder` null) or was left behind by `holder` for this process; false when it was
 * cancelled or taken by another process meanwhile.
 */
export async function takeRescoring(
  manager: EntityManager,
  id: string,
  holder: string | null,
): Promise<boolean> {
  const { affected } = await manager.update(
    Rescoring,
    { id, state: open, leaseOwner: heldBy(holder) },
    { state: 'running', leaseOwner: thisProcess, leaseBeat: nextBeat },
  )
  return affected !== 0
}

/** Stores values; false when the request has been cancelled: the values are kept all the same. */
export async function commitValues(
  manager: EntityManager,
  id: string,
  scoringHash: string,
  outcomes: readonly { readonly candidateKey: string; readonly outcome: OutcomeView }[],
): Promise<boolean> {
  if (outcomes.length > 0) {
    await manager.upsert(
      CandidateValue,
      outcomes.map(({ candidateKey, outcome }) => ({ candidateKey, scoringHash, outcome })),
      ['candidateKey', 'scoringHash'],
    )
  }
  return takeRescoring(manager, id, thisProcess)
}

export async function failRescoring(manager: EntityManager, id: string, failure: string): Promise<void> {
  await manager.update(
    Rescoring,
    { id, state: open },
    { state: 'failed', failure, leaseOwner: null, leaseBeat: null, finishedAt: new Date().toISOString() },
  )
}

interface PlacedEntrant extends Entrant {
  readonly rank: number
  readonly front: number | null
  readonly outcome: OutcomeView
}

/** Places of a list, best first. */
export async function entriesOf(manager: EntityManager, shortlistId: string): Promise<PlacedEntrant[]> {
  const rows = await manager.query<(Omit<PlacedEntrant, 'outcome'> & { outcome: string })[]>(
    `SELECT e.candidateKey AS candidateKey, c.polytopeKey AS polytopeKey, e.searchId AS searchId,
       e.rank AS rank, e.front AS front, e.outcome AS outcome
     FROM shortlist_entry e JOIN candidate c ON c."key" = e.candidateKey
     WHERE e.shortlistId = ? ORDER BY e.rank`,
    [shortlistId],
  )
  return rows.map((row) => ({ ...row, outcome: JSON.parse(row.outcome) as OutcomeView }))
}

/** Where the candidates of a request come from. */
interface RescoringSource {
  readonly searches: readonly Search[]
  readonly from: Shortlist | null
  /** The list that this makes a newer issue of. */
  readonly reissueOf: Shortlist | null
  /** Places in the list that is scored anew. */
  readonly previous: ReadonlyMap<string, { readonly rank: number; readonly outcome: OutcomeView }>
}

/** Entries by candidate key. */
export const placesOf = <Entry extends { readonly candidateKey: string }>(
  entries: readonly Entry[],
): Map<string, Entry> => new Map(entries.map((entry) => [entry.candidateKey, entry]))

async function sourceOf(manager: EntityManager, { origin }: Rescoring): Promise<RescoringSource> {
  const relations = { targetVersion: { target: true } } as const
  const searchesOf = async (ids: readonly string[]) => {
    const searches = await manager.find(Search, { where: { id: In([...ids]) }, relations })
    return searches.sort((a, b) => ids.indexOf(a.id) - ids.indexOf(b.id))
  }
  if ('searchIds' in origin) {
    const { searchIds, reissueOf: id } = origin
    const reissueOf = id === undefined ? null : await manager.findOneByOrFail(Shortlist, { id })
    return {
      searches: await searchesOf(searchIds),
      from: null,
      reissueOf,
      previous: placesOf(id === undefined ? [] : await entriesOf(manager, id)),
    }
  }
  const from = await manager.findOneOrFail(Shortlist, { where: { id: origin.shortlistId }, relations })
  const entries = await entriesOf(manager, from.id)
  return {
    searches: await searchesOf(from.searchIds),
    from,
    reissueOf: null,
    previous: placesOf(entries),
  }
}

/** Stores the list and ends the request, all or nothing; null when it was cancelled meanwhile. */
export async function commitRescoring(
  manager: EntityManager,
  rescoring: Rescoring,
  scoring: { readonly version: TargetVersion; readonly scoringHash: string; readonly engineVersion: string },
  { chosen, counts }: DrawnList,
): Promise<string | null> {
  if (!(await takeRescoring(manager, rescoring.id, thisProcess))) return null
  const { searches, from, reissueOf, previous } = await sourceOf(manager, rescoring)
  const shortlistId = await insertShortlist(manager, {
    campaignId: rescoring.campaignId,
    authorId: rescoring.authorId,
    name: rescoring.name,
    ...scoring,
    searches,
    chosen,
    provenance: {
      assembly: rescoring.assembly,
      counts,
      searches: await frozenSearches(manager, searches, scoring.scoringHash),
      from: from && frozenList(from, previous.size),
    },
    previous,
    reissueOf: reissueOf ?? undefined,
  })
  await manager.update(
    Rescoring,
    { id: rescoring.id },
    {
      state: 'finished',
      shortlistId,
      broken: counts.leftOut.broken,
      leaseOwner: null,
      leaseBeat: null,
      finishedAt: new Date().toISOString(),
    },
  )
  return shortlistId
}

/** @param list with target version and target loaded */
function frozenList(list: Shortlist, size: number): ShortlistProvenance['from'] {
  const { id, name, targetVersion, scoringHash, engineVersion } = list
  return {
    id,
    name,
    targetName: targetVersion?.target?.name ?? '',
    targetVersion: targetVersion?.number ?? 0,
    scoringHash,
    engineVersion,
    rule: targetVersion?.text ?? '',
    size,
  }
}
