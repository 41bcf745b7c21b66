import { randomUUID } from 'node:crypto'
import { In, type EntityManager } from 'typeorm'
import { assemblySchema, shortlistLimit, type AssemblySettings } from '../../shared/assemblies.ts'
import {
  requestRescoringSchema,
  type RequestRescoring,
  type Rescoring as RescoringView,
} from '../../shared/rescorings.ts'
import type { ServerContext } from '../context.ts'
import { Rescoring } from '../entities/rescoring.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { presentRescoring } from '../presenters/rescorings.ts'
import { conflict, notFound } from '../problems.ts'
import type { Entrant } from './assemblies.ts'
import { entriesOf } from './rescoringCommits.ts'
import { requireSoundRule, scoringHashOf } from './rules.ts'
import { readFinds } from './shortlistGround.ts'
import { readVersion } from './targets.ts'

const withWords = { author: true, targetVersion: { target: true } } as const

/** Ended requests that are listed beside the open ones. */
const shownEnded = 10

/** Open requests, and the last ones that ended; newest first. */
export async function listRescorings(manager: EntityManager, campaignId: string): Promise<RescoringView[]> {
  const open = await manager.find(Rescoring, {
    where: { campaignId, state: In(['queued', 'running']) },
    relations: withWords,
  })
  const ended = await manager.find(Rescoring, {
    where: { campaignId, state: In(['finished', 'cancelled', 'failed']) },
    relations: withWords,
    order: { finishedAt: 'DESC', id: 'ASC' },
    take: shownEnded,
  })
  const all = [...open, ...ended].sort((a, b) => (a.createdAt < b.createdAt ? 1 : -1))
  const views: RescoringView[] = []
  for (const rescoring of all) {
    views.push(presentRescoring(rescoring, await countScored(manager, rescoring)))
  }
  return views
}

/** @param id of a request that exists */
export async function readRescoring(manager: EntityManager, id: string): Promise<RescoringView> {
  const rescoring = await manager.findOneOrFail(Rescoring, { where: { id }, relations: withWords })
  return presentRescoring(rescoring, await countScored(manager, rescoring))
}

async function countScored(manager: EntityManager, rescoring: Rescoring): Promise<number> {
  const { id, total, broken, state, targetVersion } = rescoring
  if (state === 'finished') return total - broken
  const scoringHash = scoringHashOf(targetVersion?.text ?? '')
  if (scoringHash === null) return 0
  const [{ count }] = await manager.query<{ count: number }[]>(
    `SELECT COUNT(*) AS count
     FROM rescoring r JOIN json_each(r.entrants) e
     JOIN candidate_value v ON v.candidateKey = e.value ->> 'candidateKey' AND v.scoringHash = ?
     WHERE r.id = ?`,
    [scoringHash, id],
  )
  return count
}

/** Of a list all candidates, by score, unless something else is asked for. */
const everything = (): AssemblySettings => assemblySchema.parse({ size: shortlistLimit })

/**
 * Queues candidates to be scored by a target version and made into a list: those of another list, which stays as it
 * is, or the finds of searches as they stand now.
 */
export async function requestRescoring(
  { source, writes, streams, jobs }: ServerContext,
  campaignId: string,
  authorId: string,
  request: RequestRescoring,
  /** The list that a newer issue is made of. */
  reissueOf?: string,
): Promise<RescoringView> {
  const { name, targetVersionId, from, assembly } = requestRescoringSchema.parse(request)
  const version = await readVersion(source.manager, campaignId, targetVersionId)
  requireSoundRule(version.text, 'targetVersionId')
  const id = randomUUID()
  await writes.transaction(async (manager) => {
    const { finds, entrants } = await entrantsOf(manager, campaignId, from)
    await manager.insert(Rescoring, {
      id,
      campaignId,
      targetVersionId,
      name,
      origin: 'searchIds' in from && reissueOf !== undefined ? { ...from, reissueOf } : from,
      assembly: assembly ?? everything(),
      entrants: [...entrants],
      total: entrants.length,
      finds,
      state: 'queued',
      broken: 0,
      failure: null,
      shortlistId: null,
      leaseOwner: null,
      leaseBeat: null,
      authorId,
      createdAt: new Date().toISOString(),
      finishedAt: null,
    })
  })
  const rescoring = await readRescoring(source.manager, id)
  streams.toCampaign(campaignId, { kind: 'rescoring', rescoring })
  jobs.rescorings.enqueue(id)
  return rescoring
}

async function entrantsOf(
  manager: EntityManager,
  campaignId: string,
  from: Rescoring['origin'],
): Promise<{ finds: number; entrants: readonly Entrant[] }> {
  if ('searchIds' in from) return readFinds(manager, campaignId, from.searchIds)
  if (!(await manager.existsBy(Shortlist, { campaignId, id: from.shortlistId }))) throw notFound('shortlist')
  const entries = await entriesOf(manager, from.shortlistId)
  const entrants = entries.map(({ candidateKey, polytopeKey, searchId }) => ({
    candidateKey,
    polytopeKey,
    searchId,
  }))
  return { finds: entrants.length, entrants }
}

/** Ends a request; the scores that were computed stay. */
export async function cancelRescoring(
  { source, writes, streams, jobs }: ServerContext,
  campaignId: string,
  id: string,
): Promise<RescoringView> {
  await writes.transaction(async (manager) => {
    const found = await manager.findOneBy(Rescoring, { campaignId, id })
    if (found === null) throw notFound('re-scoring')
    if (found.state !== 'queued' && found.state !== 'running') {
      throw conflict('wrong-state', `This re-scoring is ${found.state}; it cannot be cancelled.`)
    }
    await manager.update(
      Rescoring,
      { id },
      { state: 'cancelled', leaseOwner: null, leaseBeat: null, finishedAt: new Date().toISOString() },
    )
  })
  jobs.rescorings.release(id)
  const rescoring = await readRescoring(source.manager, id)
  streams.toCampaign(campaignId, { kind: 'rescoring', rescoring })
  return rescoring
}
