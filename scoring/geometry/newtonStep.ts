import type { NormalMatrix } from './normalMatrix.ts'
import { timesColumn, timesRow, type SparseRows } from './sparseRows.ts'

/** Share of the way to the boundary that a step takes. */
const careful = 0.995

/**
 * Predictor-corrector steps (Mehrotra 1992, SIAM J. Optim. 2, 575) on a point (w, s, y) of the least-norm program, in
 * place: towards w = A^T y, A w - s = 1, s y = 0 with s > 0, y > 0.
 */
export class NewtonStep {
  private readonly primalResidual: Float64Array
  private readonly dualResidual: Float64Array
  /** 1 / s and y / s. */
  private readonly inverse: Float64Array
  private readonly ratio: Float64Array
  /** What a row's complementarity shall become, less s y. */
  private readonly shift: Float64Array
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
    this.inverse = new Float64Array(s.length)
    this.ratio = new Float64Array(s.length)
    this.shift = new Float64Array(s.length)
    this.scratch = new Float64Array(s.length)
    this.ds = new Float64Array(s.length)
    this.dy = new Float64Array(s.length)
  }

  /** Sum of s y: what the norm may still lose. */
  complementarity(): number {
    const { s, y } = this
    let sum = 0
    for (let r = 0; r < s.length; r++) sum += s[r] * y[r]
    return sum
  }

  /** Moves the point; false when rounding forbids another factorisation. */
  advance(): boolean {
    const { w, s, y, dw, ds, dy, inverse, ratio, shift } = this
    const count = s.length
    this.measure()
    for (let r = 0; r < count; r++) {
      inverse[r] = 1 / s[r]
      ratio[r] = y[r] * inverse[r]
    }
    if (!this.normal.factorise(ratio)) return false
    shift.fill(0)
    this.solve()
    const mean = this.complementarity() / count
    const reach = Math.min(1, this.distanceToBoundary())
    let after = 0
    for (let r = 0; r < count; r++) after += (s[r] + reach * ds[r]) * (y[r] + reach * dy[r])
    const left = after / count / mean
    const centre = left * left * left * mean
    for (let r = 0; r < count; r++) shift[r] = (ds[r] * dy[r] - centre) * inverse[r]
    this.solve()
    const length = Math.min(1, careful * this.distanceToBoundary())
    for (let k = 0; k < w.length; k++) w[k] += length * dw[k]
    for (let r = 0; r < count; r++) {
      s[r] += length * ds[r]
      y[r] += length * dy[r]
    }
    return true
  }

  /** Residuals w - A^T y and A w - s - 1. */
  private measure(): void {
    const { rows, w, s, y, dualResidual, primalResidual } = this
    timesRow(rows, y, dualResidual)
    for (let k = 0; k < w.length; k++) dualResidual[k] = w[k] - dualResidual[k]
    timesColumn(rows, w, primalResidual)
    for (let r = 0; r < s.length; r++) primalResidual[r] -= s[r] + 1
  }

  /** Newton direction for the residuals at hand and s y + s `shift` in place of s y. */
  private solve(): void {
    const { rows, y, dw, ds, dy, ratio, shift, scratch, primalResidual, dualResidual } = this
    for (let r = 0; r < y.length; r++) scratch[r] = y[r] + shift[r] + ratio[r] * primalResidual[r]
    timesRow(rows, scratch, dw)
    for (let k = 0; k < dw.length; k++) dw[k] = -dualResidual[k] - dw[k]
    this.normal.solve(dw, dw)
    timesColumn(rows, dw, ds)
    for (let r = 0; r < y.length; r++) {
      ds[r] += primalResidual[r]
      dy[r] = -(y[r] + shift[r] + ratio[r] * ds[r])
    }
  }

  private distanceToBoundary(): number {
    const { inverse, y, ds, dy } = this
    let fastest = 0
    for (let r = 0; r < y.length; r++) {
      if (-ds[r] * inverse[r] > fastest) fastest = -ds[r] * inverse[r]
      if (-dy[r] > fastest * y[r]) fastest = -dy[r] / y[r]
    }
    return 1 / fastest
  }
}
