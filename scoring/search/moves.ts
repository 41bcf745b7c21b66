import { circuits, isGeneric } from '../geometry/circuits.ts'
import { clampToFine } from '../geometry/clampToFine.ts'
import { flip } from '../geometry/flips.ts'
import { isRegular } from '../geometry/regularity.ts'
import { gaugedHeights, searchHeightBound } from './heightGauge.ts'
import type { Proposal } from './method.ts'
import type { RandomStream } from './randomStream.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'

/** How often each move is tried; the rest is noise on all points. Found by trial, and not critical. */
const shares = { exchange: 0.7, face: 0.15, point: 0.07 } as const

/** Noise has a width of 2^-5 to 2^-14 of the largest height, log-uniformly. */
const [widest, narrowest] = [5, 14]

/**
 * One random step from a place: as a rule the exchange of one diagonal (across one wall of the class), else
 * normal noise on the heights of one 2-face, of one point or of all points. Undefined when the step leads
 * nowhere; the class may be the old one.
 */
export function randomMove(place: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const { twoFaces } = place.class.polytope
  const kind = stream.uniform()
  if (kind < shares.exchange) return exchanged(place, stream)
  if (kind < shares.exchange + shares.face) {
    return shaken(place, stream, twoFaces[stream.below(twoFaces.length)].points)
  }
  if (kind < shares.exchange + shares.face + shares.point) {
    return shaken(place, stream, [stream.below(place.heights.length)])
  }
  return shaken(place, stream, place.heights.keys())
}

/** Number of diagonals that can be exchanged. */
export function exchangeCount(place: PlacedHeights): number {
  return exchangeRows(place).length
}

function exchangeRows(place: PlacedHeights): number[] {
  const { a, count } = circuits(place.class)
  const rows: number[] = []
  for (let row = 0; row < count; row++) if (a[row] === 1) rows.push(row)
  return rows
}

/**
 * The exchange of one diagonal, drawn uniformly among those that can be exchanged. Its heights, near those of
 * the place, come from the test of regularity.
 */
function exchanged(place: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const rows = exchangeRows(place)
  if (rows.length === 0) return undefined
  const row = rows[stream.below(rows.length)]
  const { i, j } = circuits(place.class)
  const cls = flip(place.class, { i: i[row], j: j[row] })
  if (cls === undefined) return undefined
  let tested: { readonly heights: Float64Array | undefined } | undefined
  return {
    class: cls,
    heights() {
      if (tested === undefined) {
        const answer = isRegular(cls, { near: place.heights })
        tested = { heights: answer.regular ? gaugedHeights(cls, answer.heights) : undefined }
      }
      return tested.heights
    },
  }
}

/** Normal noise on the heights of some points, the step halved until the heights are fine. */
function shaken(place: PlacedHeights, stream: RandomStream, points: Iterable<number>): Proposal | undefined {
  const width = searchHeightBound * 2 ** -(widest + (narrowest - widest) * stream.uniform())
  const towards = Float64Array.from(place.heights)
  for (const p of points) towards[p] += width * stream.gaussian()
  const step = clampToFine(place.class.polytope, place.heights, towards, place.class)
  if (!isGeneric(step.class, step.heights)) return undefined
  const gauged = gaugedHeights(step.class, step.heights)
  return gauged && proposalOf({ class: step.class, heights: gauged })
}
