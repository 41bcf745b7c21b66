import type { Faces } from './faces.ts'
import { gcd } from './integers.ts'
import type { LatticeCount } from './latticeCount.ts'
import type { Hodge } from './polytope.ts'

/** Lattice length of the segment between two lattice points (4 coordinates each, by index). */
export function latticeLength(points: ArrayLike<number>, i: number, j: number): number {
  let length = 0
  for (let axis = 0; axis < 4; axis++) length = gcd(length, points[4 * i + axis] - points[4 * j + axis])
  return length
}

/**
 * Hodge numbers of the hypersurface by Batyrev's formula (alg-geom/9310003, corollary 4.5.1):
 *
 *     h11 = l - 5 - sum_facets l*(facet) + sum_{2-faces f} l*(f) (L_f - 1)
 *
 * and h21 by the same formula on the dual. The last sum is the part of H^{1,1} that toric divisors miss.
 *
 * @param dualLengths L_f of each 2-face
 * @param edgeLengths lattice length of each edge of the polytope (L of the dual's 2-faces)
 * @param own lattice points of the polytope
 * @param dual lattice points of its dual, whose 2-faces are the polytope's edges, in the same order
 */
export function hodgeNumbers(
  faces: Faces,
  own: LatticeCount,
  dual: LatticeCount,
  dualLengths: ArrayLike<number>,
  edgeLengths: ArrayLike<number>,
): { hodge: Hodge; favourable: boolean } {
  const missed = faces.twoFaces.reduce((sum, _, f) => sum + own.twoFaceInterior[f] * (dualLengths[f] - 1), 0)
  const missedByDual = faces.edges.reduce(
    (sum, _, e) => sum + dual.twoFaceInterior[e] * (edgeLengths[e] - 1),
    0,
  )
  const h11 = own.total - 5 - total(own.facetInterior) + missed
  const h21 = dual.total - 5 - total(dual.facetInterior) + missedByDual
  return { hodge: { h11, h21, euler: 2 * (h11 - h21) }, favourable: missed === 0 }
}

const total = (counts: Int32Array): number => counts.reduce((sum, count) => sum + count, 0)
