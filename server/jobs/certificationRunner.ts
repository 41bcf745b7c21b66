import { In } from 'typeorm'
import { Certification } from '../entities/certification.ts'
import { CertificationTask } from '../entities/certificationTask.ts'
import { takeCertification } from '../services/certificationCommits.ts'
import { readCertification } from '../services/certifications.ts'
import type { JobParts } from './jobParts.ts'
import { isFree, leaseMilliseconds, thisProcess } from './lease.ts'
import { RunningCertification } from './runningCertification.ts'

/** Works off the requests for certificates: takes them up, keeps their leases, lets them go. */
export class CertificationRunner {
  readonly #parts: JobParts
  readonly #running = new Map<string, RunningCertification>()
  readonly #takingUp = new Map<string, Promise<void>>()
  readonly #listeners = new Map<string, (() => void)[]>()
  #heart: NodeJS.Timeout | null = null

  constructor(parts: JobParts) {
    this.#parts = parts
  }

  /** Takes up every request that was open when its process ended, and looks for abandoned ones from time to time. */
  async start(): Promise<void> {
    await this.#takeUpFree()
    this.#heart = setInterval(() => {
      this.#beat().catch((error: unknown) => this.#parts.log.error({ err: error }, 'leases were not renewed'))
    }, leaseMilliseconds / 3)
    this.#heart.unref()
  }

  stop(): void {
    if (this.#heart) clearInterval(this.#heart)
    for (const certification of this.#running.values()) certification.release()
  }

  /** Takes up an open request. */
  enqueue(id: string): void {
    const before = this.#takingUp.get(id) ?? Promise.resolve()
    const work = before
      .then(() => this.#takeUp(id))
      .catch((error: unknown) => {
        if (this.#parts.closing.aborted) return
        this.#parts.log.error({ err: error, certification: id }, 'a request could not be taken up')
      })
      .finally(() => {
        if (this.#takingUp.get(id) === work) this.#takingUp.delete(id)
      })
    this.#takingUp.set(id, work)
  }

  /** Lets go of a request that was cancelled: what is in hand is abandoned. */
  release(id: string): void {
    const certification = this.#running.get(id)
    if (!certification) return
    certification.release()
    this.#forget(certification)
  }

  /** Resolves when this process has nothing more to do for a request that was queued with `enqueue`. */
  ended(id: string): Promise<void> {
    return new Promise((resolve) => {
      this.#listeners.set(id, [...(this.#listeners.get(id) ?? []), resolve])
    })
  }

  #forget(certification: RunningCertification): void {
    this.#parts.scheduler.remove(certification)
    this.#running.delete(certification.id)
    for (const resolve of this.#listeners.get(certification.id) ?? []) resolve()
    this.#listeners.delete(certification.id)
  }

  async #beat(): Promise<void> {
    const ids = [...this.#running.keys()]
    if (ids.length > 0) {
      await this.#parts.writes.transaction((manager) =>
        manager.update(
          Certification,
          { id: In(ids), leaseOwner: thisProcess },
          { leaseUntil: Date.now() + leaseMilliseconds },
        ),
      )
    }
    await this.#takeUpFree()
  }

  async #takeUpFree(): Promise<void> {
    const open = await this.#parts.source.manager.find(Certification, {
      select: { id: true, leaseOwner: true, leaseUntil: true },
      where: { state: In(['queued', 'running']) },
      order: { createdAt: 'ASC' },
    })
    for (const certification of open) if (isFree(certification)) this.enqueue(certification.id)
  }

  async #takeUp(id: string): Promise<void> {
    if (this.#running.has(id)) return
    const { source, writes, scheduler, streams, closing } = this.#parts
    const certification = await source.manager.findOne(Certification, {
      where: { id, state: In(['queued', 'running']) },
      relations: { targetVersion: true },
    })
    if (!certification || !isFree(certification)) return
    const tasks = await source.manager.find(CertificationTask, {
      where: { certificationId: id, state: 'waiting' },
      relations: { candidate: { polytope: true } },
      order: { place: 'ASC' },
    })
    const waiting = tasks.map(({ place, candidateKey, candidate }) => ({
      place,
      candidateKey,
      points: candidate?.polytope?.points ?? 0,
    }))
    const taken = await writes.transaction((manager) => takeCertification(manager, id))
    if (!taken || closing.aborted) return
    const rule = certification.targetVersion?.text ?? null
    const running = new RunningCertification(certification, rule, waiting, this.#parts, (ended) =>
      this.#forget(ended),
    )
    this.#running.set(id, running)
    streams.toCampaign(certification.campaignId, {
      kind: 'certification',
      certification: await readCertification(source.manager, id),
      made: null,
    })
    scheduler.add(running)
  }
}
