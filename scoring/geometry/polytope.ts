import { InputError } from '../errors.ts'
import { assemble } from './assembly.ts'
import { applyBig, reducedBasis, type BasisChange } from './latticeReduction.ts'
import { reflexiveHull } from './reflexiveHull.ts'

/**
 * A reflexive polytope in Z^4 on the N side (the side whose points become divisors), with everything that
 * does not depend on a triangulation. Indices i, j, k run over `points` everywhere.
 *
 * Points are all non-origin lattice points that are not interior to a facet, in a fixed order: vertices
 * first, then by the dimension of the carrier (the smallest face that contains the point), each
 * lexicographically.
 */
export interface Polytope {
  /** Coordinates, 4 per point. */
  readonly points: Int32Array
  readonly pointCount: number
  /** The first `vertexCount` points are the vertices. */
  readonly vertexCount: number
  /** Dimension of each point's carrier: 0 vertex, 1 interior to an edge, 2 interior to a 2-face. */
  readonly carrierDimension: Uint8Array
  /** l*(c*), the number of interior lattice points of the face dual to each point's carrier. */
  readonly dualInterior: Int32Array
  /** Number of connected components of each prime toric divisor on X: 1, or L_f interior to a 2-face f. */
  readonly components: Int32Array
  /** Primitive inner normals m_a, 4 per facet: <m_a, v> >= -1 on the polytope. Lexicographic order. */
  readonly facets: Int32Array
  readonly facetCount: number
  readonly twoFaces: readonly TwoFace[]
  /** Edges of the polytope (1-faces): the points on each, in order along the edge. */
  readonly edges: readonly Int32Array[]
  readonly hodge: Hodge
  /** True when all of H^{1,1}(X) comes from toric divisors. */
  readonly favourable: boolean
  /** All lattice points, the origin and facet interiors included; of the dual likewise. */
  readonly latticePoints: number
  readonly dualLatticePoints: number
}

export interface Hodge {
  readonly h11: number
  readonly h21: number
  /** Euler number of the threefold, 2 (h11 - h21). */
  readonly euler: number
}

/** A two-dimensional face, a lattice polygon. */
export interface TwoFace {
  /** The two facets whose intersection it is. */
  readonly facets: readonly [number, number]
  /** L_f, the lattice length of the dual edge. */
  readonly dualLength: number
  /** Indices of all lattice points on the face, ascending. */
  readonly points: Int32Array
  /** Coordinates of `points` in a lattice basis of the face's plane, 2 per point, least coordinate 0. */
  readonly plane: Int32Array
  /** Indices of the polygon's corners, counterclockwise in the plane's coordinates. */
  readonly corners: Int32Array
  /** Normalised area: the number of triangles in every unimodular triangulation. */
  readonly area: number
}

/**
 * The reflexive polytope that is the hull of the given points, in the coordinates given. A function of the hull
 * alone: neither the order of the points nor points that are no vertices matter.
 *
 * @param rows integer points of N, 4 coordinates each; at least the vertices
 * @throws InputError with one of the codes polytope.wrong-shape, .not-integers, .unsafe-integers,
 *   .too-few-points, .not-four-dimensional, .coordinates-too-large, .too-many-vertices, .origin-not-interior,
 *   .facet-distance; paths are relative to `rows`
 */
export function polytopeFromPoints(rows: readonly (readonly number[])[]): Polytope {
  const { vertices, facets } = reflexiveHull(rows)
  return assemble(vertices.map(storable), facets.map(storable))
}

/**
 * The same polytope in a reduced basis, where its coordinates are small: for points whose coordinates as given are
 * too large to keep (up to 2^53), when only the class under GL(4,Z) matters.
 *
 * @throws InputError as `polytopeFromPoints`, naming facets in the coordinates given
 */
export function reducedPolytope(rows: readonly (readonly number[])[]): Polytope {
  return polytopeInReducedBasis(rows).polytope
}

/** As `reducedPolytope`, with the change of basis from the coordinates given to those of the polytope. */
export function polytopeInReducedBasis(rows: readonly (readonly number[])[]): {
  readonly polytope: Polytope
  readonly basis: BasisChange
} {
  const { vertices, facets } = reflexiveHull(rows)
  const exact = vertices.map((vertex) => vertex.map(BigInt))
  const basis = reducedBasis(exact)
  const polytope = assemble(
    exact.map((vertex) => storable(applyBig(basis.matrix, vertex))),
    facets.map((normal) => storable(applyBig(basis.dual, normal))),
  )
  return { polytope, basis }
}

/** The dual polytope, on the M side: the hull of the facet normals. Its facet normals are this one's vertices. */
export function dualPolytope(polytope: Polytope): Polytope {
  const rows: number[][] = []
  for (let a = 0; a < polytope.facetCount; a++) rows.push([...polytope.facets.subarray(4 * a, 4 * a + 4)])
  return polytopeFromPoints(rows)
}

/** What the integer arrays of a polytope can hold. */
const coordinateLimit = 2 ** 31 - 1

function storable(vector: readonly (number | bigint)[]): number[] {
  for (const entry of vector) {
    if (entry <= coordinateLimit && entry >= -coordinateLimit) continue
    throw new InputError(
      'polytope.coordinates-too-large',
      `The coordinates are too large: the vertex or facet normal (${vector.join(', ')}) goes beyond ${coordinateLimit}. Give the points in a lattice basis in which they are shorter.`,
      '',
      vector.map(String),
    )
  }
  return vector.map(Number)
}
