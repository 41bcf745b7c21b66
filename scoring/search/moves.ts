import { circuits, isGeneric, type Circuits } from '../geometry/circuits.ts'
import { clampToFine } from '../geometry/clampToFine.ts'
import { walkLine } from '../geometry/walkLine.ts'
import { gaugedHeights, searchHeightBound } from './heightGauge.ts'
import type { RandomStream } from './randomStream.ts'
import type { PlacedHeights } from './sampling.ts'

/** Flippable rows of a class's circuits. */
function flippable(rows: Circuits): number[] {
  const found: number[] = []
  for (let r = 0; r < rows.count; r++) if (rows.a[r] === 1) found.push(r)
  return found
}

export function propose(
  place: PlacedHeights,
  stream: RandomStream,
  progress: number,
): PlacedHeights | undefined {
  void progress
  const kind = stream.uniform()
  if (kind < moveShares.flip) return acrossWall(place, stream)
  if (kind < moveShares.flip + moveShares.few) return jitter(place, stream, 1 + stream.below(3))
  return jitter(place, stream, place.heights.length)
}

export const moveShares = { flip: 0.7, few: 0.2 }

/** Towards the wall of one flippable circuit, drawn uniformly, and across the first wall on the way. */
function acrossWall(place: PlacedHeights, stream: RandomStream): PlacedHeights | undefined {
  const rows = circuits(place.class)
  const candidates = flippable(rows)
  if (candidates.length === 0) return undefined
  const r = candidates[stream.below(candidates.length)]
  const { heights } = place
  const value = heights[rows.k[r]] + heights[rows.l[r]] - heights[rows.i[r]] - heights[rows.j[r]]
  const direction = new Float64Array(heights.length)
  const step = Math.max(4, Math.round(value / 4))
  direction[rows.k[r]] -= step
  direction[rows.l[r]] -= step
  direction[rows.i[r]] += step
  direction[rows.j[r]] += step
  const walk = walkLine(place.class, heights, direction, 1)
  return walk.steps.length === 0 ? undefined : placed(walk.steps[0].class, walk.steps[0].heights)
}

/** Normal noise at some points, in a width drawn log-uniformly, shortened until the heights are fine. */
function jitter(place: PlacedHeights, stream: RandomStream, count: number): PlacedHeights | undefined {
  const { heights } = place
  const width = searchHeightBound * 2 ** -(8 + 14 * stream.uniform())
  const towards = Float64Array.from(heights)
  if (count >= heights.length) {
    for (let p = 0; p < heights.length; p++) towards[p] += width * stream.gaussian()
  } else {
    for (let n = 0; n < count; n++) towards[stream.below(heights.length)] += 4 * width * stream.gaussian()
  }
  const step = clampToFine(place.class.polytope, heights, towards, place.class)
  if (!isGeneric(step.class, step.heights)) return undefined
  return placed(step.class, step.heights)
}

function placed(cls: PlacedHeights['class'], heights: Float64Array): PlacedHeights | undefined {
  const gauged = gaugedHeights(cls, heights)
  return gauged === undefined ? undefined : { class: cls, heights: gauged }
}
