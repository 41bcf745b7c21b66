import { productDifference, type Fraction } from './fractions.ts'

/**
 * The walls that lie ahead on a line, at most one per interior edge, the next one first: a binary heap in which
 * each edge knows its place. Parameters are compared exactly: as doubles where they differ by more than rounding
 * can explain, else as products of integers.
 */
export class CrossingQueue {
  private count = 0
  private readonly heap: Int32Array
  /** Where an edge stands in the heap, -1 when it does not. */
  private readonly place: Int32Array
  private readonly over: Float64Array
  private readonly under: Float64Array
  private readonly quotient: Float64Array

  /** @param edges number of edges; they are named 0 to edges - 1 */
  constructor(edges: number) {
    this.heap = new Int32Array(edges)
    this.place = new Int32Array(edges).fill(-1)
    this.over = new Float64Array(edges)
    this.under = new Float64Array(edges)
    this.quotient = new Float64Array(edges)
  }

  /** The edge whose wall comes next, -1 when none lies ahead. Among walls at the same place, any. */
  first(): number {
    return this.count === 0 ? -1 : this.heap[0]
  }

  /** Where the wall of an edge in the queue is. */
  at(edge: number): Fraction {
    return { over: this.over[edge], under: this.under[edge] }
  }

  /** True when the edge's wall lies at the place given, exactly. */
  isAt(edge: number, { over, under }: Fraction): boolean {
    return productDifference(this.over[edge], under, over, this.under[edge]) === 0
  }

  /** Puts the edge's wall at over / under, wherever it was before. */
  put(edge: number, over: number, under: number): void {
    this.over[edge] = over
    this.under[edge] = under
    this.quotient[edge] = over / under
    if (this.place[edge] < 0) {
      this.place[edge] = this.count
      this.heap[this.count++] = edge
    }
    this.settle(this.place[edge])
  }

  /** Takes the edge's wall out, if it is there. */
  remove(edge: number): void {
    const place = this.place[edge]
    if (place < 0) return
    this.place[edge] = -1
    const last = this.heap[--this.count]
    if (last === edge) return
    this.heap[place] = last
    this.place[last] = place
    this.settle(place)
  }

  private precedes(e: number, f: number): boolean {
    const x = this.quotient[e]
    const y = this.quotient[f]
    // Quotients are rounded once: by half a unit in the last place each.
    if (Math.abs(x - y) > 2 * Number.EPSILON * (Math.abs(x) + Math.abs(y))) return x < y
    return productDifference(this.over[e], this.under[f], this.over[f], this.under[e]) < 0
  }

  /** Moves what stands at a place up or down until the heap is in order. */
  private settle(start: number): void {
    const { heap, place } = this
    const edge = heap[start]
    let at = start
    while (at > 0) {
      const parent = (at - 1) >> 1
      if (!this.precedes(edge, heap[parent])) break
      heap[at] = heap[parent]
      place[heap[at]] = at
      at = parent
    }
    for (;;) {
      let child = 2 * at + 1
      if (child >= this.count) break
      if (child + 1 < this.count && this.precedes(heap[child + 1], heap[child])) child++
      if (!this.precedes(heap[child], edge)) break
      heap[at] = heap[child]
      place[heap[at]] = at
      at = child
    }
    heap[at] = edge
    place[edge] = at
  }
}
