import type { Polytope, TwoFace } from '../polytope.ts'
import { polygonCount } from './polygonCount.ts'

/** States looked at for one polygon before the general bound takes the place of its exact number. */
const STATE_LIMIT = 20_000

/** An upper bound on the number of 2-face classes, before symmetry. */
export interface ClassCountBound {
  readonly bound: bigint
  /** Its decimal logarithm, for orientation. */
  readonly log10: number
  /** True when each 2-face's number of triangulations is exact, so that only their fitting together is left open. */
  readonly facesExact: boolean
}

const known = new WeakMap<Polytope, ClassCountBound>()

/**
 * The product over 2-faces of the number of fine triangulations of each, regular or not: a class is one of each. On
 * polygons too large to count, 2 to the number of edges inside takes its place: no lattice polygon has more
 * unimodular triangulations (Anclin, An upper bound for the number of planar lattice triangulations, J. Combin.
 * Theory A 103 (2003) 383; from memory).
 */
export function classCountBound(polytope: Polytope): ClassCountBound {
  let found = known.get(polytope)
  if (found === undefined) {
    found = boundOf(polytope)
    known.set(polytope, found)
  }
  return found
}

function boundOf(polytope: Polytope): ClassCountBound {
  const counted = new Map<string, bigint | undefined>()
  let bound = 1n
  let facesExact = true
  for (const face of polytope.twoFaces) {
    const name = face.plane.join()
    if (!counted.has(name)) counted.set(name, polygonCount(face.plane, face.area, STATE_LIMIT))
    const count = counted.get(name)
    if (count === undefined) facesExact = false
    bound *= count ?? 2n ** BigInt(innerEdges(face))
  }
  return { bound, log10: log10Of(bound), facesExact }
}

/** Edges inside the polygon, the same number in all its triangulations: 3 area = 2 inner + boundary edges. */
export function innerEdges({ plane, area }: TwoFace): number {
  // Pick: area = 2 points - boundary points - 2.
  const boundary = plane.length - 2 - area
  return (3 * area - boundary) / 2
}

/** Decimal logarithm of a positive integer of any size. */
export function log10Of(value: bigint): number {
  const digits = value.toString()
  return Math.log10(Number(digits.slice(0, 15))) + Math.max(0, digits.length - 15)
}
