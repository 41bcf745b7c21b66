import { InvariantError } from '../errors.ts'
import { boundaryLattice, type BoundaryLattice } from './boundaryLattice.ts'
import { gcdOf } from './integers.ts'
import { planeMinors } from './minors.ts'
import { PointIndex } from './pointIndex.ts'
import type { Polytope } from './polytope.ts'
import { polygonType } from './reflexivePolygons.ts'

/** A plane through the origin that cuts a reflexive polygon out of the polytope. */
export interface PlanarSection {
  /** The lattice points of the section but the origin, counterclockwise, as indices of the boundary lattice. */
  readonly points: Int32Array
  /**
   * For every point v_i of `points` the integer a_i with v_{i-1} + v_{i+1} = a_i v_i. The dual edge of v_i has
   * lattice length 2 - a_i, zero where v_i lies inside an edge.
   */
  readonly turns: Int32Array
  /**
   * Number of the polygon among the 16, F_1 to F_16 as in Klevers et al., arXiv:1408.4808 (from memory): F_i and
   * F_{17-i} are dual for i <= 6, and F_7 to F_10 are dual to themselves.
   */
  readonly type: number
}

/**
 * All planes through the origin whose section with the polytope is a reflexive polygon: a lattice polygon with the
 * origin inside. It is enough that the lattice points in the plane have the origin inside their hull: inner
 * lattice points of the section are inner points of the polytope, so there is only the origin, the hull is
 * reflexive, and the section's dual, a projection of the dual polytope and so a lattice polygon, lies in the
 * hull's dual and is reflexive too.
 *
 * The lattice points around a reflexive polygon are the rays of a smooth complete toric surface. That is the
 * projective plane, with three rays of sum zero, or a blow-up of a Hirzebruch surface, with two opposite rays
 * (Fulton, Introduction to Toric Varieties, 2.5). So opposite points and triples of sum zero find all planes.
 */
export function planarSections(polytope: Polytope): PlanarSection[] {
  const lattice = boundaryLattice(polytope)
  const index = new PointIndex(lattice.points)
  const sections: PlanarSection[] = []
  for (const [p, q] of planesOfOpposites(lattice, index)) sections.push(sectionOf(lattice, p, q))
  for (const [p, q] of triplesOfSumZero(lattice, index, polytope.pointCount)) {
    const section = sectionOf(lattice, p, q)
    if (section.points.length === 3) sections.push(section)
  }
  return sections
}

/** Planes through points p and -p with a lattice point on either side of their line, each as two points that span it. */
function planesOfOpposites(
  { points, count }: BoundaryLattice,
  index: PointIndex,
): Iterable<[number, number]> {
  const planes = new Map<string, [number, number]>()
  const opposite = new Float64Array(4)
  const minors = new Float64Array(6)
  for (let p = 0; p < count; p++) {
    for (let axis = 0; axis < 4; axis++) opposite[axis] = -points[4 * p + axis]
    const other = index.lookup(opposite, 0)
    if (other === undefined || other < p) continue
    const sides = new Map<string, number>()
    for (let q = 0; q < count; q++) {
      if (q === p || q === other) continue
      planeMinors(points, p, q, minors)
      const sign = Math.sign(minors.find((minor) => minor !== 0) ?? 0)
      const scale = sign * gcdOf(minors)
      const plane = minors.map((minor) => minor / scale + 0).join(' ')
      const side = sides.get(plane)
      if (side === undefined) sides.set(plane, sign)
      else if (side !== sign && !planes.has(plane)) planes.set(plane, [p, q])
    }
  }
  return planes.values()
}

/** Pairs a < b of points for which -(a + b) is a point after b. Vertices of a section lie on faces of dimension 2 or less. */
function* triplesOfSumZero(
  { points }: BoundaryLattice,
  index: PointIndex,
  count: number,
): Iterable<[number, number]> {
  const third = new Float64Array(4)
  for (let a = 0; a < count; a++) {
    for (let b = a + 1; b < count; b++) {
      for (let axis = 0; axis < 4; axis++) third[axis] = -points[4 * a + axis] - points[4 * b + axis]
      const c = index.lookup(third, 0)
      if (c !== undefined && c > b) yield [a, b]
    }
  }
}

/** The section of the plane spanned by two points. */
function sectionOf({ points, count }: BoundaryLattice, p: number, q: number): PlanarSection {
  const minors = new Float64Array(6)
  planeMinors(points, p, q, minors)
  const at = minors.findIndex((minor) => minor !== 0)
  const [i, j] = AXES[at]
  const orientation = Math.sign(minors[at])
  // The plane projects injectively to the axes i and j; `cross` is a fixed multiple of the determinant in it.
  const cross = (u: number, v: number): number =>
    orientation * (points[4 * u + i] * points[4 * v + j] - points[4 * u + j] * points[4 * v + i])
  const members: number[] = []
  for (let u = 0; u < count; u++) if (inPlane(points, minors, u)) members.push(u)

  const [first] = members
  const upper = (u: number): boolean =>
    cross(first, u) > 0 ||
    (cross(first, u) === 0 &&
      points[4 * u + i] * points[4 * first + i] + points[4 * u + j] * points[4 * first + j] > 0)
  members.sort((u, v) => Number(upper(v)) - Number(upper(u)) || cross(v, u))
  const size = members.length
  const unit = cross(members[0], members[1])
  const turns = Int32Array.from(
    members,
    (_, k) => cross(members[(k + size - 1) % size], members[(k + 1) % size]) / unit,
  )
  const consecutive = members.every((u, k) => cross(u, members[(k + 1) % size]) === unit)
  const twelve = turns.reduce((sum, turn) => sum + 3 - turn, 0)
  if (!(unit > 0) || !consecutive || twelve !== 12)
    throw new InvariantError('The lattice points in a plane do not form a reflexive polygon.')
  return { points: Int32Array.from(members), turns, type: polygonType(turns) }
}

const AXES = [
  [0, 1],
  [0, 2],
  [0, 3],
  [1, 2],
  [1, 3],
  [2, 3],
] as const

/** The four 3 x 3 minors of the plane's spanning points and the point vanish. */
function inPlane(points: ArrayLike<number>, minors: Float64Array, u: number): boolean {
  const [m01, m02, m03, m12, m13, m23] = minors
  const b = 4 * u
  return (
    m01 * points[b + 2] - m02 * points[b + 1] + m12 * points[b] === 0 &&
    m01 * points[b + 3] - m03 * points[b + 1] + m13 * points[b] === 0 &&
    m02 * points[b + 3] - m03 * points[b + 2] + m23 * points[b] === 0 &&
    m12 * points[b + 3] - m13 * points[b + 2] + m23 * points[b + 1] === 0
  )
}
