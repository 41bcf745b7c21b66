import type { Faces } from './faces.ts'
import { facetsThrough } from './faces.ts'
import { latticePointsOf } from './latticePoints.ts'
import { reducedBasis, rowsOf, transform, transposed } from './latticeReduction.ts'

/** Lattice points of a reflexive polytope, sorted by their carriers. */
export interface LatticeCount {
  /** All of them, the origin included. */
  readonly total: number
  /** Number interior to each facet. */
  readonly facetInterior: Int32Array
  /** Number interior to each 2-face, in the order of `Faces.twoFaces`. */
  readonly twoFaceInterior: Int32Array
  /** Points interior to edges and 2-faces with their coordinates and the face's index. */
  readonly inEdges: readonly CarriedPoint[]
  readonly inTwoFaces: readonly CarriedPoint[]
}

export interface CarriedPoint {
  /** Coordinates in the basis the polytope was given in. */
  readonly point: readonly number[]
  /** Index of the carrier among the edges or 2-faces. */
  readonly face: number
}

/**
 * Enumerates all lattice points in a reduced basis and reads each carrier off the facets through it: one facet, its
 * interior; two, a 2-face's interior; more, an edge or a vertex.
 *
 * @param vertices and
 * @param facets 4 coordinates each, any basis
 */
export function countLatticePoints(
  vertices: ArrayLike<number>,
  facets: ArrayLike<number>,
  faces: Pick<Faces, 'edges' | 'twoFaces'>,
): LatticeCount {
  const { matrix, dual } = reducedBasis(rowsOf(vertices))
  const facetsReduced = transform(dual, facets)
  const found = latticePointsOf(transform(matrix, vertices), facetsReduced)
  const edgeAt = new Map(faces.edges.map(({ on }, index) => [on.join(' '), index]))
  const twoFaceAt = new Map(faces.twoFaces.map(({ ends }, index) => [ends.join(' '), index]))
  const facetInterior = new Int32Array(facets.length / 4)
  const twoFaceInterior = new Int32Array(faces.twoFaces.length)
  const inEdges: { reduced: number[]; face: number }[] = []
  const inTwoFaces: { reduced: number[]; face: number }[] = []
  for (let i = 0; i < found.length; i += 4) {
    const reduced = [found[i], found[i + 1], found[i + 2], found[i + 3]]
    const through = facetsThrough(facetsReduced, reduced[0], reduced[1], reduced[2], reduced[3])
    if (through.length === 0) continue
    if (through.length === 1) {
      facetInterior[through[0]]++
    } else if (through.length === 2) {
      const face = twoFaceAt.get(through.join(' '))!
      twoFaceInterior[face]++
      inTwoFaces.push({ reduced, face })
    } else {
      const face = edgeAt.get(through.join(' '))
      if (face !== undefined) inEdges.push({ reduced, face })
    }
  }
  const backwards = transposed(dual)
  const restore = (carried: { reduced: number[]; face: number }[]): CarriedPoint[] => {
    const flat = transform(
      backwards,
      carried.flatMap(({ reduced }) => reduced),
    )
    return carried.map(({ face }, i) => ({ point: flat.slice(4 * i, 4 * i + 4), face }))
  }
  return {
    total: found.length / 4,
    facetInterior,
    twoFaceInterior,
    inEdges: restore(inEdges),
    inTwoFaces: restore(inTwoFaces),
  }
}
