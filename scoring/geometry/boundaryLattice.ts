import { facetsThrough } from './faces.ts'
import { latticePointsOf } from './latticePoints.ts'
import { reducedBasis, rowsOf, transform } from './latticeReduction.ts'
import type { Polytope } from './polytope.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'

/** All lattice points of a polytope but the origin, in the coordinates of `reducedCoordinates`. */
export interface BoundaryLattice {
  /** 4 coordinates each: first the points of the polytope in their order, then those interior to facets. */
  readonly points: Float64Array
  readonly count: number
}

const known = new WeakMap<Polytope, BoundaryLattice>()

/** The lattice points of the boundary, facet interiors included. Computed once per polytope. */
export function boundaryLattice(polytope: Polytope): BoundaryLattice {
  const before = known.get(polytope)
  if (before) return before
  const own = reducedCoordinates(polytope)
  const facets = transform(reducedBasis(rowsOf(polytope.points)).dual, polytope.facets)
  const all = latticePointsOf(own.subarray(0, 4 * polytope.vertexCount), facets)
  const interior: number[] = []
  for (let i = 0; i < all.length; i += 4) {
    if (facetsThrough(facets, all[i], all[i + 1], all[i + 2], all[i + 3]).length === 1)
      interior.push(all[i], all[i + 1], all[i + 2], all[i + 3])
  }
  const points = new Float64Array(own.length + interior.length)
  points.set(own)
  points.set(interior, own.length)
  const lattice = { points, count: points.length / 4 }
  known.set(polytope, lattice)
  return lattice
}
