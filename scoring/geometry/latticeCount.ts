import type { Faces } from './faces.ts'
import { facetsThrough } from './faces.ts'
import { latticePointsOf } from './latticePoints.ts'
import { applyBig, reducedBasis } from './latticeReduction.ts'

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
    const flat = transform(backwards, carried.flatMap(({ reduced }) => reduced))
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

const transposed = (rows: readonly (readonly bigint[])[]): bigint[][] =>
  rows.map((_, column) => rows.map((row) => row[column]))

function rowsOf(flat: ArrayLike<number>): bigint[][] {
  const rows: bigint[][] = []
  for (let i = 0; i < flat.length; i += 4) rows.push([0, 1, 2, 3].map((axis) => BigInt(flat[i + axis])))
  return rows
}

/** Images of integer vectors, in doubles where every sum is provably below 2^53, in big integers elsewhere. */
function transform(matrix: readonly (readonly bigint[])[], vectors: ArrayLike<number>): number[] {
  let largestEntry = 0
  for (const row of matrix) for (const entry of row) largestEntry = Math.max(largestEntry, Math.abs(Number(entry)))
  let largest = 0
  for (let i = 0; i < vectors.length; i++) largest = Math.max(largest, Math.abs(vectors[i]))
  if (4 * largestEntry * largest > Number.MAX_SAFE_INTEGER) {
    return rowsOf(vectors).flatMap((vector) => applyBig(matrix, vector).map(Number))
  }
  const rows = matrix.map((row) => row.map(Number))
  const images: number[] = []
  for (let i = 0; i < vectors.length; i += 4) {
    for (const [a, b, c, d] of rows) {
      images.push(a * vectors[i] + b * vectors[i + 1] + c * vectors[i + 2] + d * vectors[i + 3])
    }
  }
  return images
}
