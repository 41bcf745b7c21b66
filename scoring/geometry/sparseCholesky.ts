import type { EliminationOrder } from './minimumDegree.ts'

/**
 * A pivot below this share of its row's largest entry is set aside too: it may be an exact zero moved by rounding,
 * and dividing by it would cost as many digits. Setting a sound pivot aside costs time only.
 */
const leastShareOfRow = 1e-6

/**
 * Sparse Cholesky factor P M P^T = L L^T of a positive definite matrix in a fixed elimination order. The
 * values of L stand where `order.rows` says: write the lower triangle of P M P^T into `values` (zero where
 * M has none), call `factorise`, then `solve` as often as wanted. Everything is allocated once.
 */
export class SparseCholesky {
  readonly order: EliminationOrder
  readonly values: Float64Array
  /** 1 for the variables (by index, not position) that the last factorisation set aside. */
  readonly aside: Uint8Array
  private readonly column: Float64Array
  private readonly permuted: Float64Array
  /** First column in the list of those whose next row to be used is this one; then the next in the list. */
  private readonly listHead: Int32Array
  private readonly listNext: Int32Array
  private readonly cursor: Int32Array

  constructor(order: EliminationOrder) {
    this.order = order
    this.values = new Float64Array(order.rows.length)
    this.aside = new Uint8Array(order.size)
    this.column = new Float64Array(order.size)
    this.permuted = new Float64Array(order.size)
    this.listHead = new Int32Array(order.size)
    this.listNext = new Int32Array(order.size)
    this.cursor = new Int32Array(order.size)
  }

  /** Index into `values` of the entry that couples variables a and b; the pair must be in the pattern. */
  entryOf(a: number, b: number): number {
    const { positionOf, starts, rows } = this.order
    const p = Math.min(positionOf[a], positionOf[b])
    const row = Math.max(positionOf[a], positionOf[b])
    let low = starts[p]
    let high = starts[p + 1] - 1
    while (low < high) {
      const middle = (low + high) >> 1
      if (rows[middle] < row) low = middle + 1
      else high = middle
    }
    return low
  }

  /**
   * Overwrites the matrix in `values` by its factor, column by column, each gathering the earlier columns that
   * reach it. Returns false (with `values` spoilt) when a pivot is not positive.
   */
  factorise(): boolean {
    return this.eliminate(-1)
  }

  /**
   * Factorises the principal submatrix without the variables whose pivot falls to `ratio` times the size of
   * their diagonal entry or below: they are marked in `aside` and solutions are zero there. The rest is positive
   * definite by construction, with bounded pivots.
   */
  factoriseSettingAside(ratio: number): void {
    this.eliminate(ratio)
  }

  private eliminate(ratio: number): boolean {
    const { order, values, column, listHead, listNext, cursor, aside } = this
    const { size, starts, rows } = order
    listHead.fill(-1)
    aside.fill(0)
    const largest = ratio < 0 ? undefined : this.largestPerRow()
    for (let j = 0; j < size; j++) {
      const start = starts[j]
      const end = starts[j + 1]
      for (let q = start; q < end; q++) column[rows[q]] = values[q]
      let k = listHead[j]
      while (k >= 0) {
        const following = listNext[k]
        const from = cursor[k]
        const stop = starts[k + 1]
        const factor = values[from]
        for (let q = from; q < stop; q++) column[rows[q]] -= factor * values[q]
        this.enlist(k, from + 1, stop)
        k = following
      }
      const pivot = column[j]
      const least =
        largest === undefined ? 0 : Math.max(ratio * Math.abs(values[start]), leastShareOfRow * largest[j])
      if (!(pivot > least)) {
        if (ratio < 0) return false
        aside[order.order[j]] = 1
        values[start] = 1
        values.fill(0, start + 1, end)
        continue
      }
      const root = Math.sqrt(pivot)
      values[start] = root
      for (let q = start + 1; q < end; q++) values[q] = column[rows[q]] / root
      this.enlist(j, start + 1, end)
    }
    return true
  }

  /** Largest entry of each row by size: what is far below it is a zero that rounding has moved. */
  private largestPerRow(): Float64Array {
    const { order, values } = this
    const largest = new Float64Array(order.size)
    for (let j = 0; j < order.size; j++) {
      for (let q = order.starts[j]; q < order.starts[j + 1]; q++) {
        const size = Math.abs(values[q])
        if (size > largest[j]) largest[j] = size
        if (size > largest[order.rows[q]]) largest[order.rows[q]] = size
      }
    }
    return largest
  }

  private enlist(k: number, next: number, stop: number): void {
    if (next >= stop) return
    const row = this.order.rows[next]
    this.cursor[k] = next
    this.listNext[k] = this.listHead[row]
    this.listHead[row] = k
  }

  /** Solves M x = right; `x` may be `right` itself. */
  solve(right: Float64Array, x: Float64Array): void {
    const { order, values, aside, permuted: y } = this
    const { size, order: variables, starts, rows } = order
    for (let p = 0; p < size; p++) y[p] = right[variables[p]]
    for (let p = 0; p < size; p++) {
      const value = y[p] / values[starts[p]]
      y[p] = value
      for (let q = starts[p] + 1; q < starts[p + 1]; q++) y[rows[q]] -= values[q] * value
    }
    for (let p = size - 1; p >= 0; p--) {
      let value = aside[variables[p]] ? 0 : y[p]
      for (let q = starts[p] + 1; q < starts[p + 1]; q++) value -= values[q] * y[rows[q]]
      y[p] = value / values[starts[p]]
    }
    for (let p = 0; p < size; p++) x[variables[p]] = y[p]
  }
}
