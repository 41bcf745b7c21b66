import { circuits, circuitValues } from '../geometry/circuits.ts'
import type { Polytope } from '../geometry/polytope.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'

/** Searches keep heights below this size: they pack into 32 bits, and all arithmetic on them stays exact. */
export const searchHeightBound = 2 ** 30

/** Inverse of sum_p v_p v_p^T per polytope, 4 x 4 by rows. */
const inverses = new WeakMap<Polytope, Float64Array>()

/**
 * The same heights modulo linear functions <u, v_p>, u integral, and a common factor: u is the rounded least
 * squares fit, so the heights become about as small as they can; then they are halved while they exceed
 * `searchHeightBound`, or doubled while they stay well below it. The class is untouched by all but the halving,
 * whose rounding is checked.
 *
 * @param cls the class that the heights give, every circuit positive
 * @returns undefined when the class is so thin that no heights of this size lie in it
 */
export function gaugedHeights(cls: TwoFaceClass, heights: ArrayLike<number>): Float64Array | undefined {
  const { polytope } = cls
  const fit = linearFit(polytope, heights)
  const gauged = new Float64Array(heights.length)
  let largest = 0
  for (let p = 0; p < gauged.length; p++) {
    let value = heights[p]
    for (let c = 0; c < 4; c++) value -= fit[c] * polytope.points[4 * p + c]
    gauged[p] = value
    largest = Math.max(largest, Math.abs(value))
  }
  let factor = 1
  while (largest * factor > searchHeightBound) factor /= 2
  while (largest > 0 && largest * factor * 4 <= searchHeightBound) factor *= 2
  for (let p = 0; p < gauged.length; p++) gauged[p] = Math.round(gauged[p] * factor) + 0
  if (factor < 1 && !circuitValues(circuits(cls), gauged).every((value) => value > 0)) return undefined
  return gauged
}

/** Integers u nearest to the least squares fit of the heights by <u, v_p>. */
function linearFit(polytope: Polytope, heights: ArrayLike<number>): Float64Array {
  const { points, pointCount } = polytope
  const moments = new Float64Array(4)
  for (let p = 0; p < pointCount; p++) {
    for (let c = 0; c < 4; c++) moments[c] += heights[p] * points[4 * p + c]
  }
  let inverse = inverses.get(polytope)
  if (inverse === undefined) {
    inverse = inverseGram(polytope)
    inverses.set(polytope, inverse)
  }
  const fit = new Float64Array(4)
  for (let r = 0; r < 4; r++) {
    for (let c = 0; c < 4; c++) fit[r] += inverse[4 * r + c] * moments[c]
    fit[r] = Math.round(fit[r]) + 0
  }
  return fit
}

/** Gauss-Jordan elimination; the points span R^4, so the matrix is positive definite. */
function inverseGram({ points, pointCount }: Polytope): Float64Array {
  const rows = [0, 1, 2, 3].map((r) => {
    const row = new Float64Array(8)
    for (let p = 0; p < pointCount; p++) {
      for (let c = 0; c < 4; c++) row[c] += points[4 * p + r] * points[4 * p + c]
    }
    row[4 + r] = 1
    return row
  })
  for (let pivot = 0; pivot < 4; pivot++) {
    const scale = rows[pivot][pivot]
    for (let c = 0; c < 8; c++) rows[pivot][c] /= scale
    for (let r = 0; r < 4; r++) {
      if (r === pivot) continue
      const factor = rows[r][pivot]
      for (let c = 0; c < 8; c++) rows[r][c] -= factor * rows[pivot][c]
    }
  }
  return Float64Array.from(rows.flatMap((row) => [...row.subarray(4)]))
}
