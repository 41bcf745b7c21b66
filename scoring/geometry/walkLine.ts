import { isGeneric } from './circuits.ts'
import { classOfMesh, meshOfClass } from './classMesh.ts'
import { copyMesh } from './faceMesh.ts'
import { heightBound } from './faceSheets.ts'
import { heightsBetween } from './moving/heightsBetween.ts'
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
    const { over, under } = motion.ahead
    if (motion.cross() === 'boundary') return { steps, end: 'boundary', at: over / under }
    const inside = heightsBetween(motion.at, motion.ahead, heights, direction, bound)
    if (inside === undefined) continue
    const candidate = classOfMesh(copyMesh(motion.mesh))
    if (isGeneric(candidate, inside)) steps.push({ class: candidate, heights: inside })
  }
  return walk('unbounded')
}
