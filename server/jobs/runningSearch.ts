import type { EntityManager } from 'typeorm'
import { readHitLine } from '../services/nullSamples.ts'
import { commitSegment, failSearch, type IslandFind } from '../services/searchCommits.ts'
import type { Search } from '../entities/search.ts'
import { ComputeFailure } from './computePool.ts'
import type { JobParts } from './jobParts.ts'
import { SegmentPace } from './pace.ts'
import type { WorkSource } from './scheduler.ts'
import { mergeFinds, mergeProgress, sameFinds, type HitLine } from './searchProgress.ts'
import type { SearchProblem } from './searchProblem.ts'
import type { IslandProgress, SegmentOutput } from './segment.ts'
import { Refusal } from '../problems.ts'

export interface Island {
  readonly number: number
  readonly problem: SearchProblem
  segment: number
  state: string | null
  progress: IslandProgress | null
  done: boolean
  busy: boolean
}

/** A search in the hands of this process: hands out segments of its islands and commits what comes back. */
export class RunningSearch implements WorkSource {
  readonly campaignId: string
  readonly id: string
  readonly #search: Search
  readonly #islands: readonly Island[]
  readonly #parts: JobParts
  readonly #pace: SegmentPace
  readonly #ended: (search: RunningSearch) => void
  #finds: readonly IslandFind[]
  #hitLine: HitLine = null
  #released = false
  #inHand = new Set<Promise<void>>()

  constructor(
    search: Search,
    islands: readonly Island[],
    finds: readonly IslandFind[],
    parts: JobParts,
    ended: (search: RunningSearch) => void,
  ) {
    this.id = search.id
    this.campaignId = search.campaignId
    this.#search = search
    this.#islands = islands
    this.#finds = finds
    this.#parts = parts
    this.#pace = new SegmentPace(parts.segmentMilliseconds)
    this.#ended = ended
  }

  /** The next segment of the island that is furthest behind. */
  next(): Promise<void> | null {
    if (this.#released) return null
    const [island] = this.#islands
      .filter(({ done, busy }) => !done && !busy)
      .sort((a, b) => (a.progress?.evaluations ?? 0) - (b.progress?.evaluations ?? 0) || a.number - b.number)
    if (!island) return null
    island.busy = true
    const work = this.#runSegment(island).finally(() => {
      island.busy = false
      this.#inHand.delete(work)
    })
    this.#inHand.add(work)
    return work
  }

  /** Starts no segment any more; those in hand are still committed. */
  release(): void {
    this.#released = true
  }

  /** Resolves when no segment is in hand. */
  async settled(): Promise<void> {
    while (this.#inHand.size > 0) await Promise.all(this.#inHand)
  }

  async #runSegment(island: Island): Promise<void> {
    try {
      const input = { problem: island.problem, state: island.state, ...this.#pace.next }
      const { background, pieceLimitMilliseconds } = this.#parts
      const output = await background.run('search-segment', input, {
        limitMilliseconds: pieceLimitMilliseconds,
        again: true,
      })
      await this.#commit(island, output)
    } catch (error) {
      await this.#fail(error).catch((error: unknown) => {
        // Not even that could be written; the row stays ours and is taken up again at the next beat.
        if (!this.#parts.closing.aborted)
          this.#parts.log.error({ err: error, search: this.id }, 'no end was written')
      })
    }
  }

  async #commit(island: Island, output: SegmentOutput): Promise<void> {
    const { storage, writes, streams } = this.#parts
    const before = island.progress?.evaluations ?? 0
    this.#pace.note(output.progress.evaluations - before, performance.now())
    // What other islands have committed meanwhile is read inside the transaction's turn, not before it.
    const write = async (manager: EntityManager) => {
      const finds = mergeFinds(this.#finds, island.number, output.finds, this.#search.keep)
      const islands = this.#islands.map((other) => (other === island ? output.progress : other.progress))
      this.#hitLine ??= await readHitLine(manager, this.#search, this.#search.targetVersion?.text ?? '')
      const progress = mergeProgress(islands, {
        evaluationsPerSecond: this.#pace.evaluationsPerSecond,
        budget: this.#search.budget,
        hitLine: this.#hitLine,
      })
      const state = await commitSegment(manager, {
        searchId: this.id,
        scoringHash: this.#search.scoringHash,
        island: island.number,
        segment: island.segment,
        output,
        progress,
        finds: sameFinds(finds, this.#finds) ? null : finds,
        finished: this.#islands.every((other) => (other === island ? output.done : other.done)),
      })
      return state === null ? null : { state, progress, finds }
    }
    const committed = await storage.insist(() => writes.transaction(write))
    if (committed === null) {
      this.#end()
      return
    }
    island.segment += 1
    island.state = output.state
    island.progress = output.progress
    island.done = output.done
    this.#finds = committed.finds
    const { state, progress } = committed
    streams.toCampaign(this.campaignId, { kind: 'search', id: this.id, state, progress })
    if (state === 'finished') {
      this.#end()
      streams.toCampaign(this.campaignId, { kind: 'changed', what: 'searches' })
    }
  }

  async #fail(error: unknown): Promise<void> {
    const { storage, writes, streams, log, closing } = this.#parts
    // A server that shuts down abandons its segments; they are run again at the next start.
    if (closing.aborted || this.#released) return
    this.#end()
    const failure =
      error instanceof ComputeFailure || error instanceof Refusal
        ? { code: error.code, message: error.message }
        : { code: 'internal-error', message: 'The server made a mistake; the last committed state is kept.' }
    // What a person can put right, such as a scope too large to enumerate, is no fault of the server.
    if (error instanceof Refusal) log.info({ code: error.code, search: this.id }, 'a search was refused')
    else log.error({ err: error, search: this.id }, 'a search failed')
    await storage.insist(() => writes.transaction((manager) => failSearch(manager, this.id, failure)))
    const progress = mergeProgress(
      this.#islands.map((island) => island.progress),
      { evaluationsPerSecond: null, budget: this.#search.budget, hitLine: this.#hitLine },
    )
    streams.toCampaign(this.campaignId, { kind: 'search', id: this.id, state: 'failed', progress })
    streams.toCampaign(this.campaignId, { kind: 'changed', what: 'searches' })
  }

  #end(): void {
    if (this.#released) return
    this.#released = true
    this.#ended(this)
  }
}
