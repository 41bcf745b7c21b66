import { InvariantError } from '../errors.ts'
import type { Faces } from './faces.ts'
import { facetsThrough } from './faces.ts'
import { latticePointsOf } from './latticePoints.ts'

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
  readonly point: readonly number[]
  /** Index of the carrier among the edges or 2-faces. */
  readonly face: number
}

/**
 * Enumerates all lattice points and reads each carrier off the facets through it: one facet, its interior; two, a
 * 2-face's interior; more, an edge or a vertex.
 *
 * @param vertices and
 * @param facets 4 coordinates each, in a reduced basis
 */
export function countLatticePoints(
  vertices: ArrayLike<number>,
  facets: ArrayLike<number>,
  faces: Pick<Faces, 'edges' | 'twoFaces'>,
): LatticeCount {
  const found = latticePointsOf(vertices, facets)
  const edgeAt = new Map(faces.edges.map(({ on }, index) => [on.join(' '), index]))
  const twoFaceAt = new Map(faces.twoFaces.map(({ ends }, index) => [ends.join(' '), index]))
  const facetInterior = new Int32Array(facets.length / 4)
  const twoFaceInterior = new Int32Array(faces.twoFaces.length)
  const inEdges: CarriedPoint[] = []
  const inTwoFaces: CarriedPoint[] = []
  for (let i = 0; i < found.length; i += 4) {
    const through = facetsThrough(facets, found[i], found[i + 1], found[i + 2], found[i + 3])
    if (through.length === 0) continue
    if (through.length === 1) {
      facetInterior[through[0]]++
      continue
    }
    const point = found.slice(i, i + 4)
    const face = (through.length === 2 ? twoFaceAt : edgeAt).get(through.join(' '))
    if (through.length === 2) {
      if (face === undefined)
        throw new InvariantError('A lattice point lies on two facets that share no 2-face.')
      twoFaceInterior[face]++
      inTwoFaces.push({ point, face })
    } else if (face !== undefined) inEdges.push({ point, face })
  }
  return { total: found.length / 4, facetInterior, twoFaceInterior, inEdges, inTwoFaces }
}
