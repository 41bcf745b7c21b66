import { InvariantError } from '../errors.ts'
import { pointOnActiveRows, type PointOnRows } from './activeRows.ts'
import { NormalMatrix } from './normalMatrix.ts'
import { NewtonStep } from './newtonStep.ts'
import { largestSize, rowCount, squaredLength, timesColumn, timesRow, type SparseRows } from './sparseRows.ts'

/** Solution of a least-norm program with what proves it optimal. */
export interface LeastNormPoint {
  readonly point: Float64Array
  /** Multiplier of each row; point = A^T multipliers, non-negative. */
  readonly multipliers: Float64Array
  /** Largest violation of A w >= 1. */
  readonly primalResidual: number
  /** Largest entry of w - A^T multipliers over the largest of w. */
  readonly dualResidual: number
  /** | |w|^2 - sum of multipliers | / |w|^2: the relative duality gap. */
  readonly gap: number
  /** Interior-point iterations. */
  readonly iterations: number
}

const maximalIterations = 100
/** Relative gap s.y / |w|^2 below which the active rows are tried, and again after each further decade. */
const firstTry = 1e-5
const nextTry = 0.1
/** How many changes of the active rows a try may make, and the last one, when rounding forbids another step. */
const changesPerTry = 4
const changesAtTheEnd = 100
/** How many changes lead from the solution for fewer rows to this one, before the search begins anew. */
const changesFromBefore = 40
/**
 * The w of least Euclidean norm with A w >= 1 for every row, by a primal-dual interior-point method. With multipliers
 * y and slacks s the conditions are w = A^T y, A w - s = 1, s y = 0, s >= 0, y >= 0; each step solves with
 * I + A^T (Y/S) A. Near the solution the rows with y > s are taken as equations, which gives w to rounding and, when
 * the result satisfies all conditions, ends the search.
 *
 * @param before the solution for the first rows alone: as a rule few of the others are violated there, and a dual
 *   active-set method gets by without the interior point
 * @throws InvariantError when no point satisfies all rows (or none is found)
 */
export function leastNormPoint(size: number, rows: SparseRows, before?: LeastNormPoint): LeastNormPoint {
  const count = rowCount(rows)
  const normal = new NormalMatrix(size, rows)
  if (before !== undefined) {
    const y = new Float64Array(count)
    y.set(before.multipliers)
    const s = slacksOf(rows, before.point, y)
    const solution = pointOnActiveRows(rows, normal, before.point, s, y, changesFromBefore)
    if (solution) return summary(rows, solution, 0)
  }
  const w = new Float64Array(size)
  // A start of the size of the solution: |w|^2 = sum of y grows with the number of rows.
  const s = new Float64Array(count).fill(Math.sqrt(count))
  const y = new Float64Array(count).fill(count)
  const step = new NewtonStep(rows, normal, w, s, y)
  let target = firstTry
  let iterations = 0
  for (let going = true; going && iterations < maximalIterations; iterations++) {
    const gap = step.complementarity() / squaredLength(w)
    if (gap <= target) {
      const solution = pointOnActiveRows(rows, normal, w, s, y, changesPerTry)
      if (solution) return summary(rows, solution, iterations)
      target = nextTry * gap
    }
    going = step.advance()
  }
  const solution = pointOnActiveRows(rows, normal, w, s, y, changesAtTheEnd)
  if (solution) return summary(rows, solution, iterations)
  throw new InvariantError(`No point of least norm was found in ${iterations} iterations.`)
}

/** Slacks that make exactly the rows with a multiplier active, and the one with the least value at the point. */
function slacksOf(rows: SparseRows, point: Float64Array, multipliers: Float64Array): Float64Array {
  const values = new Float64Array(multipliers.length)
  timesColumn(rows, point, values)
  let least = 0
  for (let r = 1; r < values.length; r++) if (values[r] < values[least]) least = r
  const slacks = multipliers.map((y) => (y > 0 ? 0 : 1))
  slacks[least] = 0
  return slacks
}

function summary(rows: SparseRows, { point, multipliers }: PointOnRows, iterations: number): LeastNormPoint {
  const values = new Float64Array(multipliers.length)
  timesColumn(rows, point, values)
  const residual = new Float64Array(point.length)
  timesRow(rows, multipliers, residual)
  for (let k = 0; k < point.length; k++) residual[k] -= point[k]
  const norm = squaredLength(point)
  return {
    point,
    multipliers,
    primalResidual: values.reduce((worst, value) => Math.max(worst, 1 - value), 0),
    dualResidual: largestSize(residual) / largestSize(point),
    gap: Math.abs(norm - multipliers.reduce((sum, value) => sum + value, 0)) / norm,
    iterations,
  }
}
