import { InvariantError } from '../errors.ts'
import { reducedBasis, rowsOf, transform } from './latticeReduction.ts'
import type { Polytope } from './polytope.ts'

/** Coordinates up to this size keep every 4 x 4 determinant of points below 2^53 (24 c^4 < 2^53). */
const largestCoordinate = 4_000

const known = new WeakMap<Polytope, Float64Array>()

/**
 * The polytope's points in a reduced basis of Z^4, 4 coordinates per point: small numbers, so that
 * determinants of points are exact in doubles and relations among the points are well conditioned. A function
 * of the points alone; computed once per polytope.
 */
export function reducedCoordinates(polytope: Polytope): Float64Array {
  const before = known.get(polytope)
  if (before) return before
  const reduced = shortCoordinates(polytope.points)
  known.set(polytope, reduced)
  return reduced
}

/** Coordinates of vectors that span four dimensions (4 each) in a reduced basis of Z^4. */
export function shortCoordinates(vectors: ArrayLike<number>): Float64Array {
  const reduced = Float64Array.from(transform(reducedBasis(rowsOf(vectors)).matrix, vectors))
  const largest = reduced.reduce((size, coordinate) => Math.max(size, Math.abs(coordinate)), 0)
  if (largest > largestCoordinate)
    throw new InvariantError(`A reduced basis leaves the coordinate ${largest}.`)
  return reduced
}
