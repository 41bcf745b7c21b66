import { TooLarge } from '../vectors.ts'
import type { Polytope } from '../polytope.ts'

/** Coordinates for which every 4 x 4 determinant and all its partial sums stay below 2^53: 24 c^4. */
const COORDINATE_LIMIT = 4000

/**
 * The signed minors of four vectors v_0 .. v_3 of Z^4, 4 x 4 by rows, exact: row m is orthogonal to the other
 * three vectors and <row m, v_m> is their determinant. So v = sum_m (<row m, v> / determinant) v_m for every v.
 *
 * @throws TooLarge for coordinates above 4,000 in size
 */
export function minorsOf(
  polytope: Polytope,
  vertices: ArrayLike<number>,
): { readonly rows: Float64Array; readonly determinant: number } {
  const { points } = polytope
  const rows = new Float64Array(16)
  for (let m = 0; m < 4; m++) {
    for (let c = 0; c < 4; c++) {
      if (Math.abs(points[4 * vertices[m] + c]) > COORDINATE_LIMIT) throw new TooLarge()
    }
  }
  for (let m = 0; m < 4; m++) {
    const p = 4 * vertices[m === 0 ? 1 : 0]
    const q = 4 * vertices[m <= 1 ? 2 : 1]
    const r = 4 * vertices[m === 3 ? 2 : 3]
    for (let c = 0; c < 4; c++) {
      const x = c === 0 ? 1 : 0
      const y = c <= 1 ? 2 : 1
      const z = c === 3 ? 2 : 3
      const minor =
        points[p + x] * (points[q + y] * points[r + z] - points[q + z] * points[r + y]) -
        points[p + y] * (points[q + x] * points[r + z] - points[q + z] * points[r + x]) +
        points[p + z] * (points[q + x] * points[r + y] - points[q + y] * points[r + x])
      rows[4 * m + c] = (m + c) % 2 === 0 ? minor : -minor
    }
  }
  return { rows, determinant: pairing(rows, 0, points, vertices[0]) }
}

/** <row m, v_p>. */
export function pairing(rows: Float64Array, m: number, points: Int32Array, p: number): number {
  return (
    rows[4 * m] * points[4 * p] +
    rows[4 * m + 1] * points[4 * p + 1] +
    rows[4 * m + 2] * points[4 * p + 2] +
    rows[4 * m + 3] * points[4 * p + 3]
  )
}

/** Normalised volume of the simplex of four points of a facet: the index of the cone over it; 0 when degenerate. */
export function simplexVolume(polytope: Polytope, vertices: ArrayLike<number>): number {
  return Math.abs(minorsOf(polytope, vertices).determinant)
}
