/**
 * Which vertices lie on which facets, and the faces of dimension 1 and 2 read off it. Vertices and facets are
 * indices into the lists the incidence was made from.
 */
export interface Faces {
  /** Facets through each vertex, ascending. */
  readonly facetsOfVertex: readonly (readonly number[])[]
  /** Vertices on each facet, ascending. */
  readonly verticesOfFacet: readonly (readonly number[])[]
  /** Edges (v, w), v < w, in lexicographic order, each with the facets that contain it. */
  readonly edges: readonly { readonly ends: readonly [number, number]; readonly on: readonly number[] }[]
  /** 2-faces as pairs of facets (a, b), a < b, in lexicographic order, each with its vertices. */
  readonly twoFaces: readonly { readonly ends: readonly [number, number]; readonly on: readonly number[] }[]
}

/** Facets (4 coordinates each) at which the point takes its least value: <m, point> = -1. Ascending. */
export function facetsThrough(
  facets: ArrayLike<number>,
  x: number,
  y: number,
  z: number,
  w: number,
): number[] {
  const found: number[] = []
  for (let a = 0; 4 * a < facets.length; a++) {
    const b = 4 * a
    if (facets[b] * x + facets[b + 1] * y + facets[b + 2] * z + facets[b + 3] * w === -1) found.push(a)
  }
  return found
}

/**
 * Two facets of a four-dimensional polytope meet in a 2-face exactly when they share at least three vertices (their
 * intersection is a face; one of lower dimension has at most two). Dually, two vertices span an edge exactly when
 * at least three facets contain both.
 */
export function facesOf(vertices: ArrayLike<number>, facets: ArrayLike<number>): Faces {
  const facetsOfVertex: number[][] = []
  const verticesOfFacet: number[][] = Array.from({ length: facets.length / 4 }, () => [])
  for (let v = 0; 4 * v < vertices.length; v++) {
    const b = 4 * v
    const through = facetsThrough(facets, vertices[b], vertices[b + 1], vertices[b + 2], vertices[b + 3])
    facetsOfVertex.push(through)
    for (const a of through) verticesOfFacet[a].push(v)
  }
  return {
    facetsOfVertex,
    verticesOfFacet,
    edges: pairsSharingThree(facetsOfVertex),
    twoFaces: pairsSharingThree(verticesOfFacet),
  }
}

function pairsSharingThree(
  members: readonly (readonly number[])[],
): { ends: [number, number]; on: number[] }[] {
  const pairs: { ends: [number, number]; on: number[] }[] = []
  for (let a = 0; a < members.length; a++) {
    for (let b = a + 1; b < members.length; b++) {
      const on = members[a].filter((member) => members[b].includes(member))
      if (on.length >= 3) pairs.push({ ends: [a, b], on })
    }
  }
  return pairs
}
