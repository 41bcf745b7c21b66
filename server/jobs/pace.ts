/** Work of about this length is handed to a thread at a time: often enough for progress, rarely enough for speed. */
export const segmentMilliseconds = 900

/** How far back the rate of evaluations looks. */
const windowMilliseconds = 15_000

/** Learns how long evaluations take: sizes segments, and tells the rate by the clock on the wall. */
export class SegmentPace {
  readonly #aim: number
  #millisecondsEach: number | null = null
  readonly #recent: { readonly at: number; readonly evaluations: number }[] = []

  /** @param aim milliseconds that a segment should take */
  constructor(aim = segmentMilliseconds) {
    this.#aim = aim
  }

  /** Evaluations for the next segment. A first segment is small: nothing is known yet. */
  get nextEvaluations(): number {
    if (this.#millisecondsEach === null) return 2
    return Math.max(1, Math.min(20_000, Math.floor(this.#aim / this.#millisecondsEach)))
  }

  /** Takes note of a segment that ended at `now`. */
  note(evaluations: number, milliseconds: number, now: number): void {
    if (evaluations > 0) {
      const each = Math.max(0.001, milliseconds / evaluations)
      // Grow carefully: one lucky segment must not make the next one last for minutes.
      this.#millisecondsEach =
        this.#millisecondsEach === null ? each : Math.max(each, this.#millisecondsEach / 4)
    }
    this.#recent.push({ at: now, evaluations })
    while (this.#recent.length > 2 && now - this.#recent[0].at > windowMilliseconds) this.#recent.shift()
  }

  /** Evaluations per second over the last segments; null before the second one. */
  get evaluationsPerSecond(): number | null {
    if (this.#recent.length < 2) return null
    const [first, ...rest] = this.#recent
    const seconds = (rest[rest.length - 1].at - first.at) / 1000
    return seconds > 0 ? rest.reduce((sum, { evaluations }) => sum + evaluations, 0) / seconds : null
  }
}
