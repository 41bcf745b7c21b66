import type { Certification } from '../entities/certification.ts'
import { CandidateRecord } from '../entities/candidate.ts'
import { Refusal } from '../problems.ts'
import { commitTask, type TaskResult } from '../services/certificationCommits.ts'
import { readCertification } from '../services/certifications.ts'
import { ComputeFailure } from './computePool.ts'
import type { JobParts } from './jobParts.ts'
import type { WorkSource } from './scheduler.ts'

export interface CertificationCandidate {
  readonly place: number
  readonly candidateKey: string
  /** Points of its polytope. */
  readonly points: number
}

/** From this many points on a certificate takes many seconds. */
const largePoints = 150

/**
 * A request in the hands of this process: certifies its candidates one by one, in turn with all other work. The large
 * ones never take every thread, so that somebody else's search goes on beside them.
 */
export class RunningCertification implements WorkSource {
  readonly campaignId: string
  readonly lane = 'certificates'
  readonly id: string
  readonly #rule: string | null
  readonly #waiting: CertificationCandidate[]
  readonly #parts: JobParts
  readonly #ended: (certification: RunningCertification) => void
  readonly #stopped = new AbortController()
  readonly #inHand = new Set<Promise<void>>()
  #largeInHand = 0

  constructor(
    { id, campaignId }: Pick<Certification, 'id' | 'campaignId'>,
    rule: string | null,
    waiting: readonly CertificationCandidate[],
    parts: JobParts,
    ended: (certification: RunningCertification) => void,
  ) {
    this.id = id
    this.campaignId = campaignId
    this.#rule = rule
    this.#waiting = [...waiting]
    this.#parts = parts
    this.#ended = ended
  }

  next(): Promise<void> | null {
    if (this.#stopped.signal.aborted) return null
    const [candidate] = this.#waiting
    if (!candidate) return null
    const large = candidate.points >= largePoints
    if (large && this.#largeInHand >= Math.max(1, this.#parts.background.threads - 1)) return null
    this.#waiting.shift()
    if (large) this.#largeInHand += 1
    const work = this.#certify(candidate).finally(() => {
      if (large) this.#largeInHand -= 1
      this.#inHand.delete(work)
    })
    this.#inHand.add(work)
    return work
  }

  /** Starts no candidate any more, and abandons those in hand. */
  release(): void {
    this.#stopped.abort(new Error('The request was let go.'))
  }

  /** Resolves when no candidate is in hand. */
  async settled(): Promise<void> {
    while (this.#inHand.size > 0) await Promise.all(this.#inHand)
  }

  async #certify(candidate: CertificationCandidate): Promise<void> {
    const { log, closing } = this.#parts
    try {
      const result = await this.#run(candidate)
      if (result !== null) await this.#commit(candidate, result)
    } catch (error) {
      if (closing.aborted) return
      // The database would not take it: let go; the request is taken up again at the next beat.
      log.error({ err: error, certification: this.id }, 'a certificate could not be stored')
      this.#end()
    }
  }

  /** null: abandoned. */
  async #run({ candidateKey }: CertificationCandidate): Promise<TaskResult | null> {
    const { source, background, log, closing } = this.#parts
    try {
      const { heights, polytope } = await source.manager.findOneOrFail(CandidateRecord, {
        where: { key: candidateKey },
        relations: { polytope: true },
      })
      if (!polytope) throw new Error('The candidate was read without its polytope.')
      const input = { key: candidateKey, vertices: polytope.coordinates, heights, rule: this.#rule }
      const output = await background.run('certify-candidate', input, {
        signal: this.#stopped.signal,
        again: true,
      })
      return { kind: 'made', output }
    } catch (error) {
      if (closing.aborted || this.#stopped.signal.aborted) return null
      log.error({ err: error, certification: this.id, candidate: candidateKey }, 'a certification broke')
      const told = error instanceof ComputeFailure || error instanceof Refusal
      return {
        kind: 'broken',
        message: told ? error.message : 'The server made a mistake; no certificate came of it.',
      }
    }
  }

  async #commit({ place, candidateKey }: CertificationCandidate, result: TaskResult): Promise<void> {
    const { storage, writes, source, streams } = this.#parts
    const task = { certificationId: this.id, place, candidateKey }
    const committed = await storage.insist(() =>
      writes.transaction((manager) => commitTask(manager, task, result)),
    )
    if (!committed) {
      this.#end()
      return
    }
    if (committed.finished) this.#end()
    const state = result.kind === 'made' && result.output.passed ? 'passed' : 'failed'
    streams.toCampaign(this.campaignId, {
      kind: 'certification',
      certification: await readCertification(source.manager, this.id),
      made: committed.certificateId === null ? null : { candidateKey, state, id: committed.certificateId },
    })
  }

  #end(): void {
    if (!this.#stopped.signal.aborted) {
      this.release()
      this.#ended(this)
    }
  }
}
