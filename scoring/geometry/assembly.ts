import { facePlane } from './facePlane.ts'
import { facesOf, type Faces } from './faces.ts'
import { hodgeNumbers, latticeLength } from './hodge.ts'
import { compareLexicographic } from './integers.ts'
import { countLatticePoints, type CarriedPoint, type LatticeCount } from './latticeCount.ts'
import { reducedBasis, rowsOf, transform, transposed } from './latticeReduction.ts'
import type { Polytope, TwoFace } from './polytope.ts'

/** A point interior to an edge or 2-face: coordinates as given and in the reduced basis. */
interface CarriedTwice extends CarriedPoint {
  readonly given: readonly number[]
}

/**
 * Everything about a reflexive polytope from its vertices and facet normals, in any order. The work is done in a
 * reduced basis, the points are given back in the coordinates of the vertices.
 */
export function assemble(vertexRows: number[][], facetRows: number[][]): Polytope {
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
