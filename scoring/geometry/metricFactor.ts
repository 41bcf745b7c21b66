import { InvariantError } from '../errors.ts'
import { factoriseDense, solveDense } from './denseCholesky.ts'
import { minimumDegreeOrder } from './minimumDegree.ts'
import { innerProduct } from './orthonormal.ts'
import { SparseCholesky } from './sparseCholesky.ts'
import type { PairNumbers, Volumes } from './volumes.ts'

/** Points with a pivot below this share of |A_ii| are set aside. */
const smallestPivot = 0.2

/**
 * The inverse metric M = 4 (tau tau^T - V A) over points that leave out four independent ones, factorised
 * sparsely. With rho = tau / sqrt(V), M = 4 V B and B = rho rho^T - A, where -A is sparse but has one negative
 * eigenvalue. So a sparse Cholesky factor of -A is made that sets aside the few points with a small or negative
 * pivot; on the others (F) rho rho^T is added by the formula of Sherman and Morrison, whose denominator
 * 1 + rho^T (-A_FF)^-1 rho is above 1, and the points set aside (D) enter through their Schur complement in B,
 * which is dense and small. Each part is a Cholesky factor of a positive definite matrix, so every step is
 * backward stable, and M is positive definite exactly when the Schur complement is.
 */
export class MetricFactor {
  private readonly size: number
  private readonly scale: number
  private readonly sparse: SparseCholesky
  private readonly density: Float64Array
  /** (-A_FF)^-1 rho and 1 / (1 + rho . that). */
  private readonly response: Float64Array
  private readonly damping: number
  /** Points set aside; the columns B_FD, (B_FF)^-1 B_FD and the packed factor of the Schur complement. */
  private readonly border: Int32Array
  private readonly columns: Float64Array[]
  private readonly solved: Float64Array[]
  private readonly complement: Float64Array
  private readonly borderPart: Float64Array

  /** @throws InvariantError when M is not positive definite on the points */
  constructor(points: Int32Array, pairs: PairNumbers, volumes: Volumes) {
    this.size = points.length
    this.scale = 1 / (4 * volumes.total)
    const place = new Int32Array(pairs.diagonal.length).fill(-1)
    for (let a = 0; a < points.length; a++) place[points[a]] = a
    const root = Math.sqrt(volumes.total)
    this.density = Float64Array.from(points, (p) => volumes.divisors[p] / root)

    const { edges, entries } = edgesAmong(place, pairs)
    const starts = Int32Array.from({ length: entries.length + 1 }, (_, e) => 2 * e)
    this.sparse = new SparseCholesky(minimumDegreeOrder(this.size, { starts, points: edges }))
    const { values } = this.sparse
    for (let a = 0; a < points.length; a++) values[this.sparse.entryOf(a, a)] = -pairs.diagonal[points[a]]
    for (let e = 0; e < entries.length; e++)
      values[this.sparse.entryOf(edges[2 * e], edges[2 * e + 1])] = entries[e]
    this.sparse.factoriseSettingAside(smallestPivot)

    const { aside } = this.sparse
    this.border = Int32Array.from(aside.keys()).filter((a) => aside[a] === 1)
    const main = this.density.map((value, a) => (aside[a] ? 0 : value))
    this.response = new Float64Array(this.size)
    this.sparse.solve(main, this.response)
    this.damping = 1 / (1 + innerProduct(main, this.response))

    const order = new Int32Array(this.size).fill(-1)
    this.border.forEach((a, d) => (order[a] = d))
    this.columns = Array.from(this.border, (a) => this.density.map((value) => value * this.density[a]))
    this.border.forEach((a, d) => (this.columns[d][a] -= pairs.diagonal[points[a]]))
    for (let e = 0; e < entries.length; e++) {
      const a = edges[2 * e]
      const b = edges[2 * e + 1]
      if (order[a] >= 0) this.columns[order[a]][b] += entries[e]
      if (order[b] >= 0) this.columns[order[b]][a] += entries[e]
    }
    this.solved = this.columns.map((column) => this.solveMain(column, new Float64Array(this.size)))
    this.complement = new Float64Array((this.border.length * (this.border.length + 1)) / 2)
    this.borderPart = new Float64Array(this.border.length)
    this.border.forEach((a, d) => {
      for (let e = 0; e <= d; e++) {
        this.complement[(d * (d + 1)) / 2 + e] =
          this.columns[e][a] - innerProduct(this.columns[e], this.solved[d])
      }
    })
    if (!factoriseDense(this.border.length, this.complement)) {
      throw new InvariantError(
        'The field-space metric is not positive definite: the point lies outside the cone.',
      )
    }
  }

  /** Solves M x = right; `x` may be `right` itself. */
  solve(right: Float64Array, x: Float64Array): void {
    const { border, borderPart, columns, solved } = this
    for (let d = 0; d < border.length; d++) borderPart[d] = right[border[d]]
    this.solveMain(right, x)
    for (let d = 0; d < border.length; d++) borderPart[d] -= innerProduct(columns[d], x)
    solveDense(border.length, this.complement, borderPart)
    for (let d = 0; d < border.length; d++) {
      const share = borderPart[d]
      const response = solved[d]
      for (let a = 0; a < x.length; a++) x[a] -= share * response[a]
    }
    for (let d = 0; d < border.length; d++) x[border[d]] = borderPart[d]
    for (let a = 0; a < x.length; a++) x[a] *= this.scale
  }

  /** (B_FF)^-1 right, zero on the points set aside. */
  private solveMain(right: Float64Array, x: Float64Array): Float64Array {
    const { response, damping } = this
    this.sparse.solve(right, x)
    const share = damping * innerProduct(this.density, x)
    for (let a = 0; a < x.length; a++) x[a] -= share * response[a]
    return x
  }
}

/** Edges between the points in use, as pairs of their places, and the entries -A_ij. */
function edgesAmong(place: Int32Array, pairs: PairNumbers): { edges: Int32Array; entries: Float64Array } {
  const edges = new Int32Array(pairs.edges.length)
  const entries = new Float64Array(pairs.offDiagonal.length)
  let count = 0
  for (let e = 0; e < pairs.offDiagonal.length; e++) {
    const a = place[pairs.edges[2 * e]]
    const b = place[pairs.edges[2 * e + 1]]
    if (a < 0 || b < 0) continue
    edges[2 * count] = a
    edges[2 * count + 1] = b
    entries[count++] = -pairs.offDiagonal[e]
  }
  return { edges: edges.subarray(0, 2 * count), entries: entries.subarray(0, count) }
}
