import type { Polytope } from '../geometry/polytope.ts'
import type { RandomStream } from './randomStream.ts'
import { drawNull, nullLaw, type PlacedHeights } from './sampling.ts'
import { drawShaped } from './starts.ts'
import type { Json } from './state.ts'

export const nullLawNames = ['quadratic', 'potentials'] as const
export type NullLawName = (typeof nullLawNames)[number]

/** The law that holds where none is named. */
export const usualNullLaw: NullLawName = 'quadratic'

/** A law by which nobody's candidates are drawn on a polytope. */
export interface NullLaw {
  /** Changes when the law does. */
  readonly name: string
  readonly description: string
  readonly draw: (polytope: Polytope, stream: RandomStream) => PlacedHeights
}

/**
 * The laws of null samples. The first stays near one quadratic form, which is narrow where h11 is large: a search that
 * looks anywhere else may well beat it. The second is that of four fifths of the starts of guided searches, so a ratio
 * to it says what the search itself brings.
 */
export const nullLaws: Readonly<Record<NullLawName, NullLaw>> = {
  quadratic: { ...nullLaw, draw: drawNull },
  potentials: {
    name: 'facet-potentials/1',
    description:
      'Polytope uniform over the scope; heights in proportion to Σ c_a (-log(d_a + δ)), d_a the lattice distance from ' +
      'facet a, log c_a normal with spread ½, 1 or 2 and δ = ½, 1 or 3 (each equally often), plus independent normal ' +
      'noise, its standard deviation log-uniform between 2⁻⁸ and 2⁻²⁰ of the largest height; classes counted once, modulo automorphisms.',
    draw: drawShaped,
  },
}

/** Name and description. */
export const lawText = (law: NullLawName): string => `${nullLaws[law].name}: ${nullLaws[law].description}`

/** What the method `random` keeps of its law: nothing for the usual one. */
export const stateOfLaw = (law: NullLawName): Json => (law === usualNullLaw ? null : { law })

/** The law of a run of the method `random`, from the state of its chain. */
export function lawOfState(chain: Json): NullLawName {
  const named = chain !== null && typeof chain === 'object' && 'law' in chain ? chain.law : usualNullLaw
  return nullLawNames.find((name) => name === named) ?? usualNullLaw
}
