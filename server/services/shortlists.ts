import { randomUUID } from 'node:crypto'
import { In, type EntityManager } from 'typeorm'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import { Search } from '../entities/search.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { ShortlistEntry } from '../entities/shortlistEntry.ts'
import { emptyTally } from '../presenters/campaigns.ts'
import type { ExportedCandidate } from '../presenters/shortlistExports.ts'
import { presentShortlist } from '../presenters/shortlists.ts'
import { notFound, unprocessable } from '../problems.ts'
import { certificateMarks } from './certificates.ts'
import type { HitLine } from '../jobs/searchProgress.ts'
import { rankedFinds, withHitLine } from './finds.ts'
import { readHitLine } from './nullSamples.ts'
import { ownNames } from './polytopes.ts'
import { reportColumns } from './rules.ts'
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
  const entries = await manager.find(ShortlistEntry, {
    where: { shortlistId },
    relations: { candidate: { polytope: true } },
    order: { rank: 'ASC' },
  })
  const keys = entries.map(({ candidateKey }) => candidateKey)
  const polytopes = entries.flatMap(({ candidate }) => (candidate?.polytope ? [candidate.polytope] : []))
  const searches = await manager.findBy(Search, { id: In(shortlist.searchIds) })
  return presentShortlist(shortlist, {
    tally: (await tallyShortlists(manager, [campaignId])).get(shortlistId) ?? emptyTally,
    searches: searches.sort((a, b) => shortlist.searchIds.indexOf(a.id) - shortlist.searchIds.indexOf(b.id)),
    entries,
    verdicts: await latestVerdicts(manager, campaignId, shortlist.targetVersion.targetId, keys),
    certificateOf: await certificateMarks(manager, campaignId, shortlist.targetVersion, keys),
    names: await ownNames(manager, { campaignId }, polytopes),
  })
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

/** Freezes the best distinct candidates of searches of one target version, in the order of the language. */
export async function createShortlist(
  context: ServerContext,
  campaignId: string,
  authorId: string,
  input: { name: string; searchIds: string[]; size: number },
): Promise<ShortlistDetail> {
  const { source, writes, streams, jobs } = context
  const searchIds = [...new Set(input.searchIds)]
  const searches = await source.manager.find(Search, {
    where: { campaignId, id: In(searchIds) },
    relations: { targetVersion: true },
  })
  const missing = searchIds.find((id) => searches.every((search) => search.id !== id))
  if (missing !== undefined) {
    throw unprocessable('no-such-search', 'This campaign has no such search.', {
      path: 'searchIds',
      found: missing,
    })
  }
  const [first] = searches
  if (searches.some((search) => search.scoringHash !== first.scoringHash)) {
    throw unprocessable(
      'mixed-targets',
      'These searches ran with different rules (or engine versions): their scores cannot be ranked in one list.',
      { path: 'searchIds' },
    )
  }
  const id = randomUUID()
  await writes.transaction(async (manager) => {
    const lines = new Map<string, HitLine>()
    for (const search of searches) {
      lines.set(search.id, await readHitLine(manager, search, search.targetVersion?.text ?? ''))
    }
    const ranked = (await rankedFinds(manager, searches)).slice(0, input.size)
    if (ranked.length === 0) {
      throw unprocessable('nothing-found', 'These searches have not found any candidate yet.', {
        path: 'searchIds',
      })
    }
    await manager.insert(Shortlist, {
      id,
      campaignId,
      targetVersionId: first.targetVersionId,
      name: input.name,
      searchIds,
      columns: reportColumns(first.targetVersion?.text ?? ''),
      scoringHash: first.scoringHash,
      engineVersion: first.engineVersion,
      authorId,
      createdAt: new Date().toISOString(),
    })
    await manager.insert(
      ShortlistEntry,
      ranked.map(({ candidateKey, searchId, outcome }, place) => ({
        shortlistId: id,
        rank: place + 1,
        candidateKey,
        searchId,
        outcome: withHitLine(outcome, lines.get(searchId) ?? null),
      })),
    )
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'shortlists' })
  jobs.invariants.wake()
  return readShortlist(source.manager, campaignId, id)
}
