/** Counts of values in `counts.length` bins of equal width: bin n covers [start + n width, start + (n + 1) width). */
export interface HistogramState {
  /** Power of two; 0 while no value has come. */
  readonly width: number
  /** A multiple of `width`. */
  readonly start: number
  readonly counts: readonly number[]
  /** Least and greatest value in each occupied bin, in the order of bins; absent in states of earlier versions. */
  readonly ends?: readonly (readonly [least: number, greatest: number])[]
}

/** What is shown: bin edges (one more than counts), ascending. */
export interface HistogramView {
  readonly edges: number[]
  readonly counts: number[]
}

/** A count that is known up to the values of one bin. */
export interface BinnedCount {
  readonly least: number
  readonly most: number
}

const binCount = 512
const finest = 2 ** -20

export const emptyHistogram: HistogramState = { width: 0, start: 0, counts: [] }

interface Bin {
  count: number
  least: number
  greatest: number
}

/**
 * A histogram of values whose range is not known beforehand. Widths are powers of two and edges multiples of
 * them, so bins merge in pairs without splitting a count: the result depends on the values, and when the range
 * has grown, not on how a run was cut.
 */
export class Histogram {
  private width: number
  private start: number
  /** Occupied bins by number. */
  private bins: Map<number, Bin>

  constructor(state: HistogramState = emptyHistogram) {
    this.width = state.width
    this.start = state.start
    this.bins = new Map()
    for (const [n, count] of state.counts.entries()) {
      if (count === 0) continue
      // Where the values are not known, the edges of their bin are all that can be said.
      const [least, greatest] = state.ends?.[this.bins.size] ?? [this.edge(n), this.edge(n + 1)]
      this.bins.set(n, { count, least, greatest })
    }
  }

  state(): HistogramState {
    if (this.width === 0) return emptyHistogram
    const counts = new Array<number>(binCount).fill(0)
    const ends: [number, number][] = []
    for (const [n, { count, least, greatest }] of this.ascending()) {
      counts[n] = count
      ends.push([least, greatest])
    }
    return { width: this.width, start: this.start, counts, ends }
  }

  /** Counts one finite value. */
  add(value: number): void {
    // Plus zero: -0 would not survive a state's way through JSON.
    this.put(value, { count: 1, least: value + 0, greatest: value + 0 })
  }

  /** Adds the counts of another histogram; bins of the finer one are merged first. */
  addAll(other: HistogramState): void {
    const given = new Histogram(other)
    for (const [n, bin] of given.ascending()) {
      this.put(given.edge(n), bin)
      while (this.width < given.width) this.widen(this.start)
    }
  }

  /**
   * How many of the values lie above a line. Exact unless the line falls between two values of one bin, of which
   * any number may then lie above it.
   */
  countAbove(line: number): BinnedCount {
    let least = 0
    let most = 0
    for (const bin of this.bins.values()) {
      if (bin.least > line) least += bin.count
      if (bin.greatest > line) most += bin.count
    }
    return { least, most }
  }

  /** At most `bins` bins over the occupied range; null without values. */
  view(bins = 40): HistogramView | null {
    const occupied = this.ascending()
    if (occupied.length === 0) return null
    const from = occupied[0][0]
    const to = occupied[occupied.length - 1][0] + 1
    let merged = 1
    const firstOf = (m: number): number => Math.floor((this.start / this.width + from) / m)
    const lastOf = (m: number): number => Math.ceil((this.start / this.width + to) / m)
    while (lastOf(merged) - firstOf(merged) > bins) merged *= 2
    const first = firstOf(merged)
    const counts = new Array<number>(lastOf(merged) - first).fill(0)
    for (const [n, { count }] of occupied) {
      counts[Math.floor((this.start / this.width + n) / merged) - first] += count
    }
    const edges: number[] = []
    for (let n = 0; n <= counts.length; n++) edges.push((first + n) * merged * this.width)
    return { edges, counts }
  }

  /** @param value any point of the bin's interval */
  private put(value: number, bin: Bin): void {
    if (this.width === 0) {
      // The finest bins that still resolve the value exactly.
      this.width = finest * Math.max(1, 2 ** Math.ceil(Math.log2(Math.abs(value) || 1)))
      this.start = (this.multiple(value) - binCount / 2) * this.width
    }
    while (value < this.start || value >= this.edge(binCount)) this.widen(value)
    this.merge(this.multiple(value) - this.start / this.width, bin)
  }

  private merge(n: number, { count, least, greatest }: Bin): void {
    const bin = this.bins.get(n)
    if (bin === undefined) {
      this.bins.set(n, { count, least, greatest })
      return
    }
    bin.count += count
    bin.least = Math.min(bin.least, least)
    bin.greatest = Math.max(bin.greatest, greatest)
  }

  private edge(n: number): number {
    return this.start + n * this.width
  }

  /** The largest n with n width <= value, exact because width is a power of two. */
  private multiple(value: number): number {
    const n = Math.floor(value / this.width)
    return n === 0 && value < 0 ? -1 : n
  }

  /** Doubles the width, with the new range shifted towards the value that has to fit. */
  private widen(value: number): void {
    const width = 2 * this.width
    const old = [...this.bins].map(([n, bin]) => ({ bin, at: this.edge(n) }))
    const middle = this.edge(binCount / 2) / width
    const first =
      value < this.start ? Math.ceil(middle) - (3 * binCount) / 4 : Math.floor(middle) - binCount / 4
    this.width = width
    this.start = first * width
    this.bins = new Map()
    for (const { bin, at } of old) this.merge(Math.floor(at / width) - first, bin)
  }

  private ascending(): [number, Bin][] {
    return [...this.bins].sort(([a], [b]) => a - b)
  }
}
