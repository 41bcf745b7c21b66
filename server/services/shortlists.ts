import { type EntityManager } from 'typeorm'
import {
  createShortlistSchema,
  type CreateShortlist,
  type DraftShortlist,
  type ShortlistDetail,
  type ShortlistDraft,
} from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import { Search } from '../entities/search.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { ShortlistEntry } from '../entities/shortlistEntry.ts'
import { emptyTally } from '../presenters/campaigns.ts'
import type { ExportedCandidate } from '../presenters/shortlistExports.ts'
import { presentShortlist } from '../presenters/shortlists.ts'
import { conflict, notFound } from '../problems.ts'
import { drawList, knownInvariants, scoredEntrants, type ScoredEntrant } from './assemblies.ts'
import { assignees } from './assignments.ts'
import { certificateMarks } from './certificates.ts'
import { externalOf } from './externalTables.ts'
import { compareCandidates } from './finds.ts'
import { ownNames } from './polytopes.ts'
import { earlierIssue, laterIssues } from './reissues.ts'
import { reportColumns } from './rules.ts'
import { insertShortlist } from './shortlistCommits.ts'
import { frozenSearches, readGround } from './shortlistGround.ts'
import { latestVerdicts, tallyShortlists } from './verdicts.ts'

const withWords = { author: true, targetVersion: { target: true } } as const

/** Newest first. */
export function listShortlists(manager: EntityManager, campaignId: string): Promise<Shortlist[]> {
  return manager.find(Shortlist, {
    where: { campaignId },
    relations: withWords,
    order: { createdAt: 'DESC', id: 'ASC' },
  })
}

export async function readShortlist(
  manager: EntityManager,
  campaignId: string,
  shortlistId: string,
): Promise<ShortlistDetail> {
  const shortlist = await manager.findOne(Shortlist, {
    where: { campaignId, id: shortlistId },
    relations: withWords,
  })
  if (!shortlist?.targetVersion) throw notFound('shortlist')
  // Heights and coordinates are most of what is stored, and none of it is shown.
  const entries = await manager.find(ShortlistEntry, {
    select: {
      shortlistId: true,
      rank: true,
      candidateKey: true,
      searchId: true,
      outcome: true,
      front: true,
      previousRank: true,
      previousOutcome: true,
      candidate: { key: true, polytope: { key: true, name: true, origin: true, h11: true, h21: true } },
    },
    where: { shortlistId },
    relations: { candidate: { polytope: true } },
    order: { rank: 'ASC' },
  })
  const keys = entries.map(({ candidateKey }) => candidateKey)
  const searches = await manager
    .createQueryBuilder(Search, 'search')
    .select(['search.id', 'search.name', 'search.seed'])
    .where('search.id IN (SELECT value FROM json_each(:ids))', { ids: JSON.stringify(shortlist.searchIds) })
    .getMany()
  return presentShortlist(shortlist, {
    tally: (await tallyShortlists(manager, [campaignId])).get(shortlistId) ?? emptyTally,
    searches: searches.sort((a, b) => shortlist.searchIds.indexOf(a.id) - shortlist.searchIds.indexOf(b.id)),
    rescored: await rescoredFrom(manager, campaignId, shortlistId),
    entries,
    verdicts: await latestVerdicts(manager, campaignId, shortlist.targetVersion.targetId, keys),
    certificateOf: await certificateMarks(manager, campaignId, shortlist.targetVersion, keys),
    names: await ownNames(manager, { campaignId }, polytopesOf(entries)),
    assignees: await assignees(manager, shortlist.targetVersion.targetId),
    reissueOf: await earlierIssue(manager, shortlist),
    reissues: await laterIssues(manager, shortlist),
    external: await externalOf(manager, campaignId, shortlistId, keys),
  })
}

function polytopesOf(entries: readonly ShortlistEntry[]): PolytopeRecord[] {
  const polytopes = entries.flatMap(({ candidate }) => (candidate?.polytope ? [candidate.polytope] : []))
  return [...new Map(polytopes.map((polytope) => [polytope.key, polytope])).values()]
}

/** The lists that were made from one by scoring it anew, oldest first. */
function rescoredFrom(
  manager: EntityManager,
  campaignId: string,
  shortlistId: string,
): Promise<ShortlistDetail['rescored']> {
  return manager.query(
    `SELECT s.id AS id, s.name AS name, t.name AS targetName, v.number AS targetVersion
     FROM shortlist s JOIN target_version v ON v.id = s.targetVersionId JOIN target t ON t.id = v.targetId
     WHERE s.campaignId = ? AND s.provenance ->> '$.from.id' = ? ORDER BY s.createdAt, s.id`,
    [campaignId, shortlistId],
  )
}

/** The candidates of a shortlist as an export carries them, best first. */
export async function exportedCandidates(
  manager: EntityManager,
  shortlistId: string,
): Promise<ExportedCandidate[]> {
  const entries = await manager.find(ShortlistEntry, {
    where: { shortlistId },
    relations: { candidate: { polytope: true } },
    order: { rank: 'ASC' },
  })
  return entries.flatMap(({ candidate }) =>
    candidate?.polytope
      ? [
          {
            candidateKey: candidate.key,
            polytopeKey: candidate.polytopeKey,
            vertices: candidate.polytope.coordinates,
            heights: candidate.heights,
          },
        ]
      : [],
  )
}

