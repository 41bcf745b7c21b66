import { InvariantError } from '../errors.ts'
import { pointOnActiveRows, type PointOnRows } from './activeRows.ts'
import { NormalMatrix } from './normalMatrix.ts'
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
 * The w of least Euclidean norm with A w >= 1 for every row, by a primal-dual interior-point method with
 * Mehrotra's predictor and corrector (Mehrotra 1992, SIAM J. Optim. 2, 575). With multipliers y and slacks s
 * the conditions are w = A^T y, A w - s = 1, s y = 0, s >= 0, y >= 0; each step solves with I + A^T (Y/S) A.
 * Near the solution the rows with y > s are taken as equations, which gives w to rounding and, when the result
 * satisfies all conditions, ends the search.
 *
 * @param before the solution for the first rows alone: as a rule few of the others are violated there, and a dual
 *   active-set method gets by without the interior point
 * @throws InvariantError when no point satisfies all rows (or none is found)
 */
export function leastNormPoint(size: number, rows: SparseRows, before?: LeastNormPoint): LeastNormPoint {
  const count = rowCount(rows)
  const normal = new NormalMatrix(size, rows)
  if (before !== undefined) {
    const { point, multipliers } = before
    const y = new Float64Array(count)
    y.set(multipliers)
    const solution = pointOnActiveRows(rows, normal, point, slacksOf(y), y, changesFromBefore)
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
    step.measure()
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

/** One predictor-corrector step on (w, s, y), in place. */
class NewtonStep {
  readonly primalResidual: Float64Array
  private readonly dualResidual: Float64Array
  private readonly diagonal: Float64Array
  private readonly complement: Float64Array
  private readonly scratch: Float64Array
  private readonly dw: Float64Array
  private readonly ds: Float64Array
  private readonly dy: Float64Array

  constructor(
    private readonly rows: SparseRows,
    private readonly normal: NormalMatrix,
    private readonly w: Float64Array,
    private readonly s: Float64Array,
    private readonly y: Float64Array,
  ) {
    this.dualResidual = new Float64Array(w.length)
    this.dw = new Float64Array(w.length)
    this.primalResidual = new Float64Array(s.length)
    this.diagonal = new Float64Array(s.length)
    this.complement = new Float64Array(s.length)
    this.scratch = new Float64Array(s.length)
    this.ds = new Float64Array(s.length)
    this.dy = new Float64Array(s.length)
  }

  /** Residuals w - A^T y and A w - s - 1 of the point at hand. */
  measure(): void {
    const { rows, w, s, y, dualResidual, primalResidual } = this
    timesRow(rows, y, dualResidual)
    for (let k = 0; k < w.length; k++) dualResidual[k] = w[k] - dualResidual[k]
    timesColumn(rows, w, primalResidual)
    for (let r = 0; r < s.length; r++) primalResidual[r] -= s[r] + 1
  }

  complementarity(): number {
    let sum = 0
    for (let r = 0; r < this.s.length; r++) sum += this.s[r] * this.y[r]
    return sum
  }

  /** Moves the point; false when rounding forbids another factorisation. */
  advance(): boolean {
    const { w, s, y, dw, ds, dy, diagonal, complement } = this
    for (let r = 0; r < s.length; r++) diagonal[r] = y[r] / s[r]
    if (!this.normal.factorise(diagonal)) return false
    for (let r = 0; r < s.length; r++) complement[r] = s[r] * y[r]
    this.solve()
    const mean = this.complementarity() / s.length
    const reach = Math.min(1, this.distanceToBoundary())
    let after = 0
    for (let r = 0; r < s.length; r++) after += (s[r] + reach * ds[r]) * (y[r] + reach * dy[r])
    const ratio = after / s.length / mean
    const centre = ratio * ratio * ratio * mean
    for (let r = 0; r < s.length; r++) complement[r] = s[r] * y[r] + ds[r] * dy[r] - centre
    this.solve()
    const length = Math.min(1, 0.995 * this.distanceToBoundary())
    for (let k = 0; k < w.length; k++) w[k] += length * dw[k]
    for (let r = 0; r < s.length; r++) {
      s[r] += length * ds[r]
      y[r] += length * dy[r]
    }
    return true
  }

  /** Newton direction for the residuals at hand, `complement` being that of s y. */
  private solve(): void {
    const { rows, s, y, dw, ds, dy, complement, scratch, primalResidual, dualResidual } = this
    for (let r = 0; r < s.length; r++) scratch[r] = (complement[r] + y[r] * primalResidual[r]) / s[r]
    timesRow(rows, scratch, dw)
    for (let k = 0; k < dw.length; k++) dw[k] = -dualResidual[k] - dw[k]
    this.normal.solve(dw, dw)
    timesColumn(rows, dw, ds)
    for (let r = 0; r < s.length; r++) {
      ds[r] += primalResidual[r]
      dy[r] = -(complement[r] + y[r] * ds[r]) / s[r]
    }
  }

  private distanceToBoundary(): number {
    const { s, y, ds, dy } = this
    let length = Infinity
    for (let r = 0; r < s.length; r++) {
      if (ds[r] < 0) length = Math.min(length, -s[r] / ds[r])
      if (dy[r] < 0) length = Math.min(length, -y[r] / dy[r])
    }
    return length
  }
}

/** Slacks that make exactly the rows with a multiplier active. */
const slacksOf = (multipliers: Float64Array): Float64Array => multipliers.map((y) => (y > 0 ? 0 : 1))

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
