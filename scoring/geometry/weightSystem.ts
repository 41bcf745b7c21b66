import { InputError } from '../errors.ts'
import { gcdOf } from './integers.ts'

/** Largest degree d = w1 + ... + w5 that is accepted; no weight system of a reflexive polytope comes near. */
export const degreeLimit = 10_000

/** A weight system without common factor. */
export interface WeightSystem {
  readonly weights: readonly number[]
  /** d, the sum of the weights: the degree of the hypersurface. */
  readonly degree: number
}

/**
 * Checks five weights and divides them by their common factor.
 *
 * @throws InputError weights.wrong-count, weights.not-positive-integers, weights.degree-too-large; paths are relative
 *   to the list of weights
 */
export function weightSystem(given: readonly number[]): WeightSystem {
  if (!Array.isArray(given) || given.length !== 5) {
    const found = Array.isArray(given) ? given.length : 'none'
    throw new InputError(
      'weights.wrong-count',
      `A weight system has 5 weights; ${found} were given.`,
      '',
      given,
    )
  }
  given.forEach((weight: unknown, i) => {
    if (Number.isSafeInteger(weight) && (weight as number) > 0) return
    throw new InputError(
      'weights.not-positive-integers',
      `Weight ${i + 1} is ${String(weight)}; weights are positive integers.`,
      `[${i}]`,
      weight,
    )
  })
  const common = gcdOf(given)
  const weights = given.map((weight) => weight / common)
  const degree = weights.reduce((sum, weight) => sum + weight, 0)
  if (degree > degreeLimit) {
    throw new InputError(
      'weights.degree-too-large',
      `The weights add up to d = ${degree}${common > 1 ? ` after division by ${common}` : ''}; at most ${degreeLimit} is accepted.`,
      '',
      degree,
    )
  }
  return { weights, degree }
}