/**
 * Draws a list from the finds of searches and freezes it with all it was made from. Every find must have a score
 * under the version; where some have none, a re-scoring makes the list instead.
 */
export async function createShortlist(
  context: ServerContext,
  campaignId: string,
  authorId: string,
  input: CreateShortlist,
): Promise<ShortlistDetail> {
  const { source, writes, streams, jobs } = context
  const { name, searchIds, targetVersionId, ...assembly } = createShortlistSchema.parse(input)
  // In a transaction: a search that commits in between would make finds and counts disagree.
  const { ground, scored, searches } = await writes.transaction(async (manager) => {
    const ground = await readGround(manager, campaignId, { searchIds, targetVersionId })
    return {
      ground,
      scored: await scoredEntrants(manager, ground.scoringHash, ground.entrants),
      searches: await frozenSearches(manager, ground.searches, ground.scoringHash),
    }
  })
  const { version, scoringHash, engineVersion, finds, entrants } = ground
  if (scored.length < entrants.length) {
    throw conflict(
      'needs-scoring',
      `${entrants.length - scored.length} of ${entrants.length} candidates have no score under this version yet; ask for a re-scoring.`,
    )
  }
  const { chosen, counts } = await drawList(
    { manager: source.manager, pool: jobs.unhurried },
    { finds, broken: 0, entrants: scored },
    assembly,
    reportColumns(version.text),
  )
  const id = await writes.transaction((manager) =>
    insertShortlist(manager, {
      campaignId,
      authorId,
      name,
      version,
      scoringHash,
      engineVersion,
      searches: ground.searches,
      chosen,
      provenance: { assembly, counts, searches, from: null },
    }),
  )
  streams.toCampaign(campaignId, { kind: 'changed', what: 'shortlists' })
  jobs.invariants.wake()
  return readShortlist(source.manager, campaignId, id)
}

/** Candidates of a draft that are shown. */
const draftRows = 20
/** Candidates whose basis-independent integers are asked for, when a draft limits them and they are missing. */
const wantLimit = 500

/** What a list would be if it were made now. */
export async function draftShortlist(
  { source, jobs }: ServerContext,
  campaignId: string,
  { searchIds, targetVersionId, ...assembly }: DraftShortlist,
  signal?: AbortSignal,
): Promise<ShortlistDraft> {
  const { manager } = source
  const ground = await readGround(manager, campaignId, { searchIds, targetVersionId })
  const { version, scoringHash, finds, entrants } = ground
  const columns = reportColumns(version.text)
  const scored = await scoredEntrants(manager, scoringHash, entrants)
  const draft = {
    targetVersionId: version.id,
    columns,
    distinct: entrants.length,
    scored: scored.length,
  }
  if (scored.length < entrants.length) return { ...draft, counts: null, size: 0, best: [] }
  const from = { finds, broken: 0, entrants: scored }
  const list = await drawList({ manager, pool: jobs.unhurried }, from, assembly, columns, signal)
  if (assembly.perInvariants !== null) jobs.invariants.want(await missingInvariants(manager, scored))
  return {
    ...draft,
    counts: list.counts,
    size: list.chosen.length,
    best: await describe(manager, campaignId, list.chosen.slice(0, draftRows)),
  }
}

async function missingInvariants(
  manager: EntityManager,
  entrants: readonly ScoredEntrant[],
): Promise<string[]> {
  const known = await knownInvariants(manager, entrants)
  return [...entrants]
    .sort(compareCandidates)
    .map(({ candidateKey }) => candidateKey)
    .filter((key) => !known.has(key))
    .slice(0, wantLimit)
}

async function describe(
  manager: EntityManager,
  campaignId: string,
  rows: readonly (ScoredEntrant & { readonly front: number | null })[],
): Promise<ShortlistDraft['best']> {
  const polytopes = await manager
    .createQueryBuilder(PolytopeRecord, 'polytope')
    .select(['polytope.key', 'polytope.name', 'polytope.origin', 'polytope.h11', 'polytope.h21'])
    .where('polytope.key IN (SELECT value FROM json_each(:keys))', {
      keys: JSON.stringify(rows.map(({ polytopeKey }) => polytopeKey)),
    })
    .getMany()
  const names = await ownNames(manager, { campaignId }, polytopes)
  const byKey = new Map(polytopes.map((polytope) => [polytope.key, polytope]))
  return rows.flatMap(({ candidateKey, polytopeKey, outcome, front }) => {
    const polytope = byKey.get(polytopeKey)
    if (!polytope) return []
    const { name, h11, h21 } = polytope
    return [
      { candidateKey, polytopeKey, polytopeName: names.get(polytopeKey) ?? name, h11, h21, outcome, front },
    ]
  })
}
