import {
  commitNullChunk,
  failNullSample,
  openNullSample,
  searchesAgainst,
  type NullAddress,
} from '../services/nullSamples.ts'
import type { NullSample } from '../entities/nullSample.ts'
import type { Search } from '../entities/search.ts'
import type { JobParts } from './jobParts.ts'
import { SegmentPace } from './pace.ts'
import type { WorkSource } from './scheduler.ts'
import type { NullProblem, ScoredScope } from './searchProblem.ts'

/** All null samples are drawn with this seed: one sample per scope and rule, whoever asks for it. */
export const nullSeed = 1

/** Candidates of a null sample. Fewer where each takes long: the largest polytopes need a quarter of a second. */
export function nullSampleSize(pointsMax: number): number {
  if (pointsMax <= 100) return 2_000
  return pointsMax <= 250 ? 1_000 : 500
}

/** Draws the null samples that searches are compared with, in turn with the searches themselves. */
export class NullSampler {
  readonly #parts: JobParts
  readonly #size: (pointsMax: number) => number
  readonly #drawing = new Set<string>()

  constructor(parts: JobParts, size: (pointsMax: number) => number = nullSampleSize) {
    this.#parts = parts
    this.#size = size
  }

  /** Makes sure that the null sample of a search is complete or being drawn. */
  async want(
    search: Pick<Search, 'campaignId' | 'scopeHash' | 'scoringHash'>,
    scope: ScoredScope,
    pointsMax: number,
  ): Promise<void> {
    const { writes, scheduler, closing } = this.#parts
    const size = this.#size(pointsMax)
    const sample = await writes.transaction((manager) =>
      openNullSample(manager, search, { seed: nullSeed, size }),
    )
    if (sample.complete || sample.failure !== null || this.#drawing.has(sample.id) || closing.aborted) return
    this.#drawing.add(sample.id)
    const problem = { ...scope, seed: sample.seed, size: sample.size }
    const source = new NullSource(search, sample, problem, this.#parts, () => {
      scheduler.remove(source)
      this.#drawing.delete(sample.id)
    })
    scheduler.add(source)
  }
}

class NullSource implements WorkSource {
  readonly campaignId: string
  readonly lane = 'samples'
  readonly #address: NullAddress
  readonly #id: string
  readonly #problem: NullProblem
  readonly #parts: JobParts
  readonly #ended: () => void
  readonly #pace: SegmentPace
  #state: string | null
  #evaluated: number
  #busy = false
  #over = false

  constructor(
    search: Pick<Search, 'campaignId' | 'scopeHash' | 'scoringHash'>,
    sample: NullSample,
    problem: NullProblem,
    parts: JobParts,
    ended: () => void,
  ) {
    this.campaignId = search.campaignId
    this.#address = search
    this.#id = sample.id
    this.#state = sample.state
    this.#evaluated = sample.summary?.evaluated ?? 0
    this.#problem = problem
    this.#parts = parts
    this.#pace = new SegmentPace(parts.segmentMilliseconds)
    this.#ended = ended
  }

  next(): Promise<void> | null {
    if (this.#busy || this.#over) return null
    this.#busy = true
    return this.#draw()
      .catch((error: unknown) => this.#fail(error))
      .catch((error: unknown) => {
        const { closing, log } = this.#parts
        if (!closing.aborted) log.error({ err: error, nullSample: this.#id }, 'no end was written')
      })
      .finally(() => {
        this.#busy = false
      })
  }

  async #draw(): Promise<void> {
    const { background, pieceLimitMilliseconds, storage, writes, source, streams } = this.#parts
    const input = { problem: this.#problem, state: this.#state, ...this.#pace.next }
    const output = await background.run('null-chunk', input, {
      limitMilliseconds: pieceLimitMilliseconds,
      again: true,
    })
    this.#pace.note(output.summary.evaluated - this.#evaluated, performance.now())
    await storage.insist(() => writes.transaction((manager) => commitNullChunk(manager, this.#id, output)))
    this.#state = output.state
    this.#evaluated = output.summary.evaluated
    if (output.done) {
      this.#over = true
      this.#ended()
    }
    for (const { id, campaignId } of await searchesAgainst(source.manager, this.#address)) {
      streams.toCampaign(campaignId, { kind: 'null', searchId: id, summary: output.summary })
    }
  }

  async #fail(error: unknown): Promise<void> {
    const { closing, log, storage, writes } = this.#parts
    this.#over = true
    this.#ended()
    if (closing.aborted) return
    log.error({ err: error, nullSample: this.#id }, 'a null sample failed')
    const reason = error instanceof Error ? error.message : String(error)
    await storage.insist(() => writes.transaction((manager) => failNullSample(manager, this.#id, reason)))
  }
}
