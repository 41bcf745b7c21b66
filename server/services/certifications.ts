import { randomUUID } from 'node:crypto'
import { In, type EntityManager } from 'typeorm'
import { certifierVersion } from '../../scoring/index.ts'
import type { Certification as CertificationView, RequestCertification } from '../../shared/certificates.ts'
import type { ServerContext } from '../context.ts'
import { Certification } from '../entities/certification.ts'
import { CertificationTask } from '../entities/certificationTask.ts'
import { presentCertification, type CertificationCounts } from '../presenters/certificates.ts'
import { conflict, notFound, unprocessable } from '../problems.ts'
import { listVisibleCandidates } from './candidates.ts'
import { certifiedKeys } from './certificates.ts'
import { requireSoundRule } from './rules.ts'
import { readVersion } from './targets.ts'

const withWords = { author: true, targetVersion: { target: true } } as const

/** Ended requests that are listed beside the open ones. */
const shownEnded = 10

/** Open requests, and the last ones that ended; newest first. */
export async function listCertifications(
  manager: EntityManager,
  campaignId: string,
): Promise<CertificationView[]> {
  const open = await manager.find(Certification, {
    where: { campaignId, state: In(['queued', 'running']) },
    relations: withWords,
  })
  const ended = await manager.find(Certification, {
    where: { campaignId, state: In(['finished', 'cancelled']) },
    relations: withWords,
    order: { finishedAt: 'DESC', id: 'ASC' },
    take: shownEnded,
  })
  const all = [...open, ...ended].sort((a, b) => (a.createdAt < b.createdAt ? 1 : -1))
  const counts = await countTasks(
    manager,
    all.map(({ id }) => id),
  )
  return all.map((certification) => presentCertification(certification, counts(certification.id)))
}

/** @param id of a request that exists */
export async function readCertification(manager: EntityManager, id: string): Promise<CertificationView> {
  const certification = await manager.findOneOrFail(Certification, { where: { id }, relations: withWords })
  return presentCertification(certification, (await countTasks(manager, [id]))(id))
}

async function countTasks(
  manager: EntityManager,
  ids: readonly string[],
): Promise<(id: string) => CertificationCounts> {
  const list = JSON.stringify(ids)
  const rows = await manager.query<{ id: string; state: keyof CertificationCounts; count: number }[]>(
    `SELECT certificationId AS id, state, COUNT(*) AS count FROM certification_task
     WHERE certificationId IN (SELECT value FROM json_each(?)) GROUP BY certificationId, state`,
    [list],
  )
  const broken = await manager.find(CertificationTask, {
    where: { certificationId: In([...ids]), state: 'broken' },
    order: { place: 'ASC' },
  })
  return (id) => {
    const count = (state: string) => rows.find((row) => row.id === id && row.state === state)?.count ?? 0
    return {
      waiting: count('waiting'),
      passed: count('passed'),
      failed: count('failed'),
      broken: count('broken'),
      problems: broken
        .filter(({ certificationId }) => certificationId === id)
        .slice(0, 5)
        .map(({ candidateKey, failure }) => ({ candidateKey, message: failure ?? '' })),
    }
  }
}

/**
 * Queues candidates to be certified, for the scoring of a target version or for the geometry alone. Those that have
 * a certificate of the same scoring by the present certifier, or wait for one, are left out unless asked for again.
 */
export async function requestCertification(
  { source, writes, streams, jobs }: ServerContext,
  campaignId: string,
  authorId: string,
  input: RequestCertification,
): Promise<CertificationView> {
  const { targetVersionId } = input
  const version =
    targetVersionId === null ? null : await readVersion(source.manager, campaignId, targetVersionId)
  if (version !== null) requireSoundRule(version.text, 'targetVersionId')
  const keys = [...new Set(input.candidateKeys)]
  const visible = await listVisibleCandidates(source.manager, { campaignId }, keys)
  const known = new Set(visible.map(({ key }) => key))
  const missing = keys.find((key) => !known.has(key))
  if (missing !== undefined) {
    throw unprocessable('no-such-candidate', 'This campaign has no such candidate.', {
      path: 'candidateKeys',
      found: missing,
    })
  }
  const id = randomUUID()
  const now = new Date().toISOString()
  await writes.transaction(async (manager) => {
    const { waiting, certified } = await certifiedKeys(manager, campaignId, version, keys, certifierVersion)
    const left = keys.filter((key) => !waiting.has(key) && (input.again || !certified.has(key)))
    if (left.length === 0) {
      throw conflict(
        'nothing-to-certify',
        keys.every((key) => waiting.has(key))
          ? 'A certificate of this is being made already.'
          : 'All of these have a certificate of this scoring already, or wait for one.',
      )
    }
    await manager.insert(Certification, {
      id,
      campaignId,
      targetVersionId,
      state: 'queued',
      leaseOwner: null,
      leaseBeat: null,
      authorId,
      createdAt: now,
      finishedAt: null,
    })
    await manager.insert(
      CertificationTask,
      left.map((candidateKey, place) => ({
        certificationId: id,
        place,
        candidateKey,
        state: 'waiting' as const,
        certificateId: null,
        failure: null,
      })),
    )
  })
  const certification = await readCertification(source.manager, id)
  streams.toCampaign(campaignId, { kind: 'certification', certification, made: null })
  jobs.certifications.enqueue(id)
  return certification
}

/** Ends a request: what is in hand is abandoned, what waits is left undone, what was made stays. */
export async function cancelCertification(
  { source, writes, streams, jobs }: ServerContext,
  campaignId: string,
  id: string,
): Promise<CertificationView> {
  await writes.transaction(async (manager) => {
    const found = await manager.findOneBy(Certification, { campaignId, id })
    if (found === null) throw notFound('certification')
    if (found.state !== 'queued' && found.state !== 'running') {
      throw conflict('wrong-state', `This request is ${found.state}; it cannot be cancelled.`)
    }
    await manager.update(
      Certification,
      { id },
      { state: 'cancelled', leaseOwner: null, leaseBeat: null, finishedAt: new Date().toISOString() },
    )
  })
  jobs.certifications.release(id)
  const certification = await readCertification(source.manager, id)
  streams.toCampaign(campaignId, { kind: 'certification', certification, made: null })
  return certification
}
