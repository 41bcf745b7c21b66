import type { Polytope } from '../geometry/polytope.ts'

/** Offsets of the logarithm, in lattice distances beyond a facet: the smaller, the steeper towards the facet. */
export const potentialOffsets = [0.5, 1, 3] as const

const known = new WeakMap<Polytope, Map<number, readonly Float64Array[]>>()

/**
 * One convex function of the points per facet a: -log(<m_a, v> + 1 + offset), <m_a, v> + 1 being the lattice distance
 * from the facet. A sum of them with positive coefficients is strictly convex where the normals span, so heights in
 * proportion to it are fine, but for rounding. They depend on the facets alone, not on coordinates, and a handful of
 * coefficients changes a triangulation everywhere at once: directions that matter where single heights hardly do.
 */
export function facetPotentials(polytope: Polytope, offset: number): readonly Float64Array[] {
  let byOffset = known.get(polytope)
  if (byOffset === undefined) {
    byOffset = new Map()
    known.set(polytope, byOffset)
  }
  let potentials = byOffset.get(offset)
  if (potentials === undefined) {
    potentials = Array.from({ length: polytope.facetCount }, (_, a) => potentialOf(polytope, a, offset))
    byOffset.set(offset, potentials)
  }
  return potentials
}

function potentialOf({ facets, points, pointCount }: Polytope, a: number, offset: number): Float64Array {
  const values = new Float64Array(pointCount)
  for (let p = 0; p < pointCount; p++) {
    let pairing = 0
    for (let c = 0; c < 4; c++) pairing += facets[4 * a + c] * points[4 * p + c]
    values[p] = -Math.log(pairing + 1 + offset)
  }
  return values
}

/** sum_a c_a f_a, divided by its largest size. */
export function combinedPotential(
  polytope: Polytope,
  offset: number,
  coefficient: (facet: number) => number,
): Float64Array {
  const sum = new Float64Array(polytope.pointCount)
  for (const [a, potential] of facetPotentials(polytope, offset).entries()) {
    const factor = coefficient(a)
    for (let p = 0; p < sum.length; p++) sum[p] += factor * potential[p]
  }
  let largest = 0
  for (const value of sum) largest = Math.max(largest, Math.abs(value))
  return largest === 0 ? sum : sum.map((value) => value / largest)
}
