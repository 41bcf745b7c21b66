import { canonicalClass } from '../geometry/classKey.ts'
import { quadraticHeights } from '../geometry/heights.ts'
import { normalForm, type NormalForm } from '../geometry/normalForm.ts'
import { classFromHeights, type TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { polytopeFromWeights } from '../geometry/weights.ts'
import { buildCandidate } from '../observables/buildCandidate.ts'
import type { Candidate } from '../observables/candidate.ts'

/** A polytope of the bench by its weight system, Newton side. */
export interface Workload {
  readonly weights: readonly number[]
  readonly form: NormalForm
}

/** The largest one, h11 = 491 with 495 points. */
export const largest = [1, 1, 12, 28, 42]
/** A small one, h11 = 10 with 14 points. */
export const small = [6, 7, 7, 9, 13]

export function workload(weights: readonly number[]): Workload {
  return { weights, form: normalForm(polytopeFromWeights(weights, 'newton')) }
}

/** The class of the quadratic form with the largest noise, from a seed. */
export function classOf(form: NormalForm, seed: number): TwoFaceClass {
  const { polytope } = form
  const outcome = classFromHeights(polytope, quadraticHeights(polytope, { seed, noise: 0.45 }))
  if (!outcome.fine) throw new Error('quadratic heights with noise below 1/2 are always fine')
  return outcome.class
}

/** A candidate from a seed, canonical, with nothing computed yet. */
export function candidateOf(form: NormalForm, seed: number): Candidate {
  const canonical = canonicalClass(form, classOf(form, seed))
  return buildCandidate(form, canonical.class, canonical.key)
}
