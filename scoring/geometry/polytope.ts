import { InputError } from '../errors.ts'
import { facePlane } from './facePlane.ts'
import type { Faces } from './faces.ts'
import { facesOf } from './faces.ts'
import { hodgeNumbers, latticeLength } from './hodge.ts'
import { compareLexicographic } from './integers.ts'
import type { CarriedPoint, LatticeCount } from './latticeCount.ts'
import { countLatticePoints } from './latticeCount.ts'
import { applyBig, reducedBasis, rowsOf, transform, transposed } from './latticeReduction.ts'
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
  const { vertices, facets } = reflexiveHull(rows)
  const exact = vertices.map((vertex) => vertex.map(BigInt))
  const { matrix, dual } = reducedBasis(exact)
  return assemble(
    exact.map((vertex) => storable(applyBig(matrix, vertex))),
    facets.map((normal) => storable(applyBig(dual, normal))),
  )
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

/** A point interior to an edge or 2-face: coordinates as given and in the reduced basis. */
interface CarriedTwice extends CarriedPoint {
  readonly given: readonly number[]
}

function assemble(vertexRows: number[][], facetRows: number[][]): Polytope {
  const vertices = vertexRows.sort(compareLexicographic).flat()
  const facets = facetRows.sort(compareLexicographic).flat()
  const basis = reducedBasis(rowsOf(vertices))
  const shortVertices = transform(basis.matrix, vertices)
  const shortFacets = transform(basis.dual, facets)
  const faces = facesOf(shortVertices, shortFacets)
  const own = countLatticePoints(shortVertices, shortFacets, faces)
  const dual = countDualPoints(shortVertices, shortFacets, faces)

  const back = transposed(basis.dual)
  const inEdges = inOrder(own.inEdges, back)
  const inTwoFaces = inOrder(own.inTwoFaces, back)
  const vertexCount = vertices.length / 4
  const edgePoints = vertexCount + inEdges.length
  const carried = [...inEdges, ...inTwoFaces]
  const points = new Int32Array(vertices.concat(...carried.map(({ given }) => given)))
  const short = new Float64Array(shortVertices.concat(...carried.map(({ point }) => point)))
  const pointCount = points.length / 4
  const carrierDimension = new Uint8Array(pointCount).fill(1, vertexCount).fill(2, edgePoints)
  const dualLengths = faces.twoFaces.map(({ ends }) => latticeLength(shortFacets, ends[0], ends[1]))
  const edgeLengths = faces.edges.map(({ ends }) => latticeLength(shortVertices, ends[0], ends[1]))

  const dualInterior = new Int32Array(pointCount)
  const components = new Int32Array(pointCount).fill(1)
  dualInterior.set(dual.facetInterior)
  inEdges.forEach(({ face }, i) => (dualInterior[vertexCount + i] = dual.twoFaceInterior[face]))
  inTwoFaces.forEach(({ face }, i) => {
    dualInterior[edgePoints + i] = dualLengths[face] - 1
    components[edgePoints + i] = dualLengths[face]
  })

  const onEdge = faces.edges.map(({ ends }) => [...ends])
  inEdges.forEach(({ face }, i) => onEdge[face].push(vertexCount + i))
  const onTwoFace = pointsOfTwoFaces(faces, onEdge, vertexCount)
  inTwoFaces.forEach(({ face }, i) => onTwoFace[face].push(edgePoints + i))

  return {
    points,
    pointCount,
    vertexCount,
    carrierDimension,
    dualInterior,
    components,
    facets: new Int32Array(facets),
    facetCount: facets.length / 4,
    twoFaces: faces.twoFaces.map(({ ends, on }, f) => twoFace(short, ends, on, onTwoFace[f], dualLengths[f])),
    edges: onEdge.map((members) => alongEdge(short, members)),
    ...hodgeNumbers(faces, own, dual, dualLengths, edgeLengths),
    latticePoints: own.total,
    dualLatticePoints: dual.total,
  }
}

/** In the dual, facets and vertices change places, and so do 2-faces and edges. */
function countDualPoints(vertices: readonly number[], facets: readonly number[], faces: Faces): LatticeCount {
  const { matrix, dual } = reducedBasis(rowsOf(facets))
  const dualFaces = { edges: faces.twoFaces, twoFaces: faces.edges }
  return countLatticePoints(transform(matrix, facets), transform(dual, vertices), dualFaces)
}

/** Points with their coordinates as given, in lexicographic order of these. */
function inOrder(carried: readonly CarriedPoint[], back: readonly (readonly bigint[])[]): CarriedTwice[] {
  const flat = transform(
    back,
    carried.flatMap(({ point }) => point),
  )
  return carried
    .map(({ point, face }, i) => ({ point, face, given: flat.slice(4 * i, 4 * i + 4) }))
    .sort((a, b) => compareLexicographic(a.given, b.given))
}

/** Vertices and edge points of each 2-face, ascending. */
function pointsOfTwoFaces(
  faces: Faces,
  onEdge: readonly (readonly number[])[],
  vertexCount: number,
): number[][] {
  const edgesOfVertex: number[][] = Array.from({ length: vertexCount }, () => [])
  faces.edges.forEach(({ ends }, e) => edgesOfVertex[ends[0]].push(e))
  return faces.twoFaces.map(({ ends, on }) => {
    const members = [...on]
    for (const v of on) {
      for (const e of edgesOfVertex[v]) {
        const { on: facetsOfEdge } = faces.edges[e]
        if (facetsOfEdge.includes(ends[0]) && facetsOfEdge.includes(ends[1]))
          members.push(...onEdge[e].slice(2))
      }
    }
    return members.sort((i, j) => i - j)
  })
}

function twoFace(
  points: Float64Array,
  facets: readonly [number, number],
  vertices: readonly number[],
  members: readonly number[],
  dualLength: number,
): TwoFace {
  const coordinates = new Float64Array(4 * members.length)
  members.forEach((i, position) => coordinates.set(points.subarray(4 * i, 4 * i + 4), 4 * position))
  const { plane, corners, area } = facePlane(
    coordinates,
    vertices.map((v) => members.indexOf(v)),
  )
  return {
    facets,
    dualLength,
    points: new Int32Array(members),
    plane,
    corners: new Int32Array(corners.map((position) => members[position])),
    area,
  }
}

/** The points of an edge in order along it; the first two given are its ends. */
function alongEdge(points: Float64Array, members: readonly number[]): Int32Array {
  const [start, end] = members
  const along = (i: number): number => latticeLength(points, start, i)
  return new Int32Array([start, ...members.slice(2).sort((i, j) => along(i) - along(j)), end])
}
