/** Counts of values in `counts.length` bins of equal width: bin n covers [start + n width, start + (n + 1) width). */
export interface HistogramState {
  /** Power of two; 0 while no value has come. */
  readonly width: number
  /** A multiple of `width`. */
  readonly start: number
  readonly counts: readonly number[]
}

/** What is shown: bin edges (one more than counts), ascending. */
export interface HistogramView {
  readonly edges: number[]
  readonly counts: number[]
}

const binCount = 128
const finest = 2 ** -20

export const emptyHistogram: HistogramState = { width: 0, start: 0, counts: [] }

/**
 * A histogram of values whose range is not known beforehand. Widths are powers of two and edges multiples of
 * them, so bins merge in pairs without splitting a count: the result depends on the values, and when the range
 * has grown, not on how a run was cut.
 */
export class Histogram {
  private width: number
  private start: number
  private counts: number[]

  constructor(state: HistogramState = emptyHistogram) {
    this.width = state.width
    this.start = state.start
    this.counts = [...state.counts]
  }

  state(): HistogramState {
    return { width: this.width, start: this.start, counts: [...this.counts] }
  }

  /** Counts one finite value. */
  add(value: number, count = 1): void {
    if (this.width === 0) {
      // The finest bins that still resolve the value exactly.
      this.width = finest * Math.max(1, 2 ** Math.ceil(Math.log2(Math.abs(value) || 1)))
      this.counts = new Array<number>(binCount).fill(0)
      this.start = (this.multiple(value) - binCount / 2) * this.width
    }
    while (value < this.start || value >= this.start + binCount * this.width) this.widen(value)
    this.counts[this.multiple(value) - this.start / this.width] += count
  }

  /** The largest n with n width <= value, exact because width is a power of two. */
  private multiple(value: number): number {
    const n = Math.floor(value / this.width)
    return n === 0 && value < 0 ? -1 : n
  }

  /** Adds the counts of another histogram; bins of the finer one are merged first. */
  addAll(other: HistogramState): void {
    if (other.width === 0) return
    const step = other.width
    for (const [n, count] of other.counts.entries()) {
      if (count === 0) continue
      this.add(other.start + n * step, count)
      while (this.width < step) this.widen(this.start)
    }
  }

  /** Doubles the width, with the new range shifted towards the value that has to fit. */
  private widen(value: number): void {
    const width = 2 * this.width
    const old = this.counts.map((count, n) => ({ count, at: this.start + n * this.width }))
    const middle = (this.start + (binCount / 2) * this.width) / width
    const first =
      value < this.start ? Math.ceil(middle) - (3 * binCount) / 4 : Math.floor(middle) - binCount / 4
    this.width = width
    this.start = first * width
    this.counts = new Array<number>(binCount).fill(0)
    for (const { count, at } of old) {
      if (count > 0) this.counts[Math.floor(at / width) - first] += count
    }
  }

  /** At most `bins` bins over the occupied range; null without values. */
  view(bins = 40): HistogramView | null {
    const from = this.counts.findIndex((count) => count > 0)
    if (from < 0) return null
    const to = this.counts.findLastIndex((count) => count > 0) + 1
    let merged = 1
    const firstOf = (m: number): number => Math.floor((this.start / this.width + from) / m)
    const lastOf = (m: number): number => Math.ceil((this.start / this.width + to) / m)
    while (lastOf(merged) - firstOf(merged) > bins) merged *= 2
    const first = firstOf(merged)
    const counts = new Array<number>(lastOf(merged) - first).fill(0)
    for (let n = from; n < to; n++) {
      counts[Math.floor((this.start / this.width + n) / merged) - first] += this.counts[n]
    }
    const edges: number[] = []
    for (let n = 0; n <= counts.length; n++) edges.push((first + n) * merged * this.width)
    return { edges, counts }
  }
}
