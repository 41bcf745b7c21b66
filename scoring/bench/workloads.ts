import { uniformInt } from 'pure-rand/distribution/uniformInt'
import { canonicalClass } from '../geometry/classKey.ts'
import { noiseGenerator, quadraticHeights } from '../geometry/heights.ts'
import { normalForm, type NormalForm } from '../geometry/normalForm.ts'
import { dualPolytope, polytopeFromPoints, type Polytope } from '../geometry/polytope.ts'
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
/** One of middle size, h11 = 100 with 104 points. */
export const hundred = [1, 2, 5, 5, 13]
/** A small one, h11 = 10 with 14 points. */
export const small = [6, 7, 7, 9, 13]

/** Polytopes with h11 = 5 whose mirrors have 20 vertices. */
const mirrorsOfTwenty = [
  '1 0 0 0, -1 0 0 0, 0 1 0 0, 0 0 1 0, -1 1 0 0, 0 0 0 1, 1 -1 -1 0, 0 -1 0 -1, 0 0 -1 1',
  '1 0 0 0, -1 0 0 0, 0 1 0 0, 0 0 1 0, -1 0 -1 0, 0 0 0 1, 0 -1 0 -1, 1 -1 0 0, 0 1 1 1',
  '1 0 0 0, -1 0 0 0, 0 1 0 0, 0 0 1 0, 0 0 0 1, -1 0 0 -1, 0 -1 -1 0, 0 0 -1 1, -1 -1 0 -1',
  '1 0 0 0, 0 1 0 0, 0 -1 0 0, -1 0 0 0, 0 0 1 0, 1 1 0 0, 1 0 -1 0, 0 0 0 1, 1 0 0 -1',
  '1 0 0 0, 0 1 0 0, 0 -1 0 0, -1 0 0 0, 1 1 0 0, 0 0 1 0, 1 1 -1 0, 0 0 0 1, 0 0 1 -1',
]

/** One of five polytopes with 20 vertices, in coordinates sheared by a product of a dozen row operations. */
export function twentyVertices(seed: number): Polytope {
  const mirror = mirrorsOfTwenty[seed % mirrorsOfTwenty.length]
  const dual = dualPolytope(polytopeFromPoints(mirror.split(', ').map((row) => row.split(' ').map(Number))))
  const generator = noiseGenerator(seed)
  const vertices = Array.from({ length: dual.vertexCount }, (_, v) => [
    ...dual.points.subarray(4 * v, 4 * v + 4),
  ])
  for (let n = 0; n < 12; n++) {
    const to = uniformInt(generator, 0, 3)
    const from = (to + uniformInt(generator, 1, 3)) % 4
    const factor = uniformInt(generator, -2, 2)
    for (const vertex of vertices) vertex[to] += factor * vertex[from]
  }
  return polytopeFromPoints(vertices)
}

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
