import { circuits, isGeneric } from '../geometry/circuits.ts'
import { clampToFine } from '../geometry/clampToFine.ts'
import { flip } from '../geometry/flips.ts'
import { isRegular } from '../geometry/regularity.ts'
import { gaugedHeights, searchHeightBound } from './heightGauge.ts'
import type { Proposal } from './method.ts'
import type { RandomStream } from './randomStream.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'

export const moveShares = { flip: 0.8, few: 0.1 }

export function propose(place: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const kind = stream.uniform()
  if (kind < moveShares.flip) return exchanged(place, stream)
  return jittered(place, stream, kind < moveShares.flip + moveShares.few ? 1 + stream.below(3) : Infinity)
}

/**
 * The exchange of one diagonal, drawn uniformly among the edges that allow it. Its heights, nearest to those of
 * the place, come from the test of regularity.
 */
function exchanged(place: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const rows = circuits(place.class)
  const edges: number[] = []
  for (let row = 0; row < rows.count; row++) if (rows.a[row] === 1) edges.push(row)
  if (edges.length === 0) return undefined
  const row = edges[stream.below(edges.length)]
  const cls = flip(place.class, { i: rows.i[row], j: rows.j[row] })
  if (cls === undefined) return undefined
  let answer: { heights: Float64Array | undefined } | undefined
  return {
    class: cls,
    heights() {
      if (answer === undefined) {
        const regularity = isRegular(cls, { near: place.heights })
        answer = { heights: regularity.regular ? gaugedHeights(cls, regularity.heights) : undefined }
      }
      return answer.heights
    },
  }
}

/** Normal noise at some points, in a width drawn log-uniformly, shortened until the heights are fine. */
function jittered(place: PlacedHeights, stream: RandomStream, count: number): Proposal | undefined {
  const { heights } = place
  const width = searchHeightBound * 2 ** -(6 + 14 * stream.uniform())
  const towards = Float64Array.from(heights)
  if (count >= heights.length) {
    for (let p = 0; p < heights.length; p++) towards[p] += width * stream.gaussian()
  } else {
    for (let n = 0; n < count; n++) towards[stream.below(heights.length)] += 4 * width * stream.gaussian()
  }
  const step = clampToFine(place.class.polytope, heights, towards, place.class)
  if (!isGeneric(step.class, step.heights)) return undefined
  const gauged = gaugedHeights(step.class, step.heights)
  return gauged === undefined ? undefined : proposalOf({ class: step.class, heights: gauged })
}
