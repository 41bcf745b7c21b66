import { clampToFine } from '../geometry/clampToFine.ts'
import type { Polytope } from '../geometry/polytope.ts'
import { combinedPotential, potentialOffsets } from './facetPotentials.ts'
import { searchHeightBound } from './heightGauge.ts'
import type { RandomStream } from './randomStream.ts'
import { drawNull, quadraticBase, type PlacedHeights } from './sampling.ts'

/** Share of the starts that follow the null's law. */
const nullShare = 0.2
/** Spreads of the logarithms of the facets' coefficients. */
const spreads = [0.5, 1, 2] as const

/** Where a guided search begins: a fifth by the usual null law, which stays near one quadratic form; else `drawShaped`. */
export function drawStart(polytope: Polytope, stream: RandomStream): PlacedHeights {
  return stream.uniform() < nullShare ? drawNull(polytope, stream) : drawShaped(polytope, stream)
}

/**
 * Heights sum_a c_a f_a with the potentials of `facetPotentials`, log c_a normal with a spread of 1/2, 1 or 2, and noise
 * that breaks ties. These reach triangulations of quite different shapes.
 */
export function drawShaped(polytope: Polytope, stream: RandomStream): PlacedHeights {
  const offset = potentialOffsets[stream.below(potentialOffsets.length)]
  const spread = spreads[stream.below(spreads.length)]
  const scale = searchHeightBound / 4
  const smooth = combinedPotential(polytope, offset, () => Math.exp(spread * stream.gaussian()))
  const base = quadraticBase(polytope)
  const start = clampToFine(
    polytope,
    base.heights,
    smooth.map((value) => scale * value),
    base.class,
  )
  const width = scale * 2 ** -(8 + 12 * stream.uniform())
  const towards = start.heights.map((height) => height + width * stream.gaussian())
  const { heights, class: cls } = clampToFine(polytope, start.heights, towards, start.class)
  return { heights, class: cls }
}
