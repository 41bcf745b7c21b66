import { InvariantError } from '../errors.ts'
import { heightBound } from './faceSheets.ts'
import type { Polytope } from './polytope.ts'
import { fineClass, type TwoFaceClass } from './twoFaceClass.ts'

/** Where a step through the space of heights ended. */
export interface FineStep {
  /** Integer heights, fine. */
  readonly heights: Float64Array
  readonly class: TwoFaceClass
  /** The part of the step that was taken: 1, 1/2, 1/4, ..., or 0. */
  readonly fraction: number
}

/** Halvings tried before a step is given up. */
const HALVINGS = 20

/**
 * Goes from fine heights towards others, halving the step until it ends on fine ones: the fine heights form an
 * open convex cone, so a short enough step always does. Heights are rounded to integers at each try and judged
 * exactly; a step that is still not fine after 20 halvings (or that has rounded to nothing) is not taken.
 *
 * @param from fine integer heights
 * @param towards heights to go to, not necessarily integers; beyond `heightBound` the step is halved too
 * @param start the class of `from`, when known: the triangulation is then found by a few flips
 * @throws InvariantError when `from` is not fine
 */
export function clampToFine(
  polytope: Polytope,
  from: ArrayLike<number>,
  towards: ArrayLike<number>,
  start?: TwoFaceClass,
): FineStep {
  const bound = heightBound(polytope)
  let fraction = 1
  for (let n = 0; n <= HALVINGS; n++) {
    const heights = pointOnLine(from, towards, fraction)
    const cls = heights.every((height) => Math.abs(height) <= bound)
      ? fineClass(polytope, heights, start)
      : undefined
    if (cls !== undefined) return { heights, class: cls, fraction }
    fraction /= 2
  }
  const cls = start ?? fineClass(polytope, from)
  if (cls === undefined) throw new InvariantError('The heights that a step starts from are not fine.')
  return { heights: Float64Array.from(from), class: cls, fraction: 0 }
}

function pointOnLine(from: ArrayLike<number>, to: ArrayLike<number>, fraction: number): Float64Array {
  const heights = new Float64Array(from.length)
  // Plus zero, so that minus zero never occurs.
  for (let p = 0; p < heights.length; p++) heights[p] = Math.round(from[p] + fraction * (to[p] - from[p])) + 0
  return heights
}
