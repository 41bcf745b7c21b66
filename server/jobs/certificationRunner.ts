import { In } from 'typeorm'
import { Certification } from '../entities/certification.ts'
import { CertificationTask } from '../entities/certificationTask.ts'
import { takeCertification } from '../services/certificationCommits.ts'
import { readCertification } from '../services/certifications.ts'
import type { JobParts } from './jobParts.ts'
import { LeasedRuns } from './leasedRuns.ts'
import { RunningCertification } from './runningCertification.ts'

/** Works off the requests for certificates. */
export class CertificationRunner {
  readonly #parts: JobParts
  readonly #runs: LeasedRuns<RunningCertification>

  constructor(parts: JobParts) {
    this.#parts = parts
    this.#runs = new LeasedRuns(parts, {
      entity: Certification,
      word: 'certification',
      takeUp: (id, holder) => this.#takeUp(id, holder),
    })
  }

  /** Takes up every request that was open when its process ended, and looks for abandoned ones from time to time. */
  start(): Promise<void> {
    return this.#runs.start()
  }

  stop(): void {
    this.#runs.stop()
  }

  /** Takes up an open request. */
  enqueue(id: string): void {
    this.#runs.enqueue(id)
  }

  /** Lets go of a request that was cancelled: what is in hand is abandoned. */
  release(id: string): void {
    this.#runs.release(id)
  }

  /** Resolves when this process has nothing more to do for a request that was queued with `enqueue`. */
  ended(id: string): Promise<void> {
    return this.#runs.ended(id)
  }

  async #takeUp(id: string, holder: string | null): Promise<void> {
    const { source, writes, scheduler, streams, closing } = this.#parts
    const certification = await source.manager.findOne(Certification, {
      where: { id, state: In(['queued', 'running']) },
      relations: { targetVersion: true },
    })
    if (!certification) return
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
    const taken = await writes.transaction((manager) => takeCertification(manager, id, holder))
    if (!taken || closing.aborted) return
    const rule = certification.targetVersion?.text ?? null
    const running = new RunningCertification(certification, rule, waiting, this.#parts, (ended) =>
      this.#runs.forget(ended),
    )
    this.#runs.hold(running)
    streams.toCampaign(certification.campaignId, {
      kind: 'certification',
      certification: await readCertification(source.manager, id),
      made: null,
    })
    scheduler.add(running)
  }
}
