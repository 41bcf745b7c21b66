import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus'
import { InvariantError } from '../errors.ts'

/** Largest eigenvalue of a symmetric positive operator, with the estimate of its relative residual. */
export interface TopEigenvalue {
  readonly value: number
  /** |T x - value x| / value for the approximate unit eigenvector x. */
  readonly residual: number
  readonly steps: number
}

/**
 * Largest eigenvalue of a symmetric operator by Lanczos with full reorthogonalisation (Lanczos 1950), from a
 * fixed pseudo-random vector that has no symmetry of its own. `apply(x, y)` writes the image of x to y; the
 * image must lie in the subspace meant, and the start is taken from there (the image of the random vector).
 * Stops when the relative residual is at most `tolerance`; the error of the value is of the order of its square.
 */
export function largestEigenvalue(
  size: number,
  apply: (x: Float64Array, y: Float64Array) => void,
  tolerance: number,
): TopEigenvalue {
  const basis: Float64Array[] = []
  const alpha: number[] = []
  const beta: number[] = []
  let current = new Float64Array(size)
  apply(startVector(size), current)
  scale(current, 1 / norm(current))
  let best: TopEigenvalue = { value: 0, residual: Infinity, steps: 0 }
  for (let step = 0; step < size; step++) {
    basis.push(current)
    const next = new Float64Array(size)
    apply(current, next)
    alpha.push(dot(current, next))
    for (let pass = 0; pass < 2; pass++) {
      for (const vector of basis) subtract(next, vector, dot(vector, next))
    }
    const length = norm(next)
    best = { ...topOfTridiagonal(alpha, beta, length), steps: step + 1 }
    if (best.residual <= tolerance) return best
    beta.push(length)
    scale(next, 1 / length)
    current = next
  }
  throw new InvariantError(`Lanczos stopped at the residual ${best.residual} after ${best.steps} steps.`)
}

/**
 * Largest eigenvalue of the symmetric tridiagonal matrix with diagonal `alpha` and off-diagonal `beta` by
 * Newton's method from above (monotone), and `coupling` times the last component of its unit eigenvector over
 * the eigenvalue: the relative residual of the Lanczos vector.
 */
function topOfTridiagonal(
  alpha: readonly number[],
  beta: readonly number[],
  coupling: number,
): { value: number; residual: number } {
  const size = alpha.length
  let bound = 0
  for (let k = 0; k < size; k++) {
    bound = Math.max(bound, alpha[k] + Math.abs(beta[k] ?? 0) + Math.abs(k > 0 ? beta[k - 1] : 0))
  }
  let x = bound * (1 + 1e-15)
  const pivots = new Float64Array(size)
  for (let round = 0; round < 200; round++) {
    let slope = 1
    let logarithmic = 0
    for (let k = 0; k < size; k++) {
      if (k === 0) pivots[0] = x - alpha[0]
      else {
        const ratio = beta[k - 1] / pivots[k - 1]
        slope = 1 + ratio * ratio * slope
        pivots[k] = x - alpha[k] - beta[k - 1] * ratio
      }
      logarithmic += slope / pivots[k]
    }
    const step = 1 / logarithmic
    if (!(step > 1e-16 * x)) break
    x -= step
  }
  return { value: x, residual: (coupling * lastComponent(alpha, beta, x)) / x }
}

/** |last component| of the unit eigenvector for the eigenvalue x, by two steps of inverse iteration. */
function lastComponent(alpha: readonly number[], beta: readonly number[], x: number): number {
  const size = alpha.length
  const shift = x * (1 + 1e-14)
  const pivots = new Float64Array(size)
  for (let k = 0; k < size; k++) {
    pivots[k] = shift - alpha[k] - (k > 0 ? (beta[k - 1] * beta[k - 1]) / pivots[k - 1] : 0)
  }
  const z = new Float64Array(size).fill(1)
  for (let round = 0; round < 3; round++) {
    for (let k = 1; k < size; k++) z[k] += (beta[k - 1] / pivots[k - 1]) * z[k - 1]
    for (let k = size - 1; k >= 0; k--) {
      z[k] = (z[k] + (k + 1 < size ? beta[k] * z[k + 1] : 0)) / pivots[k]
    }
    scale(z, 1 / norm(z))
  }
  return Math.abs(z[size - 1])
}

function startVector(size: number): Float64Array {
  const generator = xoroshiro128plus(491)
  return Float64Array.from({ length: size }, () => generator.next() / 0x80000000)
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let k = 0; k < a.length; k++) sum += a[k] * b[k]
  return sum
}

function norm(a: Float64Array): number {
  return Math.sqrt(dot(a, a))
}

function scale(a: Float64Array, factor: number): void {
  for (let k = 0; k < a.length; k++) a[k] *= factor
}

function subtract(a: Float64Array, b: Float64Array, factor: number): void {
  for (let k = 0; k < a.length; k++) a[k] -= factor * b[k]
}
