import { InputError } from '../../errors.ts'
import { isGeneric } from '../circuits.ts'
import { genericWitness } from '../genericWitness.ts'
import { checkedHeights } from '../heights.ts'
import type { Polytope } from '../polytope.ts'
import { fineClass, type TwoFaceClass } from '../twoFaceClass.ts'
import { fanOverClass } from './fan.ts'
import { isStrict } from './fanWalls.ts'

/**
 * True when the heights, which give the class with every circuit of a 2-face positive, have no tie in a facet
 * either: they give one fan, with every wall's circuit positive. About 50 ms at h11 = 491.
 */
export function isFacetGeneric(cls: TwoFaceClass, heights: ArrayLike<number>): boolean {
  return isStrict(fanOverClass(cls, heights), heights)
}

/**
 * Heights of the same class that tie neither in a 2-face nor in a facet: those given when they do not, else
 * others near them inside the class. A function of polytope and heights: no chance is involved.
 *
 * @param heights fine, ties broken as in `classFromHeights`
 * @throws InputError for heights that `classFromHeights` refuses or that are not fine, and class.no-witness when
 *   none of the heights tried is free of ties
 */
export function facetGenericHeights(polytope: Polytope, heights: ArrayLike<number>): Float64Array {
  const cls = fineClass(polytope, checkedHeights(polytope, heights))
  if (cls === undefined)
    throw new InputError(
      'heights.not-fine',
      'The heights leave points unused, so they give no class.',
      'heights',
    )
  return facetGenericWitness(cls, heights)
}

/** The same for heights that have led to the class, exactly or but for ties. */
export function facetGenericWitness(cls: TwoFaceClass, heights: ArrayLike<number>): Float64Array {
  if (isGeneric(cls, heights) && isFacetGeneric(cls, heights)) return Float64Array.from(heights)
  return genericWitness(cls, heights, { accept: (witness) => isFacetGeneric(cls, witness) })
}
