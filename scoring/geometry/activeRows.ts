import type { NormalMatrix } from './normalMatrix.ts'
import {
  largestSize,
  selectedRows,
  squaredLength,
  timesColumn,
  timesRow,
  type SparseRows,
} from './sparseRows.ts'

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
 * 1983, Math. Program. 27, 1): the rows without slack, and with y > s in units of their typical sizes, are taken as equations; then
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
  const active = new Uint8Array(s.length)
  const multipliers = new Float64Array(s.length)
  for (let r = 0; r < s.length; r++) {
    if (s[r] > 0 && !(y[r] > s[r] * typical)) continue
    active[r] = 1
    multipliers[r] = y[r]
  }
  const equations = new Equations(rows, normal, active)
  const point = w.slice()
  for (let change = 0; change <= changes; change++) {
    const before = multipliers.slice()
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
    const { active, weight, step, residual } = this
    const held = placesOf(active)
    // With A_a A_a^T y = 1 and |w|^2 = sum of y, the least squared singular values are about rows / |w|^2.
    const penalty = Math.min(
      largestPenalty,
      (penaltyShare * (held.length || 1)) / (squaredLength(point) || 1),
    )
    const stiffness = 1 / penalty
    weight.fill(0)
    for (let e = 0; e < held.length; e++) weight[held[e]] = stiffness
    if (!this.normal.factorise(weight)) return 'unsolved'

    const rows = selectedRows(this.rows, held)
    const lack = new Float64Array(held.length)
    const y = new Float64Array(held.length)
    for (let e = 0; e < held.length; e++) y[e] = multipliers[held[e]]
    const measure = (): void => {
      timesRow(rows, y, residual)
      for (let k = 0; k < point.length; k++) residual[k] -= point[k]
      timesColumn(rows, point, lack)
      for (let e = 0; e < lack.length; e++) lack[e] = 1 - lack[e]
    }
    const change = new Float64Array(held.length)
    let before = Infinity
    for (let sweep = 0; sweep < maximalSweeps; sweep++) {
      measure()
      const error = largestSize(lack) + largestSize(residual) / (largestSize(point) || 1)
      if (sweep > 1 && error > stagnation * before) break
      before = error
      timesRow(rows, lack, step)
      for (let k = 0; k < step.length; k++) step[k] = stiffness * step[k] + residual[k]
      this.normal.solve(step, step)
      timesColumn(rows, step, change)
      for (let k = 0; k < point.length; k++) point[k] += step[k]
      for (let e = 0; e < y.length; e++) y[e] += stiffness * (lack[e] - change[e])
    }
    for (let e = 0; e < held.length; e++) multipliers[held[e]] = y[e]
    if (before < rounding(point)) return 'solved'
    measure()
    this.shortfall.fill(0)
    for (let e = 0; e < held.length; e++) this.shortfall[held[e]] = lack[e]
    return largestSize(lack) > contradiction ? 'contradictory' : 'unsolved'
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
}

/** Where the marks are set, ascending. */
function placesOf(marks: Uint8Array): Int32Array {
  const places = new Int32Array(marks.length)
  let count = 0
  for (let r = 0; r < marks.length; r++) if (marks[r] === 1) places[count++] = r
  return places.subarray(0, count)
}

/** What rounding may leave of the value 1 of a row at w: sums of a few integer multiples of entries of w. */
function rounding(w: Float64Array): number {
  return 1e-10 + 1e-14 * largestSize(w)
}
