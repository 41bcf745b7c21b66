import type { RandomStream } from './randomStream.ts'

export interface ReservoirState<Row> {
  readonly capacity: number
  /** How many rows have been offered. */
  readonly offered: number
  readonly rows: readonly Row[]
}

/**
 * A uniform sample of all rows offered so far (Vitter's algorithm R): each of them is in it with the same
 * probability. While no more rows than its capacity were offered it holds them all, in order.
 */
export class Reservoir<Row> {
  private readonly capacity: number
  private offered: number
  private readonly rows: Row[]

  constructor(state: ReservoirState<Row>) {
    this.capacity = state.capacity
    this.offered = state.offered
    this.rows = [...state.rows]
  }

  state(): ReservoirState<Row> {
    return { capacity: this.capacity, offered: this.offered, rows: [...this.rows] }
  }

  /**
   * @param stream drawn from once, and only when the reservoir is full
   * @returns the place that the row has taken, or null when it was not taken in
   */
  offer(row: Row, stream: RandomStream): number | null {
    return this.offerMade(() => row, stream)
  }

  /** The same for a row that is made only when it is taken in. */
  offerMade(make: () => Row, stream: RandomStream): number | null {
    this.offered++
    if (this.rows.length < this.capacity) return this.rows.push(make()) - 1
    const place = stream.below(this.offered)
    if (place >= this.capacity) return null
    this.rows[place] = make()
    return place
  }
}
