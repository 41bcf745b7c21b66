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
