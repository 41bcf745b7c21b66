import type { Polytope } from './polytope.ts'

/** Topology of each prime toric divisor, read off the polytope alone (all points). */
export interface DivisorTopology {
  readonly chi: Int32Array
  readonly h1: Int32Array
  readonly h2: Int32Array
  readonly components: Int32Array
  /** One component and h^1(O) = h^2(O) = 0. */
  readonly rigid: Uint8Array
}

/**
 * Cohomology of the structure sheaf of every prime toric divisor. With c the carrier of the point, c* its dual
 * face and g = l*(c*):
 *
 *     vertex             1 component         h^1 = 0   h^2 = g   chi = 1 + g
 *     edge interior      1 component         h^1 = g   h^2 = 0   chi = 1 - g
 *     2-face interior    1 + g components    h^1 = 0   h^2 = 0   chi = 1 + g
 *
 * Source: arXiv:1712.04946. Rigid means one component and h^1 = h^2 = 0; the rigid components of a split divisor
 * are counted apart, by `components`.
 */
export function divisorTopology(polytope: Polytope): DivisorTopology {
  const { pointCount, carrierDimension, dualInterior } = polytope
  const chi = new Int32Array(pointCount)
  const h1 = new Int32Array(pointCount)
  const h2 = new Int32Array(pointCount)
  const components = new Int32Array(pointCount).fill(1)
  const rigid = new Uint8Array(pointCount)
  for (let p = 0; p < pointCount; p++) {
    const g = dualInterior[p]
    if (carrierDimension[p] === 0) h2[p] = g
    else if (carrierDimension[p] === 1) h1[p] = g
    else components[p] = 1 + g
    chi[p] = components[p] - h1[p] + h2[p]
    rigid[p] = components[p] === 1 && h1[p] === 0 && h2[p] === 0 ? 1 : 0
  }
  return { chi, h1, h2, components, rigid }
}
