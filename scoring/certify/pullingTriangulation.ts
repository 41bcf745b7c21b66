import { determinant, pairing, rank, type Vector } from './determinants.ts'

/**
 * Triangulates the boundary of a polytope by its vertices alone, pulling the first vertex of every face: a face is
 * the union of the pyramids from its first vertex over its own facets that do not hold that vertex. Four vertex
 * indices per simplex; together the cones over them fill the space around the origin once.
 *
 * @param vertices and
 * @param normals of a polytope with every facet at lattice distance one: <m, v> = -1 on facet m
 */
export function pullingTriangulation(vertices: readonly Vector[], normals: readonly Vector[]): number[][] {
  const onFacets = normals.map((normal) =>
    [...vertices.keys()].filter((v) => pairing(normal, vertices[v]) === -1),
  )
  return onFacets.flatMap((facet) => pulled(facet, 3))

  function pulled(face: readonly number[], dimension: number): number[][] {
    if (dimension === 0) return [[face[0]]]
    const [apex] = face
    const below = facesOf(face, dimension - 1).filter((part) => !part.includes(apex))
    return below.flatMap((part) => pulled(part, dimension - 1).map((simplex) => [apex, ...simplex]))
  }

  /** Faces of the given dimension inside a face of one more. */
  function facesOf(face: readonly number[], dimension: number): number[][] {
    const found = new Map<string, number[]>()
    for (const facet of onFacets) {
      const common = face.filter((v) => facet.includes(v))
      if (common.length <= dimension || common.length === face.length || found.has(common.join())) continue
      // No face's plane holds the origin: its dimension is one less than the rank of its vertices.
      if (rank(common.map((v) => vertices[v])) === dimension + 1) found.set(common.join(), common)
    }
    return [...found.values()]
  }
}

/** Normalised volume (4! times the Euclidean one), by the pulling triangulation. */
export function latticeVolume(vertices: readonly Vector[], normals: readonly Vector[]): number {
  return pullingTriangulation(vertices, normals).reduce(
    (sum, simplex) => sum + simplexVolume(vertices, simplex),
    0,
  )
}

export const simplexVolume = (points: readonly Vector[], corners: readonly number[]): number =>
  Math.abs(determinant(points[corners[0]], points[corners[1]], points[corners[2]], points[corners[3]]))
