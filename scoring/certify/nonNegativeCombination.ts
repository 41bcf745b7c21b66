import { valueAt, type Condition } from './curveClasses.ts'

/** w as a non-negative combination of conditions, as well as that goes. */
export interface Combination {
  /** Conditions with a positive multiplier; their rows are independent. */
  readonly support: readonly Condition[]
  readonly multipliers: readonly number[]
  /** Largest entry of w - sum of multiplier * row, over the largest of w. */
  readonly residual: number
  /** The point of least norm at which every condition of the support has the value one. */
  readonly leastNormPoint: Float64Array
}

/**
 * Least squares with non-negative multipliers, min |A^T y - w|, y >= 0, by the active-set method of Lawson and
 * Hanson (Solving Least Squares Problems, 1974, chapter 23), with a Cholesky factor of the Gram matrix of the rows in
 * use, bordered when a row enters and rotated when one leaves.
 *
 * If w satisfies all conditions A w >= 1, has the value one on the support and the residual is zero, w is the point
 * of least norm: for any other point u with A u >= 1, |w|^2 = y . A w = sum y <= y . A u = w . u <= |w| |u|.
 */
export function nonNegativeCombination(rows: readonly Condition[], w: ArrayLike<number>): Combination {
  const scale = Array.from(w).reduce((most, entry) => Math.max(most, Math.abs(entry)), 0)
  const gram = new GramFactor(w.length)
  const used: number[] = []
  let y: number[] = []
  const residual = Float64Array.from(w)
  const refresh = (): void => {
    for (let p = 0; p < w.length; p++) residual[p] = w[p]
    used.forEach((r, n) => subtract(residual, rows[r], y[n]))
  }
  /** Rows in use, and rows that depend on these but for rounding. */
  const shut = new Uint8Array(rows.length)
  for (let round = 0; round < 10 * rows.length + 100; round++) {
    if (largest(residual) <= 1e-13 * scale) break
    let best = -1
    let steepest = 1e-12 * scale
    rows.forEach((row, r) => {
      const slope = shut[r] ? 0 : valueAt(row, residual)
      if (slope > steepest) {
        best = r
        steepest = slope
      }
    })
    if (best < 0) break
    shut[best] = 1
    if (!gram.add(rows[best])) continue
    used.push(best)
    y.push(0)
    for (;;) {
      const target = leastSquares()
      if (target.every((value) => value > 0)) {
        y = target
        break
      }
      let step = 1
      target.forEach((value, n) => {
        if (value <= 0) step = Math.min(step, y[n] / (y[n] - value))
      })
      y = y.map((value, n) => value + step * (target[n] - value))
      for (let n = y.length - 1; n >= 0; n--) {
        if (target[n] > 0 || y[n] > 1e-14 * scale) continue
        gram.remove(n)
        used.splice(n, 1)
        y.splice(n, 1)
      }
      shut.fill(0)
      for (const r of used) shut[r] = 1
    }
    refresh()
  }
  return {
    support: used.map((r) => rows[r]),
    multipliers: y,
    residual: scale === 0 ? 0 : largest(residual) / scale,
    leastNormPoint: leastNorm(),
  }

  /** Multipliers of the rows in use without regard to signs, with a round of refinement. */
  function leastSquares(): number[] {
    const first = gram.solve(used.map((r) => valueAt(rows[r], w)))
    const rest = Float64Array.from(w)
    used.forEach((r, n) => subtract(rest, rows[r], first[n]))
    const second = gram.solve(used.map((r) => valueAt(rows[r], rest)))
    return first.map((value, n) => value + second[n])
  }

  /** A_P^T (A_P A_P^T)^-1 1, with two rounds of refinement. */
  function leastNorm(): Float64Array {
    const point = new Float64Array(w.length)
    for (let round = 0; round < 3; round++) {
      const step = gram.solve(used.map((r) => 1 - valueAt(rows[r], point)))
      used.forEach((r, n) => subtract(point, rows[r], -step[n]))
    }
    return point
  }
}

function subtract(x: Float64Array, { points, coefficients }: Condition, factor: number): void {
  for (let n = 0; n < points.length; n++) x[points[n]] -= factor * coefficients[n]
}

const largest = (x: Float64Array): number => x.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0)

/** Cholesky factor of the Gram matrix of a changing list of sparse rows. */
class GramFactor {
  private readonly rows: Condition[] = []
  /** Row n of the lower triangle. */
  private readonly lower: Float64Array[] = []
  private readonly dense: Float64Array

  constructor(private readonly size: number) {
    this.dense = new Float64Array(size)
  }

  /** Appends a row; false, and nothing changed, when it depends on the others but for rounding. */
  add(row: Condition): boolean {
    const { rows, lower, dense } = this
    row.points.forEach((p, n) => (dense[p] = row.coefficients[n]))
    const own = valueAt(row, dense)
    const next = new Float64Array(this.size + 1)
    let rest = own
    for (let n = 0; n < rows.length; n++) {
      let sum = valueAt(rows[n], dense)
      for (let m = 0; m < n; m++) sum -= lower[n][m] * next[m]
      next[n] = sum / lower[n][n]
      rest -= next[n] * next[n]
    }
    for (const p of row.points) dense[p] = 0
    if (!(rest > 1e-13 * own)) return false
    next[rows.length] = Math.sqrt(rest)
    rows.push(row)
    lower.push(next)
    return true
  }

  /** Takes row n out and rotates what is left back to triangular form. */
  remove(n: number): void {
    const { rows, lower } = this
    rows.splice(n, 1)
    lower.splice(n, 1)
    for (let c = n; c < rows.length; c++) {
      const [a, b] = [lower[c][c], lower[c][c + 1]]
      const length = Math.hypot(a, b)
      const [cos, sin] = [a / length, b / length]
      for (let r = c; r < rows.length; r++) {
        const row = lower[r]
        const [left, right] = [row[c], row[c + 1]]
        row[c] = cos * left + sin * right
        row[c + 1] = cos * right - sin * left
      }
    }
  }

  /** Solution of (A A^T) y = b. */
  solve(b: readonly number[]): number[] {
    const { lower } = this
    const y = [...b]
    for (let n = 0; n < y.length; n++) {
      const row = lower[n]
      let sum = y[n]
      for (let m = 0; m < n; m++) sum -= row[m] * y[m]
      y[n] = sum / row[n]
    }
    for (let n = y.length - 1; n >= 0; n--) {
      y[n] /= lower[n][n]
      const row = lower[n]
      for (let m = 0; m < n; m++) y[m] -= row[m] * y[n]
    }
    return y
  }
}
