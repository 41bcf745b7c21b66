import { value4 } from '../vectors.ts'
import type { Polytope } from '../polytope.ts'

/**
 * What all triangulations of the facets have in common. All points of a facet lie at lattice distance 1 from the
 * origin, so the vectors themselves serve as homogeneous coordinates on it: the normalised volume of a simplex
 * inside a facet is |det| of its four points, which is also the index of the cone over it.
 */
export interface FacetPoints {
  readonly polytope: Polytope
  /** Points on each facet, ascending; all lie on the facet's boundary (see `Polytope`). */
  readonly points: readonly Int32Array[]
  /** Facets through each point, ascending. */
  readonly facetsOf: readonly (readonly number[])[]
  /** Normalised volume of each facet (1 for a unimodular tetrahedron). */
  readonly volumes: readonly number[]
}

const known = new WeakMap<Polytope, FacetPoints>()

/** The facets' points and volumes, computed once. */
export function facetPoints(polytope: Polytope): FacetPoints {
  let found = known.get(polytope)
  if (found === undefined) {
    found = read(polytope)
    known.set(polytope, found)
  }
  return found
}

/** Coordinates of a point. */
export function vectorOf({ points }: Polytope, p: number): number[] {
  return [points[4 * p], points[4 * p + 1], points[4 * p + 2], points[4 * p + 3]]
}

/** Facets that contain all the points given. */
export function commonFacets({ facetsOf }: FacetPoints, points: readonly number[]): number[] {
  const [first, ...others] = points
  return facetsOf[first].filter((a) => others.every((p) => facetsOf[p].includes(a)))
}

function read(polytope: Polytope): FacetPoints {
  const { pointCount, facetCount, facets } = polytope
  const points: number[][] = Array.from({ length: facetCount }, () => [])
  const facetsOf: number[][] = Array.from({ length: pointCount }, () => [])
  for (let a = 0; a < facetCount; a++) {
    const normal = [...facets.subarray(4 * a, 4 * a + 4)]
    for (let p = 0; p < pointCount; p++) {
      if (value4(normal, vectorOf(polytope, p)) !== -1) continue
      points[a].push(p)
      facetsOf[p].push(a)
    }
  }
  return {
    polytope,
    points: points.map((list) => Int32Array.from(list)),
    facetsOf,
    volumes: points.map((list, a) => facetVolume(polytope, a, list[0])),
  }
}

/**
 * The facet as a union of pyramids with one apex over its 2-faces: the normalised volume of each is its lattice
 * height times the normalised area of its base. The other facet b through a base f has m_b = m_a modulo L_f, and
 * (m_b - m_a) / L_f is primitive on the facet's lattice, so the height is (<m_b, apex> + 1) / L_f. Shares
 * nothing with a triangulation.
 */
function facetVolume(polytope: Polytope, a: number, apex: number): number {
  let volume = 0
  for (const { facets, dualLength, area } of polytope.twoFaces) {
    if (!facets.includes(a)) continue
    const b = facets[0] === a ? facets[1] : facets[0]
    const normal = [...polytope.facets.subarray(4 * b, 4 * b + 4)]
    volume += ((value4(normal, vectorOf(polytope, apex)) + 1) / dualLength) * area
  }
  return volume
}
