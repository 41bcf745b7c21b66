import { uniformInt } from 'pure-rand/distribution/uniformInt'
import { InputError } from '../errors.ts'
import { circuits, circuitValues, isGeneric } from './circuits.ts'
import { heightBound } from './faceSheets.ts'
import { noiseGenerator } from './heights.ts'
import { isRegular } from './regularity.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

export interface GenericWitnessOptions {
  /** Seed of the perturbation, an integer. Default 0. */
  readonly seed?: number
  /**
   * A further condition on the witness, such as "no circuit of a facet's triangulation is zero": perturbations
   * are drawn until it holds. Facets are triangulated by the certifying road, which passes its check here.
   */
  readonly accept?: (heights: Float64Array) => boolean
  /** Number of perturbations drawn before giving up. Default 32. */
  readonly attempts?: number
}

/**
 * Integer heights that give the class with every circuit of a 2-face positive, in general position otherwise:
 * what is stored as a candidate's witness. Heights that already do are moved inside the class by noise that
 * takes at most half of any circuit's value; others (ties, or another class) are replaced by heights near them
 * first. Heights are doubled as long as needed for the noise to have room (2^12 or more where the bound allows).
 *
 * @throws InputError when the class is not regular, or no perturbation is accepted
 */
export function genericWitness(
  cls: TwoFaceClass,
  heights: ArrayLike<number>,
  options: GenericWitnessOptions = {},
): Float64Array {
  const { seed = 0, accept = () => true, attempts = 32 } = options
  let inside: Float64Array = Float64Array.from(heights)
  if (!isGeneric(cls, inside)) {
    const answer = isRegular(cls, { near: heights })
    if (!answer.regular) {
      throw new InputError(
        'class.not-regular',
        'No heights give this class: its circuits contradict each other.',
      )
    }
    inside = answer.heights
  }
  const bound = heightBound(cls.polytope)
  const rows = circuits(cls)
  let room = roomFor(inside)
  while (room < 2 ** 12 && inside.every((height) => Math.abs(height) * 4 <= bound)) {
    inside = inside.map((height) => 2 * height)
    room = roomFor(inside)
  }
  const generator = noiseGenerator(seed)
  for (let n = 0; n < attempts; n++) {
    const size = Math.floor(Math.min(room, 2 ** 24))
    const witness = inside.map((height) => height + uniformInt(generator, -size, size))
    const bounded = witness.every((height) => Math.abs(height) <= bound)
    if (bounded && isGeneric(cls, witness) && accept(witness)) return witness
  }
  throw new InputError(
    'class.no-witness',
    `None of ${attempts} perturbed heights inside the class was accepted.`,
  )

  /** Largest noise that takes at most half of each circuit's value: value / 2 over the sum of |coefficients|. */
  function roomFor(w: Float64Array): number {
    const values = circuitValues(rows, w)
    let least = Infinity
    for (let r = 0; r < rows.count; r++) {
      least = Math.min(least, values[r] / (2 * (2 + Math.abs(rows.a[r]) + Math.abs(rows.b[r]))))
    }
    return least
  }
}
