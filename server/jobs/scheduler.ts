import { FairShares } from './fairShares.ts'

/** Something with work to do for a campaign: a search, a null sample. */
export interface WorkSource {
  readonly campaignId: string
  /** What kind of work it is; kinds share a campaign's threads equally. Searches when left out. */
  readonly lane?: 'searches' | 'samples' | 'certificates' | 'counts' | 'lists'
  /**
   * Starts the next piece of work and returns its end (which never rejects), or null when there is nothing to
   * start just now.
   */
  next(): Promise<void> | null
}

interface SchedulerOptions {
  /** Milliseconds that only ever grow. */
  readonly steadyClock?: () => number
  /** Told of a source that broke its promise and threw; it is removed. */
  readonly broken?: (source: WorkSource, error: unknown) => void
}

/** Where a source stands: pieces in hand, and its place among the sources that have none (1: the next). */
export interface Standing {
  readonly inHand: number
  readonly place: number | null
}

/**
 * Hands a fixed number of slots (worker threads) to the sources. Thread time is divided equally between the campaigns
 * that have work, within a campaign between the kinds of work, within a kind between its sources: at each level the one
 * that has had least is next, so that nobody waits behind another team's long run, nor behind many short ones.
 */
export class Scheduler {
  readonly #slots: number
  readonly #clock: () => number
  readonly #broken: (source: WorkSource, error: unknown) => void
  /** Sources by campaign and lane, in the order in which they came. */
  readonly #sources = new Map<string, Map<string, Set<WorkSource>>>()
  readonly #campaigns = new FairShares<string>()
  readonly #lanes = new Map<string, FairShares<string>>()
  readonly #single = new FairShares<WorkSource>()
  readonly #inHand = new Map<WorkSource, number>()
  #turn = 0
  #busy = 0
  #stopped = false
  #held = false

  constructor(slots: number, { steadyClock, broken }: SchedulerOptions = {}) {
    this.#slots = slots
    this.#clock = steadyClock ?? (() => performance.now())
    this.#broken = broken ?? (() => undefined)
  }

  get slots(): number {
    return this.#slots
  }

  add(source: WorkSource): void {
    const { campaignId } = source
    const lane = laneOf(source)
    const lanes = this.#sources.get(campaignId) ?? new Map<string, Set<WorkSource>>()
    const sources = lanes.get(lane) ?? new Set<WorkSource>()
    if (!sources.has(source)) {
      const now = this.#clock()
      if (lanes.size === 0) this.#campaigns.join(campaignId, this.#sources.keys(), now)
      if (sources.size === 0) this.#lanesOf(campaignId).join(lane, lanes.keys(), now)
      this.#single.join(source, sources, now)
      this.#sources.set(campaignId, lanes.set(lane, sources.add(source)))
    }
    this.wake()
  }

  remove(source: WorkSource): void {
    const { campaignId } = source
    const lanes = this.#sources.get(campaignId)
    const sources = lanes?.get(laneOf(source))
    if (!lanes || !sources) return
    sources.delete(source)
    this.#single.forget(source)
    if (sources.size === 0) lanes.delete(laneOf(source))
    if (lanes.size === 0) this.#sources.delete(campaignId)
  }

  /** Fills free slots; to be called when a source may have become ready. */
  wake(): void {
    while (!this.#stopped && !this.#held && this.#busy < this.#slots) {
      if (!this.#startNext()) return
    }
  }

  /** Starts nothing until `release`. */
  hold(): void {
    this.#held = true
  }

  release(): void {
    this.#held = false
    this.wake()
  }

  /** Starts nothing any more. */
  stop(): void {
    this.#stopped = true
  }

  /** Where each source stands now. A place assumes that each of those waiting has one piece to do. */
  standings(): Map<WorkSource, Standing> {
    const standings = new Map<WorkSource, Standing>()
    const waiting: { readonly source: WorkSource; readonly before: readonly number[] }[] = []
    const now = this.#clock()
    const campaigns = this.#campaigns.order(this.#sources.keys(), now)
    campaigns.forEach((campaignId, campaign) => {
      const lanes = this.#sources.get(campaignId) ?? new Map<string, Set<WorkSource>>()
      // In turns: the first of every campaign, then the second of every campaign, and so on; so too for lanes.
      const lines = this.#lanesOf(campaignId)
        .order(lanes.keys(), now)
        .map((lane) => this.#single.order(lanes.get(lane) ?? [], now).filter((s) => !this.#inHand.has(s)))
      inTurns(lines).forEach((source, round) => waiting.push({ source, before: [round, campaign] }))
      for (const sources of lanes.values()) {
        for (const source of sources) {
          const inHand = this.#inHand.get(source) ?? 0
          if (inHand > 0) standings.set(source, { inHand, place: null })
        }
      }
    })
    waiting.sort((a, b) => a.before[0] - b.before[0] || a.before[1] - b.before[1])
    waiting.forEach(({ source }, i) => standings.set(source, { inHand: 0, place: i + 1 }))
    return standings
  }

  #startNext(): boolean {
    const now = this.#clock()
    const campaigns = this.#campaigns.order(this.#sources.keys(), now)
    for (const [c, campaignId] of campaigns.entries()) {
      const lanes = this.#sources.get(campaignId)
      const laneShares = this.#lanesOf(campaignId)
      const laneOrder = laneShares.order(lanes?.keys() ?? [], now)
      for (const [l, lane] of laneOrder.entries()) {
        const sources = this.#single.order(lanes?.get(lane) ?? [], now)
        for (const [s, source] of sources.entries()) {
          const work = this.#begin(source)
          if (work === null) continue
          this.#turn += 1
          this.#campaigns.begin(campaignId, campaigns.slice(0, c), now, this.#turn)
          laneShares.begin(lane, laneOrder.slice(0, l), now, this.#turn)
          this.#single.begin(source, sources.slice(0, s), now, this.#turn)
          this.#follow(source, work, now)
          return true
        }
      }
    }
    return false
  }

  #begin(source: WorkSource): Promise<void> | null {
    try {
      return source.next()
    } catch (error) {
      return Promise.reject(error instanceof Error ? error : new Error(String(error)))
    }
  }

  #follow(source: WorkSource, work: Promise<void>, since: number): void {
    this.#busy += 1
    this.#inHand.set(source, (this.#inHand.get(source) ?? 0) + 1)
    const over = () => {
      const now = this.#clock()
      const left = (this.#inHand.get(source) ?? 1) - 1
      if (left > 0) this.#inHand.set(source, left)
      else this.#inHand.delete(source)
      this.#campaigns.end(source.campaignId, since, now)
      this.#lanesOf(source.campaignId).end(laneOf(source), since, now)
      this.#single.end(source, since, now)
      this.#busy -= 1
      this.wake()
    }
    work.then(over, (error: unknown) => {
      // Left in, it would be asked again at once, for ever.
      this.remove(source)
      this.#broken(source, error)
      over()
    })
  }

  #lanesOf(campaignId: string): FairShares<string> {
    let lanes = this.#lanes.get(campaignId)
    if (!lanes) this.#lanes.set(campaignId, (lanes = new FairShares()))
    return lanes
  }
}

const laneOf = ({ lane }: WorkSource) => lane ?? 'searches'

/** The first of each line, then the second of each, and so on. */
function inTurns<T>(lines: readonly (readonly T[])[]): T[] {
  const longest = Math.max(0, ...lines.map(({ length }) => length))
  return Array.from({ length: longest }, (_, i) => lines.flatMap((line) => line.slice(i, i + 1))).flat()
}
