import { randomUUID } from 'node:crypto'
import { In, type EntityManager } from 'typeorm'
import { CertificateRecord } from '../entities/certificate.ts'
import { Certification } from '../entities/certification.ts'
import { CertificationTask } from '../entities/certificationTask.ts'
import type { CertifyOutput } from '../jobs/compute/certifyCandidate.ts'
import { heldBy, nextBeat, thisProcess } from '../jobs/lease.ts'

/**
 * Takes a request that is free (`holder` null) or was left behind by `holder` for this process; false when it was
 * cancelled or taken by another process meanwhile.
 */
export async function takeCertification(
  manager: EntityManager,
  id: string,
  holder: string | null,
): Promise<boolean> {
  const { affected } = await manager.update(
    Certification,
    { id, state: In(['queued', 'running']), leaseOwner: heldBy(holder) },
    { state: 'running', leaseOwner: thisProcess, leaseBeat: nextBeat },
  )
  return affected !== 0
}

/** What came of one candidate: a certificate, or why there is none. */
export type TaskResult =
  | { readonly kind: 'made'; readonly output: CertifyOutput }
  | { readonly kind: 'broken'; readonly message: string }

/**
 * Commits one candidate of a request: its certificate and the request's state, all or nothing. Returns the identifier
 * of the certificate (null for none), or undefined when nothing was committed: the request was cancelled, or the
 * candidate had been done already.
 */
export async function commitTask(
  manager: EntityManager,
  task: Pick<CertificationTask, 'certificationId' | 'place' | 'candidateKey'>,
  result: TaskResult,
): Promise<{ readonly certificateId: string | null; readonly finished: boolean } | undefined> {
  const { certificationId, place, candidateKey } = task
  const certification = await manager.findOneBy(Certification, {
    id: certificationId,
    state: In(['queued', 'running']),
  })
  if (certification === null) return undefined
  // Another process took it over while this one gave no sign of life.
  if (certification.leaseOwner !== null && certification.leaseOwner !== thisProcess) return undefined
  const mine = { certificationId, place, state: 'waiting' as const }
  if (!(await manager.existsBy(CertificationTask, mine))) return undefined
  let certificateId: string | null = null
  if (result.kind === 'made') {
    const { milliseconds, ...output } = result.output
    certificateId = randomUUID()
    await manager.insert(CertificateRecord, {
      id: certificateId,
      candidateKey,
      campaignId: certification.campaignId,
      targetVersionId: certification.targetVersionId,
      ...output,
      milliseconds: Math.round(milliseconds),
      authorId: certification.authorId,
      createdAt: new Date().toISOString(),
    })
  }
  await manager.update(CertificationTask, mine, {
    state: result.kind === 'broken' ? 'broken' : result.output.passed ? 'passed' : 'failed',
    certificateId,
    failure: result.kind === 'broken' ? result.message : null,
  })
  const finished = !(await manager.existsBy(CertificationTask, { certificationId, state: 'waiting' }))
  await manager.update(
    Certification,
    { id: certificationId },
    finished
      ? { state: 'finished', leaseOwner: null, leaseBeat: null, finishedAt: new Date().toISOString() }
      : { state: 'running', leaseOwner: thisProcess, leaseBeat: nextBeat },
  )
  return { certificateId, finished }
}
