import { isGeneric } from '../geometry/circuits.ts'
import { genericWitness } from '../geometry/genericWitness.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { gaugedHeights } from './heightGauge.ts'

/**
 * Heights to keep with a class that was reached by `heights`: strictly inside it (no circuit of a 2-face is
 * zero) and small, where possible. Ties are resolved by moving inside the class.
 */
export function witnessHeights(cls: TwoFaceClass, heights: ArrayLike<number>): ArrayLike<number> {
  const inside = isGeneric(cls, heights) ? heights : genericWitness(cls, heights)
  return gaugedHeights(cls, inside) ?? inside
}
