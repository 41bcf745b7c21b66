/** Something with work to do for a campaign: a search, a null sample. */
export interface WorkSource {
  readonly campaignId: string
  /**
   * Starts the next piece of work and returns its end (which never rejects), or null when there is nothing to
   * start just now.
   */
  next(): Promise<void> | null
}

/**
 * Hands a fixed number of slots to the sources. The campaign that was served longest ago is next, and within it
 * the source that was, so that nobody waits behind another team's long run.
 */
export class Scheduler {
  readonly #slots: number
  /** Every source with the number of the turn in which it was served last; 0: never. */
  readonly #served = new Map<WorkSource, number>()
  readonly #campaignServed = new Map<string, number>()
  #turn = 0
  #busy = 0
  #stopped = false

  constructor(slots: number) {
    this.#slots = slots
  }

  add(source: WorkSource): void {
    if (!this.#served.has(source)) this.#served.set(source, 0)
    this.wake()
  }

  remove(source: WorkSource): void {
    this.#served.delete(source)
    const { campaignId } = source
    if ([...this.#served.keys()].every((other) => other.campaignId !== campaignId)) {
      this.#campaignServed.delete(campaignId)
    }
  }

  /** Fills free slots; to be called when a source may have become ready. */
  wake(): void {
    while (!this.#stopped && this.#busy < this.#slots) {
      const work = this.#startNext()
      if (work === null) return
      this.#busy += 1
      void work.finally(() => {
        this.#busy -= 1
        this.wake()
      })
    }
  }

  /** Starts nothing any more. */
  stop(): void {
    this.#stopped = true
  }

  #startNext(): Promise<void> | null {
    const lastServed = ({ campaignId }: WorkSource) => this.#campaignServed.get(campaignId) ?? 0
    const inTurn = [...this.#served].sort(
      ([a, servedA], [b, servedB]) => lastServed(a) - lastServed(b) || servedA - servedB,
    )
    for (const [source] of inTurn) {
      const work = source.next()
      if (work === null) continue
      this.#turn += 1
      if (this.#served.has(source)) this.#served.set(source, this.#turn)
      this.#campaignServed.set(source.campaignId, this.#turn)
      return work
    }
    return null
  }
}
