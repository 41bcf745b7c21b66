import { boundaryLatticePoints } from './boxPoints.ts'
import { greatestCommonDivisor, minus, pairing, rank, type Vector } from './determinants.ts'
import { facetNormals } from './facets.ts'
import { checkVolume } from './liftedSimplex.ts'
import { pullingTriangulation, simplexVolume } from './pullingTriangulation.ts'

/** What the independent road finds out about a reflexive polytope from its vertices alone. */
export interface PolytopeReading {
  readonly vertices: readonly Vector[]
  /** <m, v> >= -1, lexicographic order. */
  readonly normals: readonly Vector[]
  /** Lattice points of the boundary with the facets through them and the dimension of their carrier. */
  readonly boundary: readonly BoundaryPoint[]
  readonly dualBoundary: readonly BoundaryPoint[]
  /** Normalised volumes. */
  readonly volume: number
  readonly dualVolume: number
  readonly edges: number
  readonly twoFaces: number
  readonly hodge: { readonly h11: number; readonly h21: number; readonly euler: number }
  readonly favourable: boolean
}

export interface BoundaryPoint {
  readonly point: Vector
  /** Indices of the facets through it, ascending. */
  readonly through: readonly number[]
  /** Dimension of its carrier: 0 vertex, 1 edge, 2 two-face, 3 facet. */
  readonly dimension: number
}

/**
 * Reads a polytope from its vertices: facets by trying all quadruples, lattice points by classes modulo simplices
 * of a pulling triangulation, carriers by the rank of the normals through a point, Hodge numbers by Batyrev's
 * formula (alg-geom/9310003)
 *
 *     h11 = lattice points - 5 - points inside facets + sum over points inside 2-faces f of (L_f - 1)
 *
 * with L_f the lattice length of the edge between the normals of the two facets through the point.
 *
 * @throws InputError certificate.origin-not-interior, .not-reflexive, .not-four-dimensional, .too-large
 */
export function readPolytope(vertices: readonly Vector[]): PolytopeReading {
  const normals = facetNormals(vertices)
  const own = boundaryOf(vertices, normals)
  const dual = boundaryOf(normals, vertices)
  const h11 = hodgeNumber(own.boundary, normals)
  const h21 = hodgeNumber(dual.boundary, vertices)
  return {
    vertices,
    normals,
    boundary: own.boundary,
    dualBoundary: dual.boundary,
    volume: own.volume,
    dualVolume: dual.volume,
    edges: twoFaceCount(normals, vertices),
    twoFaces: twoFaceCount(vertices, normals),
    hodge: { h11, h21, euler: 2 * (h11 - h21) },
    favourable: missed(own.boundary, normals) === 0,
  }
}

function boundaryOf(vertices: readonly Vector[], normals: readonly Vector[]) {
  const simplices = pullingTriangulation(vertices, normals)
  const volume = simplices.reduce((sum, simplex) => sum + simplexVolume(vertices, simplex), 0)
  checkVolume(volume)
  const dimensions = new Map<string, number>()
  const boundary = boundaryLatticePoints(vertices, simplices).map((point): BoundaryPoint => {
    const through = [...normals.keys()].filter((a) => pairing(normals[a], point) === -1)
    const name = through.join()
    const dimension = dimensions.get(name) ?? 4 - rank(through.map((a) => normals[a]))
    dimensions.set(name, dimension)
    return { point, through, dimension }
  })
  return { boundary, volume }
}

/** Every 2-face is the intersection of just one pair of facets; the dual's 2-faces belong to the edges. */
function twoFaceCount(vertices: readonly Vector[], normals: readonly Vector[]): number {
  const onFacets = normals.map((normal) => vertices.filter((vertex) => pairing(normal, vertex) === -1))
  let count = 0
  onFacets.forEach((facet, a) => {
    for (const other of onFacets.slice(a + 1)) {
      const common = facet.filter((vertex) => other.includes(vertex))
      if (common.length > 2 && rank(common) === 3) count++
    }
  })
  return count
}

function hodgeNumber(boundary: readonly BoundaryPoint[], normals: readonly Vector[]): number {
  const insideFacets = boundary.filter(({ dimension }) => dimension === 3).length
  return boundary.length + 1 - 5 - insideFacets + missed(boundary, normals)
}

/** The part of H^{1,1} that toric divisors miss. */
function missed(boundary: readonly BoundaryPoint[], normals: readonly Vector[]): number {
  return boundary.reduce((sum, point) => sum + components(point, normals) - 1, 0)
}

/** Connected components of the divisor of a point: L_f inside a 2-face f, else 1. */
export function components({ dimension, through }: BoundaryPoint, normals: readonly Vector[]): number {
  if (dimension !== 2) return 1
  return minus(normals[through[0]], normals[through[1]]).reduce(greatestCommonDivisor, 0)
}

/** What is known of each point of a list, in its order. */
export interface PointFigures {
  readonly points: readonly Vector[]
  readonly through: readonly (readonly number[])[]
  readonly dimension: readonly number[]
  readonly components: readonly number[]
  /** Interior lattice points of the face of the dual that belongs to the carrier. */
  readonly dualInterior: readonly number[]
}

/** How a list of points differs from the lattice points outside the interiors of facets. */
export interface PointDifferences {
  readonly missing: readonly Vector[]
  readonly foreign: readonly Vector[]
  readonly twice: readonly Vector[]
}

export function pointDifferences(reading: PolytopeReading, points: readonly Vector[]): PointDifferences {
  const own = new Map(
    reading.boundary.filter(({ dimension }) => dimension < 3).map((p) => [p.point.join(), p]),
  )
  const seen = new Set<string>()
  const twice = points.filter((point) => seen.size === seen.add(point.join()).size)
  return {
    missing: [...own.values()].filter(({ point }) => !seen.has(point.join())).map(({ point }) => point),
    foreign: points.filter((point) => !own.has(point.join())),
    twice,
  }
}

/** @param points exactly the lattice points outside the interiors of facets, in any order */
export function pointFigures(reading: PolytopeReading, points: readonly Vector[]): PointFigures {
  const { normals, vertices } = reading
  const own = new Map(reading.boundary.map((point) => [point.point.join(), point]))
  // Inside the face dual to a face c lie the dual points whose own facets are the vertices of c.
  const inside = new Map<string, number>()
  for (const { through } of reading.dualBoundary)
    inside.set(through.join(), (inside.get(through.join()) ?? 0) + 1)
  const verticesOf = (through: readonly number[]): string =>
    [...vertices.keys()].filter((v) => through.every((a) => pairing(normals[a], vertices[v]) === -1)).join()
  const known = points.map((point) => own.get(point.join()) as BoundaryPoint)
  return {
    points,
    through: known.map(({ through }) => through),
    dimension: known.map(({ dimension }) => dimension),
    components: known.map((point) => components(point, normals)),
    dualInterior: known.map(({ through }) => inside.get(verticesOf(through)) ?? 0),
  }
}
