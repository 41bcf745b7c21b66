import type { Polytope } from './polytope.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'

/**
 * The charge matrix Q, N x (N - 4), row-major: D_i = sum_a Q_ia D_a modulo the linear relations, a over all points
 * but the four excluded ones, whose vectors must be independent. The other points have unit rows; the excluded
 * ones are solved from sum_k <m, v_k> D_k = 0. Integral when the determinant of the four is the index of the
 * lattice that all points generate.
 *
 * @param excluded four points, ascending; `basis`: all others, ascending
 */
export function chargeMatrix(polytope: Polytope, excluded: Int32Array, basis: Int32Array): Float64Array {
  const points = reducedCoordinates(polytope)
  const rank = basis.length
  const charges = new Float64Array(polytope.pointCount * rank)
  for (let a = 0; a < rank; a++) charges[basis[a] * rank + a] = 1
  const corners = Array.from(excluded, (p) => Array.from(points.subarray(4 * p, 4 * p + 4)))
  const determinant = determinant4(corners)
  for (let a = 0; a < rank; a++) {
    const vector = Array.from(points.subarray(4 * basis[a], 4 * basis[a] + 4))
    for (let e = 0; e < 4; e++) {
      const replaced = corners.map((corner, row) => (row === e ? vector : corner))
      // + 0 turns -0 into 0.
      charges[excluded[e] * rank + a] = -determinant4(replaced) / determinant + 0
    }
  }
  return charges
}

function determinant4(rows: readonly (readonly number[])[]): number {
  const [a, b, c, d] = rows
  const minor = (i: number, j: number): number => c[i] * d[j] - c[j] * d[i]
  const lead = (i: number, j: number): number => a[i] * b[j] - a[j] * b[i]
  return (
    lead(0, 1) * minor(2, 3) -
    lead(0, 2) * minor(1, 3) +
    lead(0, 3) * minor(1, 2) +
    lead(1, 2) * minor(0, 3) -
    lead(1, 3) * minor(0, 2) +
    lead(2, 3) * minor(0, 1)
  )
}
