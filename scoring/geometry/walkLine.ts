import { isGeneric } from './circuits.ts'
import { classOfMesh, meshOfClass } from './classMesh.ts'
import { copyMesh } from './faceMesh.ts'
import { heightBound } from './faceSheets.ts'
import type { Fraction } from './moving/fractions.ts'
import { LineMotion } from './moving/lineMotion.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

export interface LineWalk {
  /** The classes met after the first, in order, each with integer heights inside it. */
  readonly steps: readonly LineStep[]
  /**
   * Why the walk ended: enough steps were taken; the fine cone ends at `at`; or the direction stays in the last
   * class for ever.
   */
  readonly end: 'enough' | 'boundary' | 'unbounded'
  /** The parameter t of the last wall met, as a double for orientation; 0 when there was none. */
  readonly at: number
}

export interface LineStep {
  readonly class: TwoFaceClass
  /** Integer heights halfway between the walls on both sides; they give the class, every circuit positive. */
  readonly heights: Float64Array
}

/**
 * Walks along w + t d, t >= 0, from wall to wall (`LineMotion`), without a linear program: every class met is
 * regular because the line shows its heights. A wall whose circuit is no parallelogram is the end of the fine cone.
 *
 * Heights of a step are rounded to integers, then checked. A class so thin that no rounded heights lie in it is
 * passed over: it is no step.
 *
 * @param cls the class of `heights`
 * @param heights integers that give the class with every circuit positive
 * @param direction integers within `heightBound`, not necessarily fine
 * @param maxSteps number of steps after which to stop
 */
export function walkLine(
  cls: TwoFaceClass,
  heights: ArrayLike<number>,
  direction: ArrayLike<number>,
  maxSteps: number,
): LineWalk {
  const bound = heightBound(cls.polytope)
  const motion = new LineMotion(copyMesh(meshOfClass(cls)), heights, direction)
  const steps: LineStep[] = []
  const walk = (end: LineWalk['end']): LineWalk => ({ steps, end, at: motion.at.over / motion.at.under })
  while (motion.ahead !== undefined) {
    if (steps.length >= maxSteps) return walk('enough')
    if (motion.cross() === 'boundary') return walk('boundary')
    const inside = heightsBetween(motion.at, motion.ahead, heights, direction, bound)
    if (inside === undefined) continue
    const candidate = classOfMesh(copyMesh(motion.mesh))
    if (isGeneric(candidate, inside)) steps.push({ class: candidate, heights: inside })
  }
  return walk('unbounded')
}

/** Rounded heights halfway between two walls, or a little past the last one; undefined beyond the bound. */
function heightsBetween(
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
