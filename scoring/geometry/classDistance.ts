import type { NormalForm } from './normalForm.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** The labelling of one class by which it comes nearest to another. */
export interface NearestLabelling {
  /** Triangles of the one class that the other does not have. */
  readonly triangles: number
  /** Point of the one for each point of the other: an automorphism of the polytope. */
  readonly image: ArrayLike<number>
}

/**
 * The automorphism under which another class shares most triangles with one; of several the first. Null when more
 * than `most` triangles differ under each.
 *
 * @param one, other classes on `form.polytope`
 */
export function nearestLabelling(
  form: NormalForm,
  one: TwoFaceClass,
  other: TwoFaceClass,
  most: number,
): NearestLabelling | null {
  const n = form.polytope.pointCount
  const own = new Set<number>()
  for (let t = 0; t < one.triangles.length; t += 3) {
    own.add((one.triangles[t] * n + one.triangles[t + 1]) * n + one.triangles[t + 2])
  }
  let nearest: NearestLabelling | null = null
  let least = most + 1
  for (const image of form.automorphisms) {
    let missing = 0
    for (let t = 0; t < other.triangles.length && missing < least; t += 3) {
      const p = image[other.triangles[t]]
      const q = image[other.triangles[t + 1]]
      const r = image[other.triangles[t + 2]]
      const low = Math.min(p, q, r)
      const high = Math.max(p, q, r)
      if (!own.has((low * n + (p + q + r - low - high)) * n + high)) missing++
    }
    if (missing >= least) continue
    least = missing
    nearest = { triangles: missing, image }
  }
  return nearest
}

/**
 * The number of triangles of one class that the other does not have, the least over the polytope's automorphisms;
 * null when it is above `most`. A flip exchanges two triangles, so classes that differ in d triangles are at least
 * d / 2 flips apart.
 */
export function trianglesApart(
  form: NormalForm,
  one: TwoFaceClass,
  other: TwoFaceClass,
  most: number,
): number | null {
  return nearestLabelling(form, one, other, most)?.triangles ?? null
}
