import { genericWitness } from '../geometry/genericWitness.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { gaugedHeights } from './heightGauge.ts'

/**
 * Heights to keep with a class that was reached by `heights`: strictly inside it (no circuit of a 2-face is
 * zero), small, and moved by noise inside the class, because heights that come from a linear program are often
 * tied in a facet.
 */
export function witnessHeights(cls: TwoFaceClass, heights: ArrayLike<number>): ArrayLike<number> {
  const inside = genericWitness(cls, heights)
  return gaugedHeights(cls, inside) ?? inside
}
