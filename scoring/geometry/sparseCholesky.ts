import { eliminationPlan, placeOf, type EliminationPlan } from './eliminationPlan.ts'
import { innerProduct } from './innerProduct.ts'
import type { EliminationOrder } from './minimumDegree.ts'

/**
 * A pivot below this share of its row's largest entry is set aside too: it may be an exact zero moved by rounding,
 * and dividing by it would cost as many digits. Setting a sound pivot aside costs time only.
 */
const leastShareOfRow = 1e-6

/**
 * Sparse Cholesky factor P M P^T = L L^T of a positive definite matrix in a fixed elimination order. The
 * values of L stand where the plan says: write the lower triangle of P M P^T into `values` by `entryOf` (zero where
 * M has none), call `factorise`, then `solve` as often as wanted. Everything is allocated once. On the diagonal
 * the factor keeps the inverses of its entries.
 */
export class SparseCholesky {
  readonly order: EliminationOrder
  readonly values: Float64Array
  /** 1 for the variables (by index, not position) that the last factorisation set aside. */
  readonly aside: Uint8Array
  private readonly plan: EliminationPlan
  private readonly permuted: Float64Array
  /** Least pivot of each position that is not set aside. */
  private readonly least: Float64Array

  constructor(order: EliminationOrder) {
    this.order = order
    this.plan = eliminationPlan(order)
    this.values = new Float64Array(this.plan.length)
    this.aside = new Uint8Array(order.size)
    this.permuted = new Float64Array(order.size)
    this.least = new Float64Array(order.size)
  }

  /** Index into `values` of the entry that couples variables a and b; the pair must be in the pattern. */
  entryOf(a: number, b: number): number {
    return placeOf(this.plan, a, b)
  }

  /** Overwrites the matrix in `values` by its factor. Returns false (with `values` spoilt) when a pivot is not positive. */
  factorise(): boolean {
    this.least.fill(0)
    return this.eliminateSparse(false) && this.eliminateFull(false)
  }

  /**
   * Factorises the principal submatrix without the variables whose pivot falls to `ratio` times the size of
   * their diagonal entry or below: they are marked in `aside` and solutions are zero there. The rest is positive
   * definite by construction, with bounded pivots.
   */
  factoriseSettingAside(ratio: number): void {
    this.findLeastPivots(ratio)
    this.eliminateSparse(true)
    this.eliminateFull(true)
  }

  /** The sparse columns, each taking its products from the later ones at once. */
  private eliminateSparse(setAside: boolean): boolean {
    const { values, aside, least } = this
    const { sparse, targets, order } = this.plan
    const { starts } = order
    aside.fill(0)
    let next = 0
    for (let j = 0; j < sparse; j++) {
      const start = starts[j]
      const end = starts[j + 1]
      const pivot = values[start]
      if (!(pivot > least[j])) {
        if (!setAside) return false
        aside[order.order[j]] = 1
        values[start] = 1
        values.fill(0, start + 1, end)
        next += ((end - start) * (end - start - 1)) / 2
        continue
      }
      const inverse = 1 / Math.sqrt(pivot)
      values[start] = inverse
      for (let q = start + 1; q < end; q++) values[q] *= inverse
      for (let a = start + 1; a < end; a++) {
        const factor = values[a]
        for (let b = a; b < end; b++) values[targets[next++]] -= factor * values[b]
      }
    }
    return true
  }

  /** The packed triangle, row by row, so that both factors of every inner product are contiguous. */
  private eliminateFull(setAside: boolean): boolean {
    const { values, aside, least } = this
    const { sparse, order } = this.plan
    const base = order.starts[sparse]
    const count = order.size - sparse
    for (let i = 0, own = base; i < count; own += ++i) {
      for (let j = 0, other = base; j < i; other += ++j) {
        values[own + j] = aside[order.order[sparse + j]]
          ? 0
          : (values[own + j] - innerProduct(values, own, other, j)) * values[other + j]
      }
      const pivot = values[own + i] - innerProduct(values, own, own, i)
      if (!(pivot > least[sparse + i])) {
        if (!setAside) return false
        aside[order.order[sparse + i]] = 1
        values[own + i] = 1
      } else {
        values[own + i] = 1 / Math.sqrt(pivot)
      }
    }
    return true
  }

  /** By the diagonal, and by the largest entry of each row: what is far below it is a zero that rounding has moved. */
  private findLeastPivots(ratio: number): void {
    const { values, least } = this
    const { sparse, order } = this.plan
    const { size, starts, rows } = order
    const largest = new Float64Array(size)
    const compare = (row: number, column: number, at: number): void => {
      const entry = Math.abs(values[at])
      if (entry > largest[row]) largest[row] = entry
      if (entry > largest[column]) largest[column] = entry
      if (row === column) least[row] = ratio * entry
    }
    for (let j = 0; j < sparse; j++) for (let q = starts[j]; q < starts[j + 1]; q++) compare(rows[q], j, q)
    let at = starts[sparse]
    for (let i = sparse; i < size; i++) for (let j = sparse; j <= i; j++) compare(i, j, at++)
    for (let p = 0; p < size; p++) least[p] = Math.max(least[p], leastShareOfRow * largest[p])
  }

  /** Solves M x = right; `x` may be `right` itself. */
  solve(right: Float64Array, x: Float64Array): void {
    const { values, aside, permuted: y } = this
    const { sparse, order } = this.plan
    const { size, order: variables, starts, rows } = order
    for (let p = 0; p < size; p++) y[p] = right[variables[p]]
    for (let p = 0; p < sparse; p++) {
      const start = starts[p]
      const value = y[p] * values[start]
      y[p] = value
      for (let q = start + 1, end = starts[p + 1]; q < end; q++) y[rows[q]] -= values[q] * value
    }
    let at = starts[sparse]
    for (let p = sparse; p < size; p++) {
      let value = y[p]
      for (let k = sparse; k < p; k++) value -= values[at++] * y[k]
      y[p] = value * values[at++]
    }
    for (let p = size - 1; p >= sparse; p--) {
      const value = aside[variables[p]] ? 0 : y[p] * values[at - 1]
      y[p] = value
      at -= p - sparse + 1
      for (let k = sparse; k < p; k++) y[k] -= values[at + k - sparse] * value
    }
    for (let p = sparse - 1; p >= 0; p--) {
      const start = starts[p]
      let value = aside[variables[p]] ? 0 : y[p]
      for (let q = start + 1, end = starts[p + 1]; q < end; q++) value -= values[q] * y[rows[q]]
      y[p] = value * values[start]
    }
    for (let p = 0; p < size; p++) x[variables[p]] = y[p]
  }
}
