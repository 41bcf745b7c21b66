import type { NormalForm } from './normalForm.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * The number of triangles of one class that the other does not have, the least over the polytope's automorphisms;
 * null when it is above `most`. A flip exchanges two triangles, so classes that differ in d triangles are at least
 * d / 2 flips apart.
 *
 * @param one, other classes on `form.polytope`
 */
export function trianglesApart(
  form: NormalForm,
  one: TwoFaceClass,
  other: TwoFaceClass,
  most: number,
): number | null {
  const n = form.polytope.pointCount
  const own = new Set<number>()
  for (let t = 0; t < one.triangles.length; t += 3) {
    own.add((one.triangles[t] * n + one.triangles[t + 1]) * n + one.triangles[t + 2])
  }
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
    least = Math.min(least, missing)
  }
  return least <= most ? least : null
}
