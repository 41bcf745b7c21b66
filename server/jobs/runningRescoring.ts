import { In } from 'typeorm'
import { CandidateRecord } from '../entities/candidate.ts'
import type { Rescoring } from '../entities/rescoring.ts'
import type { TargetVersion } from '../entities/targetVersion.ts'
import { drawList, scoredEntrants } from '../services/assemblies.ts'
import { commitRescoring, commitValues, failRescoring } from '../services/rescoringCommits.ts'
import { readRescoring } from '../services/rescorings.ts'
import { reportColumns } from '../services/rules.ts'
import type { JobParts } from './jobParts.ts'
import type { LeasedRun } from './leasedRuns.ts'

/** Candidates sent to a thread at a time; it answers for as many as a piece of its time allows. */
const stretchLength = 40

/**
 * A request in the hands of this process: scores its candidates in stretches, in turn with all other work, and makes
 * the list of them when all have a value. Every stretch is committed; what was scored is never scored again.
 */
export class RunningRescoring implements LeasedRun {
  readonly campaignId: string
  readonly lane = 'lists'
  readonly id: string
  readonly #rescoring: Rescoring
  readonly #scoring: {
    readonly version: TargetVersion
    readonly scoringHash: string
    readonly engineVersion: string
  }
  readonly #parts: JobParts
  readonly #ended: (rescoring: RunningRescoring) => void
  readonly #stopped = new AbortController()
  /** Stretches of keys that are still to be scored. */
  #waiting: string[][] = []
  readonly #broken = new Set<string>()
  readonly #inHand = new Set<Promise<void>>()
  #finishing = false

  /** @param rescoring with its entrants loaded */
  constructor(
    rescoring: Rescoring,
    scoring: {
      readonly version: TargetVersion
      readonly scoringHash: string
      readonly engineVersion: string
    },
    parts: JobParts,
    ended: (rescoring: RunningRescoring) => void,
  ) {
    this.id = rescoring.id
    this.campaignId = rescoring.campaignId
    this.#rescoring = rescoring
    this.#scoring = scoring
    this.#parts = parts
    this.#ended = ended
  }

  /** Finds out what is left to score. */
  async prepare(): Promise<void> {
    const { entrants } = this.#rescoring
    const { manager } = this.#parts.source
    const scored = await scoredEntrants(manager, this.#scoring.scoringHash, entrants)
    const known = new Set(scored.map(({ candidateKey }) => candidateKey))
    // Those of one polytope together: a thread builds each polytope once a stretch.
    const left = entrants
      .filter(({ candidateKey }) => !known.has(candidateKey))
      .sort((a, b) => (a.polytopeKey < b.polytopeKey ? -1 : a.polytopeKey > b.polytopeKey ? 1 : 0))
      .map(({ candidateKey }) => candidateKey)
    for (let from = 0; from < left.length; from += stretchLength) {
      this.#waiting.push(left.slice(from, from + stretchLength))
    }
  }

  next(): Promise<void> | null {
    if (this.#stopped.signal.aborted || this.#finishing) return null
    const stretch = this.#waiting.shift()
    if (stretch === undefined) {
      if (this.#inHand.size > 0) return null
      this.#finishing = true
    }
    const work = this.#guarded(() => (stretch === undefined ? this.#finish() : this.#score(stretch))).finally(
      () => this.#inHand.delete(work),
    )
    this.#inHand.add(work)
    return work
  }

  /** Resolves when no piece of work is in hand. */
  async settled(): Promise<void> {
    while (this.#inHand.size > 0) await Promise.all(this.#inHand)
  }

  /** Starts nothing any more, and abandons what is in hand. */
  release(): void {
    this.#stopped.abort(new Error('The request was let go.'))
  }

  async #guarded(work: () => Promise<void>): Promise<void> {
    try {
      await work()
    } catch (error) {
      if (this.#parts.closing.aborted || this.#stopped.signal.aborted) return
      // Let go; the request is taken up again at the next beat.
      this.#parts.log.error({ err: error, rescoring: this.id }, 'a re-scoring came to a halt')
      this.#end()
    }
  }

  async #score(keys: readonly string[]): Promise<void> {
    const { source, storage, writes, background, log, closing } = this.#parts
    const candidates = await source.manager.find(CandidateRecord, {
      where: { key: In([...keys]) },
      relations: { polytope: true },
      order: { polytopeKey: 'ASC', key: 'ASC' },
    })
    let outcomes
    try {
      outcomes = await background.run(
        'score-candidates',
        {
          rule: this.#scoring.version.text,
          polytopes: Object.fromEntries(
            candidates.map(({ polytopeKey, polytope }) => [polytopeKey, polytope?.coordinates ?? []]),
          ),
          candidates: candidates.map(({ key, polytopeKey, heights }) => ({ key, polytopeKey, heights })),
        },
        { signal: this.#stopped.signal, again: true },
      )
    } catch (error) {
      if (closing.aborted || this.#stopped.signal.aborted) return
      if (keys.length > 1) {
        // One of them is at fault: each on its own.
        this.#waiting.unshift(...keys.map((key) => [key]))
        return
      }
      log.error({ err: error, rescoring: this.id, candidate: keys[0] }, 'a candidate could not be scored')
      this.#broken.add(keys[0])
      outcomes = [] as const
    }
    const values = outcomes.map((outcome, at) => ({ candidateKey: candidates[at].key, outcome }))
    const { scoringHash } = this.#scoring
    const open = await storage.insist(() =>
      writes.transaction((manager) => commitValues(manager, this.id, scoringHash, values)),
    )
    if (!open) {
      this.#end()
      return
    }
    const left = candidates.slice(values.length).map(({ key }) => key)
    const unfinished = left.filter((key) => !this.#broken.has(key))
    if (unfinished.length > 0) this.#waiting.unshift(unfinished)
    await this.#tell()
  }

  async #finish(): Promise<void> {
    const { source, storage, writes, background, streams } = this.#parts
    const { entrants, finds, assembly } = this.#rescoring
    const { scoringHash, version } = this.#scoring
    const scored = await scoredEntrants(source.manager, scoringHash, entrants)
    if (scored.length === 0) {
      const failure = 'None of the candidates could be scored.'
      await storage.insist(() => writes.transaction((manager) => failRescoring(manager, this.id, failure)))
      this.#end()
      await this.#tell()
      return
    }
    const list = await drawList(
      { manager: source.manager, pool: background },
      { finds, entrants: scored, broken: entrants.length - scored.length },
      assembly,
      reportColumns(version.text),
      this.#stopped.signal,
    )
    const shortlistId = await storage.insist(() =>
      writes.transaction((manager) => commitRescoring(manager, this.#rescoring, this.#scoring, list)),
    )
    this.#end()
    await this.#tell()
    if (shortlistId !== null) streams.toCampaign(this.campaignId, { kind: 'changed', what: 'shortlists' })
  }

  async #tell(): Promise<void> {
    const { source, streams } = this.#parts
    const rescoring = await readRescoring(source.manager, this.id)
    streams.toCampaign(this.campaignId, {
      kind: 'rescoring',
      rescoring: rescoring.state === 'running' ? { ...rescoring, broken: this.#broken.size } : rescoring,
    })
  }

  #end(): void {
    if (!this.#stopped.signal.aborted) {
      this.release()
      this.#ended(this)
    }
  }
}
