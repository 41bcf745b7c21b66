import { circuits, isGeneric } from '../geometry/circuits.ts'
import { clampToFine } from '../geometry/clampToFine.ts'
import { flip } from '../geometry/flips.ts'
import { isRegular } from '../geometry/regularity.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { combinedPotential, potentialOffsets } from './facetPotentials.ts'
import { gaugedHeights, searchHeightBound } from './heightGauge.ts'
import type { Proposal } from './method.ts'
import type { RandomStream } from './randomStream.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'

/** One kind of random step from a place. Undefined when it leads nowhere; the class may be the old one. */
export type Move = (place: PlacedHeights, stream: RandomStream) => Proposal | undefined

/** The last of the moves: those along facet potentials. */
const shapeMoves = 3

/**
 * All kinds of steps: the exchange of one diagonal (across one wall of the class); normal noise on few
 * points, on 2-faces or everywhere, wide or narrow; potentials of one facet or of all, wide or narrow. Widths are powers of two in units of the largest height.
 */
export const moves: readonly Move[] = [
  exchanged,
  (place, stream) => shaken(place, stream, somePoints(place, stream, 1), 0, 10),
  (place, stream) => shaken(place, stream, somePoints(place, stream, 3), 0, 10),
  (place, stream) => shaken(place, stream, someFaces(place, stream, 1), 2, 7),
  (place, stream) => shaken(place, stream, someFaces(place, stream, 1), 7, 12),
  (place, stream) => shaken(place, stream, someFaces(place, stream, 3), 4, 10),
  (place, stream) => shaken(place, stream, place.heights.keys(), 2, 8),
  (place, stream) => shaken(place, stream, place.heights.keys(), 8, 16),
  (place, stream) => reshaped(place, stream, 1, 0, 5),
  (place, stream) => reshaped(place, stream, Infinity, 0, 5),
  (place, stream) => reshaped(place, stream, Infinity, 4, 10),
]

/** What the moves count as worth before anything is known: changes of the whole shape gain most at the beginning. */
export const firstWorths: readonly number[] = moves.map((_, kind) =>
  kind < moves.length - shapeMoves ? 0.2 : 0.8,
)

/** Number of diagonals that can be exchanged. */
export function exchangeCount(cls: TwoFaceClass): number {
  return exchangeRows(cls).length
}

function exchangeRows(cls: TwoFaceClass): number[] {
  const { a, count } = circuits(cls)
  const rows: number[] = []
  for (let row = 0; row < count; row++) if (a[row] === 1) rows.push(row)
  return rows
}

/**
 * The exchange of one diagonal, drawn uniformly among those that can be exchanged. Its heights, near those of
 * the place, come from the test of regularity.
 */
function exchanged(place: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const count = exchangeCount(place.class)
  return count === 0 ? undefined : exchangeAt(place, stream.below(count))
}

/** The n-th of the exchanges of a place, 0 <= n < `exchangeCount`. */
export function exchangeAt(place: PlacedHeights, n: number): Proposal | undefined {
  const row = exchangeRows(place.class)[n]
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

function somePoints({ heights }: PlacedHeights, stream: RandomStream, count: number): number[] {
  return Array.from({ length: count }, () => stream.below(heights.length))
}

function someFaces(place: PlacedHeights, stream: RandomStream, count: number): number[] {
  const { twoFaces } = place.class.polytope
  return Array.from({ length: count }, () => twoFaces[stream.below(twoFaces.length)]).flatMap((face) => [
    ...face.points,
  ])
}

/** A combination of the potentials of some facets, added with width 2^-wide to 2^-narrow of the largest height. */
function reshaped(
  place: PlacedHeights,
  stream: RandomStream,
  facets: number,
  wide: number,
  narrow: number,
): Proposal | undefined {
  const { polytope } = place.class
  const offset = potentialOffsets[stream.below(potentialOffsets.length)]
  const width = searchHeightBound * 2 ** -(wide + (narrow - wide) * stream.uniform())
  const only = facets === 1 ? stream.below(polytope.facetCount) : -1
  const direction = combinedPotential(polytope, offset, (a) =>
    only < 0 ? stream.gaussian() : a === only ? (stream.uniform() < 0.5 ? 1 : -1) : 0,
  )
  const towards = place.heights.map((height, p) => height + width * direction[p])
  return stepped(place, towards)
}

/**
 * Normal noise on the heights of some points, of width 2^-wide to 2^-narrow of the largest height, the step halved
 * until the heights are fine.
 */
function shaken(
  place: PlacedHeights,
  stream: RandomStream,
  points: Iterable<number>,
  wide: number,
  narrow: number,
): Proposal | undefined {
  const width = searchHeightBound * 2 ** -(wide + (narrow - wide) * stream.uniform())
  const towards = Float64Array.from(place.heights)
  for (const p of points) towards[p] += width * stream.gaussian()
  return stepped(place, towards)
}

function stepped(place: PlacedHeights, towards: Float64Array): Proposal | undefined {
  const step = clampToFine(place.class.polytope, place.heights, towards, place.class)
  if (!isGeneric(step.class, step.heights)) return undefined
  const gauged = gaugedHeights(step.class, step.heights)
  return gauged && proposalOf({ class: step.class, heights: gauged })
}
