import { clampToFine, type FineStep } from '../geometry/clampToFine.ts'
import { quadraticHeights } from '../geometry/heights.ts'
import type { Polytope } from '../geometry/polytope.ts'
import { fineClass, type TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { InvariantError } from '../errors.ts'
import type { Proposal } from './method.ts'
import type { RandomStream } from './randomStream.ts'

/** Integer heights together with the class they give. */
export interface PlacedHeights {
  readonly class: TwoFaceClass
  readonly heights: Float64Array
}

export function proposalOf({ class: cls, heights }: PlacedHeights): Proposal {
  return { class: cls, heights: () => heights }
}

/** Widths of the noise in units of the quadratic form's step; beyond 1/2 the heights are clamped to be fine. */
export const noiseWidths = [0.5, 2, 8, 32] as const

/** The law of null candidates, in words. Its name changes when it does. */
export const nullLaw = {
  name: 'quadratic-noise/1',
  description:
    'Polytope uniform over the scope; heights S|v|² in normal-form coordinates plus independent normal noise of ' +
    'standard deviation ½, 2, 8 or 32 times S (each equally often), the step towards them halved until the ' +
    'heights are fine; classes counted once, modulo automorphisms.',
} as const

const bases = new WeakMap<Polytope, { heights: Float64Array; step: number; class: TwoFaceClass }>()

/** The quadratic heights S |v|^2 (ties broken), S, and their class; computed once per polytope. */
export function quadraticBase(polytope: Polytope): {
  heights: Float64Array
  step: number
  class: TwoFaceClass
} {
  let base = bases.get(polytope)
  if (base === undefined) {
    const heights = quadraticHeights(polytope)
    const cls = fineClass(polytope, heights)
    if (cls === undefined) throw new InvariantError('Quadratic heights are not fine.')
    base = { heights, step: stepOf(polytope, heights), class: cls }
    bases.set(polytope, base)
  }
  return base
}

/** S, read off the point with the largest |v|^2; the noise is below S / 2. */
function stepOf({ points, pointCount }: Polytope, heights: Float64Array): number {
  let best = 0
  let square = 0
  for (let p = 0; p < pointCount; p++) {
    let here = 0
    for (let c = 0; c < 4; c++) here += points[4 * p + c] ** 2
    if (here > square) {
      square = here
      best = p
    }
  }
  return 2 ** Math.round(Math.log2(heights[best] / square))
}

/** One draw by `nullLaw` on a given polytope. */
export function drawNull(polytope: Polytope, stream: RandomStream): PlacedHeights {
  const base = quadraticBase(polytope)
  const width = base.step * noiseWidths[stream.below(noiseWidths.length)]
  const towards = base.heights.map((height) => height + width * stream.gaussian())
  const { heights, class: cls }: FineStep = clampToFine(polytope, base.heights, towards, base.class)
  return { heights, class: cls }
}
