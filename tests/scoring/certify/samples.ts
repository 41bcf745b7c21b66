import type { CertificateRequest } from '../../../scoring/certificates/certify.ts'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { facetsAreGeneric } from '../../../scoring/certify/facetTriangulation.ts'

/** A polytope in its normal form as plain rows. */
export interface PlainPolytope {
  readonly polytope: Polytope
  readonly vertices: number[][]
  readonly points: number[][]
}

export function plain(vertices: readonly (readonly number[])[]): PlainPolytope {
  const { polytope } = normalForm(polytopeFromPoints(vertices))
  const points = Array.from({ length: polytope.pointCount }, (_, p) => [
    ...polytope.points.subarray(4 * p, 4 * p + 4),
  ])
  return { polytope, points, vertices: points.slice(0, polytope.vertexCount) }
}

/** Noisy heights that tie on no facet. */
export function genericHeights({ polytope, vertices, points }: PlainPolytope, seed = 1): number[] {
  for (let n = seed; n < seed + 20; n++) {
    const heights = [...quadraticHeights(polytope, { seed: n, noise: 0.45 })]
    if (facetsAreGeneric(vertices, points, heights)) return heights
  }
  throw new Error('all heights tied')
}

/** A certificate request for a polytope in normal form with noisy heights. */
export function request(sample: PlainPolytope, rule: string | null, seed = 1): CertificateRequest {
  const heights = genericHeights(sample, seed)
  const form = normalForm(sample.polytope)
  const cls = fineClass(form.polytope, heights)
  if (cls === undefined) throw new Error('quadratic heights are fine')
  return { vertices: sample.vertices, heights, candidateKey: canonicalClass(form, cls).key, rule }
}

/** The checks that did not pass, by their ids. */
export const failed = (checks: readonly { id: string; result: string }[]): string[] =>
  checks.filter(({ result }) => result === 'fail').map(({ id }) => id)
