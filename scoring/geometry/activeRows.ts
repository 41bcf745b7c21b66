import type { NormalMatrix } from './normalMatrix.ts'
import { largestSize, timesColumn, timesRow, type SparseRows } from './sparseRows.ts'

/** Penalty of the multiplier iteration; far below the squared singular values of the active rows. */
const penalty = 1e-9
const maximalSweeps = 12
/** How often rows with a negative multiplier are released and violated rows added. */
const maximalChanges = 4
/** A row counts as satisfied from 1 - this on. */
const feasibility = 1e-10

/**
 * The point of least norm from a point (w, s, y) near it: the rows with y > s are taken as equations, then rows
 * with a negative multiplier are released and violated ones added until neither occurs, which proves the point
 * optimal for all rows. Undefined when that is not reached in a few changes, or rounding stands in the way.
 */
export function polishedOnActiveRows(
  rows: SparseRows,
  normal: NormalMatrix,
  w: Float64Array,
  s: Float64Array,
  y: Float64Array,
): { point: Float64Array; multipliers: Float64Array } | undefined {
  const active = Uint8Array.from(s, (slack, r) => (y[r] > slack ? 1 : 0))
  const multipliers = y.map((value, r) => (active[r] ? value : 0))
  const point = Float64Array.from(w)
  const values = new Float64Array(s.length)
  for (let change = 0; change <= maximalChanges; change++) {
    if (!leastNormOnEquations(rows, normal, active, point, multipliers)) return undefined
    timesColumn(rows, point, values)
    let changed = false
    for (let r = 0; r < active.length; r++) {
      if (active[r] && multipliers[r] < 0) {
        active[r] = 0
        multipliers[r] = 0
        changed = true
      } else if (!active[r] && values[r] < 1 - feasibility) {
        active[r] = 1
        changed = true
      }
    }
    if (!changed) return { point, multipliers }
  }
  return undefined
}

/**
 * Improves (point, multipliers) to the point of least norm with A_a w = 1 on the active rows, by the method of
 * multipliers (Hestenes 1969, Powell 1969): each sweep solves with I + A_a^T A_a / penalty for the residuals
 * 1 - A_a w and w - A_a^T y_a. Linearly dependent active rows do no harm: the start decides among their
 * multipliers. False when the equations contradict each other or rounding is too large.
 */
function leastNormOnEquations(
  rows: SparseRows,
  normal: NormalMatrix,
  active: Uint8Array,
  point: Float64Array,
  multipliers: Float64Array,
): boolean {
  const weight = Float64Array.from(active, (yes) => (yes ? 1 / penalty : 0))
  if (!normal.factorise(weight)) return false
  const values = new Float64Array(active.length)
  const shortfall = new Float64Array(active.length)
  const step = new Float64Array(point.length)
  const residual = new Float64Array(point.length)
  let before = Infinity
  for (let sweep = 0; sweep < maximalSweeps; sweep++) {
    timesRow(rows, multipliers, residual)
    for (let k = 0; k < point.length; k++) residual[k] -= point[k]
    timesColumn(rows, point, values)
    for (let r = 0; r < shortfall.length; r++) shortfall[r] = active[r] ? 1 - values[r] : 0
    const error = largestSize(shortfall) + largestSize(residual) / largestSize(point)
    if (sweep > 1 && error > before / 2) break
    before = error
    for (let r = 0; r < shortfall.length; r++) shortfall[r] *= weight[r]
    timesRow(rows, shortfall, step)
    for (let k = 0; k < step.length; k++) step[k] += residual[k]
    normal.solve(step, step)
    timesColumn(rows, step, values)
    for (let k = 0; k < point.length; k++) point[k] += step[k]
    for (let r = 0; r < multipliers.length; r++) multipliers[r] += shortfall[r] - weight[r] * values[r]
  }
  return before < feasibility
}
