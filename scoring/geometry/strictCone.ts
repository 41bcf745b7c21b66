import type { ConeRows } from './coneRows.ts'

/** What the floating-point search believes; to be verified exactly by the caller. */
export type ConeAnswer =
  | { readonly kind: 'inside'; readonly heights: Float64Array }
  /** Rows that have a non-negative combination equal to zero. */
  | { readonly kind: 'empty'; readonly support: number[] }
  | { readonly kind: 'unknown' }

/**
 * The heights nearest to `near` (Euclidean norm over points) at which every row is at least `margin`, or rows
 * that contradict each other.
 *
 * A dual active-set method for the strictly convex program min |w - near|^2, c_r . w >= margin: start at the
 * unconstrained optimum, add the most violated row, step towards it inside the active rows' null space while
 * multipliers stay non-negative, drop rows whose multiplier reaches zero. (Goldfarb, Idnani, Mathematical
 * Programming 27 (1983) 1.) Near a known witness few rows are ever active. When a violated row is a combination
 * of active ones with no multiplier left to give, the rows have a vanishing non-negative combination and the
 * cone is empty (Farkas).
 */
export function nearestInCone(rows: ConeRows, near: ArrayLike<number>, margin: number): ConeAnswer {
  const w = Float64Array.from(near)
  const active: number[] = []
  let multipliers: number[] = []
  const factor = new GrowingCholesky()
  const limit = 20 * (rows.count + 10)
  for (let round = 0; round < limit; round++) {
    const worst = mostViolated(rows, w, margin)
    if (worst < 0) return { kind: 'inside', heights: w }
    let multiplier = 0
    for (let inner = 0; ; inner++) {
      if (inner > limit) return { kind: 'unknown' }
      const share = factor.solve(active.map((row) => rows.dot(row, worst)))
      const direction = new Float64Array(w.length)
      rows.add(worst, 1, direction)
      active.forEach((row, n) => rows.add(row, -share[n], direction))
      // c . z = |z|^2, as z is c projected off the active rows.
      const slope = rows.value(worst, direction)
      const independent = slope > 1e-9 * rows.dot(worst, worst)
      const full = independent ? (margin - rows.value(worst, w)) / slope : Infinity
      let leaving = -1
      let partial = Infinity
      for (let n = 0; n < share.length; n++) {
        if (share[n] > 1e-11 && multipliers[n] / share[n] < partial) {
          partial = multipliers[n] / share[n]
          leaving = n
        }
      }
      const step = Math.min(full, partial)
      if (step === Infinity) {
        return { kind: 'empty', support: [worst, ...active.filter((_, n) => share[n] < -1e-9)] }
      }
      if (independent) for (let p = 0; p < w.length; p++) w[p] += step * direction[p]
      multipliers = multipliers.map((m, n) => Math.max(0, m - step * share[n]))
      multiplier += step
      if (full <= partial) {
        if (
          !factor.append(
            active.map((row) => rows.dot(row, worst)),
            rows.dot(worst, worst),
          )
        ) {
          return { kind: 'unknown' }
        }
        active.push(worst)
        multipliers.push(multiplier)
        break
      }
      factor.remove(leaving)
      active.splice(leaving, 1)
      multipliers.splice(leaving, 1)
    }
  }
  return { kind: 'unknown' }
}

function mostViolated(rows: ConeRows, w: Float64Array, margin: number): number {
  let least = margin * (1 - 1 / 64)
  let worst = -1
  for (let row = 0; row < rows.count; row++) {
    const at = rows.value(row, w)
    if (at < least) {
      least = at
      worst = row
    }
  }
  return worst
}

/** Cholesky factor of a Gram matrix to which rows are appended and from which they are removed. */
class GrowingCholesky {
  private readonly lower: Float64Array[] = []

  solve(right: readonly number[]): Float64Array {
    const n = this.lower.length
    const x = Float64Array.from(right)
    for (let r = 0; r < n; r++) {
      const row = this.lower[r]
      for (let c = 0; c < r; c++) x[r] -= row[c] * x[c]
      x[r] /= row[r]
    }
    for (let r = n - 1; r >= 0; r--) {
      const row = this.lower[r]
      x[r] /= row[r]
      for (let c = 0; c < r; c++) x[c] -= row[c] * x[r]
    }
    return x
  }

  /** False when the new row depends on the others as far as rounding can tell. */
  append(products: readonly number[], square: number): boolean {
    const n = this.lower.length
    const row = new Float64Array(n + 1)
    let rest = square
    for (let r = 0; r < n; r++) {
      let sum = products[r]
      for (let c = 0; c < r; c++) sum -= this.lower[r][c] * row[c]
      row[r] = sum / this.lower[r][r]
      rest -= row[r] * row[r]
    }
    if (!(rest > 1e-12 * square)) return false
    row[n] = Math.sqrt(rest)
    this.lower.push(row)
    return true
  }

  /** Takes row and column n out and restores the triangle by plane rotations of neighbouring columns. */
  remove(n: number): void {
    this.lower.splice(n, 1)
    for (let c = n; c < this.lower.length; c++) {
      const pivot = this.lower[c]
      const radius = Math.hypot(pivot[c], pivot[c + 1])
      const cosine = pivot[c] / radius
      const sine = pivot[c + 1] / radius
      for (let r = c; r < this.lower.length; r++) {
        const row = this.lower[r]
        const left = row[c]
        const right = row[c + 1]
        row[c] = cosine * left + sine * right
        row[c + 1] = cosine * right - sine * left
      }
      this.lower[c] = pivot.slice(0, c + 1)
    }
  }
}
