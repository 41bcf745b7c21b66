import type { NormalMatrix } from './normalMatrix.ts'
import { largestSize, squaredLength, timesColumn, timesRow, type SparseRows } from './sparseRows.ts'

/** Largest penalty of the multiplier iteration, and its share of the mean square of the singular values. */
const largestPenalty = 1e-9
const penaltyShare = 1e-2
const maximalSweeps = 40
/** A sweep that leaves more than this share of the error is the last. */
const stagnation = 0.8
/** Shortfalls beyond this are a contradiction among the equations; parts of one below the other are rounding. */
const contradiction = 1e-4
const negligibleShortfall = 1e-7

/** A point of least norm with the multipliers that prove it. */
export interface PointOnRows {
  readonly point: Float64Array
  readonly multipliers: Float64Array
}

/**
 * The point of least norm from a point (w, s, y) near it, by a dual active-set method (after Goldfarb and Idnani
 * 1983, Math. Program. 27, 1): the rows with y > s in units of their typical sizes are taken as equations; then
 * rows with a negative multiplier are released, the most violated row is added, and where the equations
 * contradict each other the multipliers move along the contradiction until a row falls out. When nothing is left
 * to change, the point is optimal for all rows.
 *
 * Undefined when that takes more than `changes`, or rounding stands in the way, or no point satisfies the rows.
 */
export function pointOnActiveRows(
  rows: SparseRows,
  normal: NormalMatrix,
  w: Float64Array,
  s: Float64Array,
  y: Float64Array,
  changes: number,
): PointOnRows | undefined {
  const typical = squaredLength(w) / s.length
  const active = Uint8Array.from(s, (slack, r) => (y[r] > slack * typical ? 1 : 0))
  const equations = new Equations(rows, normal, active)
  const multipliers = y.map((value, r) => (active[r] ? value : 0))
  const point = Float64Array.from(w)
  for (let change = 0; change <= changes; change++) {
    const before = Float64Array.from(multipliers)
    const outcome = equations.solve(point, multipliers)
    if (outcome === 'unsolved') return undefined
    if (outcome === 'contradictory') {
      multipliers.set(before)
      if (!releaseAlong(equations.shortfall, active, multipliers)) return undefined
      continue
    }
    if (releaseNegative(active, multipliers)) continue
    const worst = equations.mostViolated(point)
    if (worst < 0) return { point, multipliers }
    active[worst] = 1
  }
  return undefined
}

/** Releases the rows with a negative multiplier; false when there are none. */
function releaseNegative(active: Uint8Array, multipliers: Float64Array): boolean {
  let released = false
  for (let r = 0; r < active.length; r++) {
    if (!(active[r] && multipliers[r] < 0)) continue
    active[r] = 0
    multipliers[r] = 0
    released = true
  }
  return released
}

/**
 * Equations without a common solution leave a shortfall z with A_a^T z = 0: adding t z to the multipliers keeps
 * A_a^T y. The largest t that keeps them non-negative releases a row; false when no t ends it, which proves that
 * no point satisfies the rows.
 */
function releaseAlong(shortfall: Float64Array, active: Uint8Array, multipliers: Float64Array): boolean {
  let first = -1
  let length = Infinity
  for (let r = 0; r < active.length; r++) {
    if (!(active[r] && shortfall[r] < -negligibleShortfall)) continue
    const reach = Math.max(0, multipliers[r]) / -shortfall[r]
    if (reach < length) {
      length = reach
      first = r
    }
  }
  if (first < 0) return false
  for (let r = 0; r < active.length; r++) multipliers[r] += length * shortfall[r]
  active[first] = 0
  multipliers[first] = 0
  return true
}

/** The rows held as equations A_a w = 1, and their solution of least norm. */
class Equations {
  /** 1 - A_a w at the last solution, zero on the other rows. */
  readonly shortfall: Float64Array
  private readonly values: Float64Array
  private readonly weight: Float64Array
  private readonly step: Float64Array
  private readonly residual: Float64Array

  constructor(
    private readonly rows: SparseRows,
    private readonly normal: NormalMatrix,
    private readonly active: Uint8Array,
  ) {
    this.shortfall = new Float64Array(active.length)
    this.values = new Float64Array(active.length)
    this.weight = new Float64Array(active.length)
    this.step = new Float64Array(normal.size)
    this.residual = new Float64Array(normal.size)
  }

  /**
   * Improves (point, multipliers) by the method of multipliers (Hestenes 1969, Powell 1969): each sweep solves
   * with I + A_a^T A_a / penalty for the residuals 1 - A_a w and w - A_a^T y_a. Linearly dependent rows do no
   * harm: the start decides among their multipliers.
   */
  solve(point: Float64Array, multipliers: Float64Array): 'solved' | 'contradictory' | 'unsolved' {
    const { active, shortfall, weight, step, residual, rows } = this
    // With A_a A_a^T y = 1 and |w|^2 = sum of y, the least squared singular values are about rows / |w|^2.
    const held = active.reduce((count, yes) => count + yes, 0) || 1
    const penalty = Math.min(largestPenalty, (penaltyShare * held) / (squaredLength(point) || 1))
    for (let r = 0; r < active.length; r++) weight[r] = active[r] ? 1 / penalty : 0
    if (!this.normal.factorise(weight)) return 'unsolved'
    let before = Infinity
    for (let sweep = 0; sweep < maximalSweeps; sweep++) {
      this.measure(point, multipliers)
      const error = largestSize(shortfall) + largestSize(residual) / (largestSize(point) || 1)
      if (sweep > 1 && error > stagnation * before) break
      before = error
      for (let r = 0; r < active.length; r++) shortfall[r] *= weight[r]
      timesRow(rows, shortfall, step)
      for (let k = 0; k < step.length; k++) step[k] += residual[k]
      this.normal.solve(step, step)
      timesColumn(rows, step, this.values)
      for (let k = 0; k < point.length; k++) point[k] += step[k]
      for (let r = 0; r < active.length; r++) multipliers[r] += shortfall[r] - weight[r] * this.values[r]
    }
    if (before < rounding(point)) return 'solved'
    this.measure(point, multipliers)
    return largestSize(shortfall) > contradiction ? 'contradictory' : 'unsolved'
  }

  /** The row with the least value at the point, if that is below 1; otherwise -1. */
  mostViolated(point: Float64Array): number {
    const { active, values } = this
    timesColumn(this.rows, point, values)
    let worst = -1
    let least = 1 - rounding(point)
    for (let r = 0; r < active.length; r++) {
      if (active[r] || values[r] >= least) continue
      worst = r
      least = values[r]
    }
    return worst
  }

  private measure(point: Float64Array, multipliers: Float64Array): void {
    const { active, residual, shortfall, values } = this
    timesRow(this.rows, multipliers, residual)
    for (let k = 0; k < point.length; k++) residual[k] -= point[k]
    timesColumn(this.rows, point, values)
    for (let r = 0; r < active.length; r++) shortfall[r] = active[r] ? 1 - values[r] : 0
  }
}

/** What rounding may leave of the value 1 of a row at w: sums of a few integer multiples of entries of w. */
function rounding(w: Float64Array): number {
  return 1e-10 + 1e-14 * largestSize(w)
}
