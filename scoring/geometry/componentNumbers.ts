import { InvariantError } from '../errors.ts'
import type { IntersectionNumbers } from './intersectionNumbers.ts'
import type { Polytope } from './polytope.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** The connected components of all prime toric divisors, by point and then by sheet; irreducible divisors of X. */
export interface Components {
  readonly count: number
  /** The point of each component. */
  readonly pointOf: Int32Array
  /** 0 .. L_f - 1 among the components of its point. */
  readonly sheetOf: Int32Array
  /** First component of each point; one more entry at the end. */
  readonly first: Int32Array
}

/** The components of a polytope's divisors. Their number minus 4 is h11. */
export function componentsOf({ pointCount, components }: Polytope): Components {
  const first = new Int32Array(pointCount + 1)
  for (let p = 0; p < pointCount; p++) first[p + 1] = first[p] + components[p]
  const count = first[pointCount]
  const pointOf = new Int32Array(count)
  const sheetOf = new Int32Array(count)
  for (let p = 0; p < pointCount; p++) {
    for (let sheet = 0; sheet < components[p]; sheet++) {
      pointOf[first[p] + sheet] = p
      sheetOf[first[p] + sheet] = sheet
    }
  }
  return { count, pointOf, sheetOf, first }
}

/**
 * Intersection numbers and c2 over all of H^{1,1}: every component of a split divisor is a divisor of its own.
 * Indices run over `componentsOf(polytope)`; on a favourable polytope these are the points and the numbers are
 * the ones given.
 *
 * Derivation. Let p lie inside the 2-face f = F_a n F_b, L = L_f, u = (m_a - m_b) / L primitive. The equation of
 * X, restricted to the stratum of a cone over a simplex of f with a corner inside f, keeps the monomials of the
 * dual edge only: it is a polynomial of degree L in the one character z = x^u, with L different roots (X is
 * regular for Delta; the ends of the edge have non-zero coefficients). As <u, v> = 0 on f, z is the same function
 * on all these strata: the roots number the components of all points inside f at once, sheet s of p and sheet s'
 * of q are disjoint for s != s', and each sheet is a copy of the toric surface of the star of p in f. Only points
 * of f are joined to p, as an edge of the class at p lies in a 2-face that contains p. The divisors of points on
 * the boundary of f (vertices, edges of the polytope) are connected and meet every sheet in the same way. Hence:
 *
 *     a triangle or pair of f that contains a point inside f has L copies, one per sheet, each with kappa / L;
 *     all corners inside f take that sheet, the others are the whole divisor
 *     D_p^3 and c2 . D_p are shared equally among the L sheets
 *     everything else, triangles of f between boundary points included, is unchanged; different sheets: 0
 *
 * The classes that toric divisors miss, sum_f l*(f) (L_f - 1) of them (Batyrev, alg-geom/9310003, 4.4), are the
 * differences of sheets; with the four linear relations the components span a space of rank
 * N + sum_f l*(f) (L_f - 1) - 4 = h11, which the rank of these numbers confirms (tests). c2 = sum_{i<j} D_i D_j
 * over components, since sheets of one point do not meet.
 *
 * @throws InvariantError when a number is no multiple of L_f
 */
export function componentNumbers(cls: TwoFaceClass, numbers: IntersectionNumbers): IntersectionNumbers {
  const { polytope } = cls
  const { components } = polytope
  const { first, count, pointOf } = componentsOf(polytope)
  if (count === polytope.pointCount) return numbers
  const sheetsAmong = (...points: number[]): number => Math.max(...points.map((p) => components[p]))
  const at = (p: number, sheet: number): number => first[p] + (components[p] > 1 ? sheet : 0)

  const triples: number[][] = []
  for (let t = 0; t < numbers.triangleNumbers.length; t++) {
    const corners = [...numbers.triangles.subarray(3 * t, 3 * t + 3)]
    const sheets = sheetsAmong(...corners)
    const value = share(numbers.triangleNumbers[t], sheets)
    for (let s = 0; s < sheets; s++) triples.push([...corners.map((p) => at(p, s)), value])
  }
  const pairs: number[][] = []
  for (let e = 0; e < numbers.edges.length; e += 2) {
    const [i, j] = [numbers.edges[e], numbers.edges[e + 1]]
    const sheets = sheetsAmong(i, j)
    const values = [share(numbers.edgeNumbers[e], sheets), share(numbers.edgeNumbers[e + 1], sheets)]
    for (let s = 0; s < sheets; s++) pairs.push([at(i, s), at(j, s), ...values])
  }
  // Components are numbered in the order of their points, so that i < j < k holds already.
  triples.sort((a, b) => a[0] - b[0] || a[1] - b[1] || a[2] - b[2])
  pairs.sort((a, b) => a[0] - b[0] || a[1] - b[1])
  const perSheet = (values: Float64Array): Float64Array =>
    Float64Array.from({ length: count }, (_, c) => share(values[pointOf[c]], components[pointOf[c]]))
  return {
    pointCount: count,
    triangles: Int32Array.from(triples.flatMap(([i, j, k]) => [i, j, k])),
    triangleNumbers: Float64Array.from(triples, ([, , , value]) => value),
    edges: Int32Array.from(pairs.flatMap(([i, j]) => [i, j])),
    edgeNumbers: Float64Array.from(pairs.flatMap(([, , iij, ijj]) => [iij, ijj])),
    cubes: perSheet(numbers.cubes),
    secondChern: perSheet(numbers.secondChern),
    euler: numbers.euler,
  }
}

function share(total: number, sheets: number): number {
  const part = total / sheets
  if (!Number.isInteger(part)) {
    throw new InvariantError(`The number ${total} cannot be shared among ${sheets} components.`)
  }
  return part
}
