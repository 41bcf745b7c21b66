import type { Polytope } from '../../geometry/polytope.ts'
import { combinedPotential, potentialOffsets } from '../facetPotentials.ts'
import { searchHeightBound } from '../heightGauge.ts'
import type { RandomStream } from '../randomStream.ts'
import { drawStart } from '../starts.ts'

/** Integers, one per point: a line goes from heights h to h + direction, as far as it stays fine. */
export type DirectionLaw = (polytope: Polytope, heights: Float64Array, stream: RandomStream) => Float64Array

/**
 * The directions that lines take: normal noise on few points, on 2-faces or everywhere, of widths that are powers of
 * two in units of the largest height; sums of facet potentials with normal coefficients; and towards a fresh start,
 * all the way, since heights between fine ones are fine.
 */
export const directionLaws: readonly DirectionLaw[] = [
  (polytope, _heights, stream) => noise(polytope, stream, somePoints(polytope, stream, 1), 0, 6),
  (polytope, _heights, stream) => noise(polytope, stream, somePoints(polytope, stream, 4), 0, 6),
  (polytope, _heights, stream) => noise(polytope, stream, someFace(polytope, stream), 1, 8),
  (polytope, _heights, stream) => noise(polytope, stream, [...Array(polytope.pointCount).keys()], 2, 10),
  potentials,
  (polytope, heights, stream) => {
    const target = drawStart(polytope, stream).heights
    return target.map((height, p) => height - heights[p])
  },
]

function somePoints({ pointCount }: Polytope, stream: RandomStream, count: number): number[] {
  return Array.from({ length: count }, () => stream.below(pointCount))
}

function someFace({ twoFaces }: Polytope, stream: RandomStream): ArrayLike<number> {
  return twoFaces[stream.below(twoFaces.length)].points
}

function noise(
  { pointCount }: Polytope,
  stream: RandomStream,
  points: ArrayLike<number>,
  wide: number,
  narrow: number,
): Float64Array {
  const width = widthOf(stream, wide, narrow)
  const direction = new Float64Array(pointCount)
  for (let n = 0; n < points.length; n++) {
    direction[points[n]] = Math.round(bounded(width * stream.gaussian())) + 0
  }
  return direction
}

function potentials(polytope: Polytope, _heights: Float64Array, stream: RandomStream): Float64Array {
  const offset = potentialOffsets[stream.below(potentialOffsets.length)]
  const width = widthOf(stream, 0, 6)
  const smooth = combinedPotential(polytope, offset, () => stream.gaussian())
  return smooth.map((value) => Math.round(width * value) + 0)
}

function widthOf(stream: RandomStream, wide: number, narrow: number): number {
  return searchHeightBound * 2 ** -(wide + (narrow - wide) * stream.uniform())
}

const bounded = (value: number): number =>
  Math.max(-2 * searchHeightBound, Math.min(2 * searchHeightBound, value))
