import type { Circuits } from './circuits.ts'

/**
 * Integer rows c_r that cut out a cone of heights, c_r . w > 0 for all r: the circuits of a 2-face class or of a
 * whole fan. What the methods that decide about the cone need of them.
 */
export interface ConeRows {
  readonly count: number
  /** c_row . w */
  value(row: number, w: ArrayLike<number>): number
  /** Adds factor * c_row to a vector over the points. */
  add(row: number, factor: number, to: Float64Array): void
  /** c_r . c_s */
  dot(r: number, s: number): number
  /** Calls back for every point of the row with its coefficient, not 0; no point comes twice. */
  each(row: number, entry: (point: number, coefficient: number) => void): void
}

/** The rows w_k + w_l - a w_i - b w_j of a class. */
export class EdgeRows implements ConeRows {
  readonly count: number

  constructor(private readonly circuits: Circuits) {
    this.count = circuits.count
  }

  value(row: number, w: ArrayLike<number>): number {
    const { i, j, k, l, a, b } = this.circuits
    return w[k[row]] + w[l[row]] - a[row] * w[i[row]] - b[row] * w[j[row]]
  }

  add(row: number, factor: number, to: Float64Array): void {
    const { i, j, k, l, a, b } = this.circuits
    to[k[row]] += factor
    to[l[row]] += factor
    to[i[row]] -= factor * a[row]
    to[j[row]] -= factor * b[row]
  }

  dot(r: number, s: number): number {
    const { i, j, k, l, a, b } = this.circuits
    const [is, js, ks, ls, as, bs] = [i[s], j[s], k[s], l[s], a[s], b[s]]
    const at = (p: number): number =>
      (p === ks ? 1 : 0) + (p === ls ? 1 : 0) - (p === is ? as : 0) - (p === js ? bs : 0)
    return at(k[r]) + at(l[r]) - a[r] * at(i[r]) - b[r] * at(j[r])
  }

  each(row: number, entry: (point: number, coefficient: number) => void): void {
    const { i, j, k, l, a, b } = this.circuits
    entry(k[row], 1)
    entry(l[row], 1)
    if (a[row] !== 0) entry(i[row], -a[row])
    if (b[row] !== 0) entry(j[row], -b[row])
  }
}

/** Rows of any length. */
export class SparseConeRows implements ConeRows {
  readonly count: number

  constructor(
    private readonly rows: readonly {
      readonly points: readonly number[]
      readonly coefficients: readonly number[]
    }[],
  ) {
    this.count = rows.length
  }

  value(row: number, w: ArrayLike<number>): number {
    const { points, coefficients } = this.rows[row]
    let sum = 0
    for (let m = 0; m < points.length; m++) sum += coefficients[m] * w[points[m]]
    return sum
  }

  add(row: number, factor: number, to: Float64Array): void {
    const { points, coefficients } = this.rows[row]
    for (let m = 0; m < points.length; m++) to[points[m]] += factor * coefficients[m]
  }

  dot(r: number, s: number): number {
    const one = this.rows[r]
    const other = this.rows[s]
    let sum = 0
    for (let m = 0; m < one.points.length; m++) {
      for (let n = 0; n < other.points.length; n++) {
        if (one.points[m] === other.points[n]) sum += one.coefficients[m] * other.coefficients[n]
      }
    }
    return sum
  }

  each(row: number, entry: (point: number, coefficient: number) => void): void {
    const { points, coefficients } = this.rows[row]
    for (let m = 0; m < points.length; m++) entry(points[m], coefficients[m])
  }
}
