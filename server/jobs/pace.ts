/** Work of about this length is handed to a thread at a time: often enough for progress, rarely enough for speed. */
export const segmentMilliseconds = 1_000

/** How far back the rate of evaluations looks. */
const windowMilliseconds = 15_000

/** The size of a segment: evaluations and milliseconds, whichever comes first. */
export interface SegmentSize {
  readonly evaluations: number
  readonly milliseconds: number
}

/** Sizes the segments of a run, and tells its rate by the time that goes by. */
export class SegmentPace {
  readonly #milliseconds: number
  readonly #recent: { readonly at: number; readonly evaluations: number }[] = []

  /**
   * @param milliseconds that a segment takes. It is the thread that measures them: evaluations of one rule differ in
   *   cost by a factor of ten thousand (those that fail at the polytope, those that need a spectrum), so no estimate
   *   from earlier ones would do.
   */
  constructor(milliseconds: number) {
    this.#milliseconds = milliseconds
  }

  /** The next segment. The first is small, so that there is something to see soon. */
  get next(): SegmentSize {
    const evaluations = this.#recent.length === 0 ? 2 : 1_000_000
    return { evaluations, milliseconds: this.#milliseconds }
  }

  /** Takes note of a segment that ended at `now`, by a clock that never jumps (milliseconds). */
  note(evaluations: number, now: number): void {
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
