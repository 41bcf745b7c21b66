import { circuits, isGeneric } from '../geometry/circuits.ts'
import { crossClasses } from '../geometry/crossClasses.ts'
import { isRegular } from '../geometry/regularity.ts'
import { fineClass } from '../geometry/twoFaceClass.ts'
import { gaugedHeights } from './heightGauge.ts'
import type { Proposal } from './method.ts'
import type { RandomStream } from './randomStream.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'

/** A child of two parents on the same polytope; undefined when there is none. It may be a parent's class. */
export type Crossing = (
  one: PlacedHeights,
  other: PlacedHeights,
  stream: RandomStream,
) => Proposal | undefined

export const crossings: readonly Crossing[] = [blended, crossed]

/** A point on the straight line between the parents' heights, which is fine as they are. */
function blended(one: PlacedHeights, other: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const heights = between(one, other, stream.uniform())
  const cls = fineClass(one.class.polytope, heights, one.class)
  if (cls === undefined || !isGeneric(cls, heights)) return undefined
  const gauged = gaugedHeights(cls, heights)
  return gauged && proposalOf({ class: cls, heights: gauged })
}

/**
 * Each 2-face with the triangulation of one of the parents, a part of them, drawn uniformly, from the other.
 * Whether any heights give the result is found by linear feasibility, near the same mixture of the parents'.
 */
function crossed(one: PlacedHeights, other: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const { polytope } = one.class
  const share = stream.uniform() / 2
  const fromOther = Uint8Array.from(polytope.twoFaces, () => (stream.uniform() < share ? 1 : 0))
  const cls = crossClasses(one.class, other.class, fromOther)
  if (circuits(cls).count === 0) return undefined
  const near = between(one, other, share)
  let tested: { readonly heights: Float64Array | undefined } | undefined
  return {
    class: cls,
    heights() {
      if (tested === undefined) {
        const answer = isRegular(cls, { near })
        tested = { heights: answer.regular ? gaugedHeights(cls, answer.heights) : undefined }
      }
      return tested.heights
    },
  }
}

function between(one: PlacedHeights, other: PlacedHeights, share: number): Float64Array {
  // Plus zero, so that minus zero never occurs.
  return one.heights.map((height, p) => Math.round(height + share * (other.heights[p] - height)) + 0)
}
