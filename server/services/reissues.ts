import type { EntityManager } from 'typeorm'
import type { z } from 'zod'
import { assemblySchema } from '../../shared/assemblies.ts'
import type { EarlierIssue, Reissued, reissueSchema } from '../../shared/reissues.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { conflict, notFound, unprocessable } from '../problems.ts'
import { drawList, scoredEntrants } from './assemblies.ts'
import { ownNames } from './polytopes.ts'
import { entriesOf, placesOf } from './rescoringCommits.ts'
import { requestRescoring } from './rescorings.ts'
import { reportColumns } from './rules.ts'
import { insertShortlist } from './shortlistCommits.ts'
import { frozenSearches, readGround } from './shortlistGround.ts'

type Input = z.output<typeof reissueSchema>

/** @returns with target version loaded */
async function readList(manager: EntityManager, campaignId: string, id: string): Promise<Shortlist> {
  const list = await manager.findOne(Shortlist, {
    where: { campaignId, id },
    relations: { targetVersion: true },
  })
  if (!list?.targetVersion) throw notFound('shortlist')
  return list
}

/** Makes a newer issue of a list; the list stays as it was. */
export async function reissue(
  context: ServerContext,
  campaignId: string,
  authorId: string,
  { listId, name, how }: Input & { readonly listId: string },
): Promise<Reissued> {
  const list = await readList(context.source.manager, campaignId, listId)
  const made =
    how.kind === 'rows'
      ? await withoutRows(context, list, { authorId, name, without: how.without })
      : await drawnAgain(context, list, { authorId, name, moreSearchIds: how.moreSearchIds })
  if (made.shortlistId !== null) {
    context.streams.toCampaign(campaignId, { kind: 'changed', what: 'shortlists' })
  }
  return made
}

async function withoutRows(
  { source, writes }: ServerContext,
  list: Shortlist,
  { authorId, name, without }: { authorId: string; name: string; without: readonly string[] },
): Promise<Reissued> {
  const entries = await entriesOf(source.manager, list.id)
  const gone = new Set(without)
  const strange = without.find((key) => entries.every(({ candidateKey }) => candidateKey !== key))
  if (strange !== undefined) {
    throw unprocessable('no-such-row', 'The list has no such candidate.', {
      path: 'how.without',
      found: strange,
    })
  }
  const chosen = entries.filter(({ candidateKey }) => !gone.has(candidateKey))
  if (chosen.length === 0)
    throw unprocessable('nothing-left', 'No row would be left.', { path: 'how.without' })
  const { targetVersion: version, scoringHash, engineVersion, provenance, campaignId } = list
  if (!version) throw new Error('A list was read without its version.')
  const shortlistId = await writes.transaction((manager) =>
    insertShortlist(manager, {
      campaignId,
      authorId,
      name,
      version,
      scoringHash,
      engineVersion,
      // Outcomes are taken over as they are; no hit line is drawn again.
      searches: [],
      searchIds: list.searchIds,
      chosen,
      provenance: provenance && { ...provenance, takenOut: (provenance.takenOut ?? 0) + gone.size },
      previous: placesOf(entries),
      reissueOf: list,
    }),
  )
  return { shortlistId, rescoring: null }
}

async function drawnAgain(
  context: ServerContext,
  list: Shortlist,
  { authorId, name, moreSearchIds }: { authorId: string; name: string; moreSearchIds: readonly string[] },
): Promise<Reissued> {
  const { source, writes, jobs } = context
  const { campaignId, targetVersionId, provenance } = list
  if (list.searchIds.length === 0 || provenance?.from) {
    throw conflict(
      'not-from-searches',
      'This list was not drawn from searches: a newer issue of it can only leave rows out.',
    )
  }
  const searchIds = [...new Set([...list.searchIds, ...moreSearchIds])]
  const entries = await entriesOf(source.manager, list.id)
  const assembly = provenance?.assembly ?? assemblySchema.parse({ size: Math.max(1, entries.length) })
  const { ground, scored, searches } = await writes.transaction(async (manager) => {
    const ground = await readGround(manager, campaignId, { searchIds, targetVersionId })
    return {
      ground,
      scored: await scoredEntrants(manager, ground.scoringHash, ground.entrants),
      searches: await frozenSearches(manager, ground.searches, ground.scoringHash),
    }
  })
  if (scored.length < ground.entrants.length) {
    const asked = { name, targetVersionId, from: { searchIds }, assembly }
    return {
      shortlistId: null,
      rescoring: await requestRescoring(context, campaignId, authorId, asked, list.id),
    }
  }
  const { chosen, counts } = await drawList(
    { manager: source.manager, pool: jobs.unhurried },
    { finds: ground.finds, broken: 0, entrants: scored },
    assembly,
    reportColumns(ground.version.text),
  )
  const shortlistId = await writes.transaction((manager) =>
    insertShortlist(manager, {
      campaignId,
      authorId,
      name,
      version: ground.version,
      scoringHash: ground.scoringHash,
      engineVersion: ground.engineVersion,
      searches: ground.searches,
      chosen,
      provenance: { assembly, counts, searches, from: null },
      previous: placesOf(entries),
      reissueOf: list,
    }),
  )
  return { shortlistId, rescoring: null }
}

/** The list before in the chain of issues, with what left; null for a first issue. */
export async function earlierIssue(manager: EntityManager, list: Shortlist): Promise<EarlierIssue | null> {
  if (list.reissueOfId === null) return null
  const before = await manager.findOneBy(Shortlist, { id: list.reissueOfId, campaignId: list.campaignId })
  if (before === null) return null
  const [{ size }] = await manager.query<{ size: number }[]>(
    'SELECT COUNT(*) AS size FROM shortlist_entry WHERE shortlistId = ?',
    [before.id],
  )
  const left = await manager.query<(EarlierIssue['left'][number] & { polytopeKey: string })[]>(
    `SELECT e.rank AS rank, e.candidateKey AS candidateKey, p.name AS polytopeName, p."key" AS polytopeKey,
       e.outcome ->> '$.score' AS score
     FROM shortlist_entry e JOIN candidate c ON c."key" = e.candidateKey JOIN polytope p ON p."key" = c.polytopeKey
     WHERE e.shortlistId = ? AND e.candidateKey NOT IN
       (SELECT candidateKey FROM shortlist_entry WHERE shortlistId = ?)
     ORDER BY e.rank`,
    [before.id, list.id],
  )
  const polytopes = left.map(({ polytopeKey }) => ({ key: polytopeKey, origin: 'imported' as const }))
  const names = await ownNames(manager, { campaignId: list.campaignId }, polytopes)
  return {
    id: before.id,
    name: before.name,
    issue: before.issue,
    size,
    left: left.map(({ polytopeKey, ...row }) => ({
      ...row,
      polytopeName: names.get(polytopeKey) ?? row.polytopeName,
    })),
  }
}

/** Newer issues of a list, oldest first. */
export async function laterIssues(
  manager: EntityManager,
  list: Pick<Shortlist, 'id' | 'campaignId'>,
): Promise<ShortlistDetail['reissues']> {
  const found = await manager.find(Shortlist, {
    select: { id: true, name: true, issue: true },
    where: { campaignId: list.campaignId, reissueOfId: list.id },
    order: { createdAt: 'ASC', id: 'ASC' },
  })
  return found.map(({ id, name, issue }) => ({ id, name, issue }))
}
