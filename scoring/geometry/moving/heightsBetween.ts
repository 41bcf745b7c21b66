import type { Fraction } from './fractions.ts'

/**
 * Rounded heights w + t d halfway between two walls, or a little past the last one; undefined beyond the bound.
 * Between walls that lie close together they may miss the class.
 *
 * @param following the next wall; undefined when none lies ahead
 */
export function heightsBetween(
  wall: Fraction,
  following: Fraction | undefined,
  heights: ArrayLike<number>,
  direction: ArrayLike<number>,
  bound: number,
): Float64Array | undefined {
  const t = wall.over / wall.under
  let length = following === undefined ? Math.max(t, 1) : (following.over / following.under - t) / 2
  for (let n = 0; n < 20; n++) {
    const inside = new Float64Array(heights.length)
    for (let p = 0; p < inside.length; p++)
      inside[p] = Math.round(heights[p] + (t + length) * direction[p]) + 0
    if (inside.every((height) => Math.abs(height) <= bound)) return inside
    length /= 2
  }
  return undefined
}
