import { InvariantError } from '../errors.ts'
import { classOfTriangles } from './classMesh.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * A fine class that takes the triangulation of each 2-face from one of two parents. 2-faces share only edges of
 * the polytope, which every fine triangulation cuts in the same way, so any choice fits together; whether heights
 * give it is for `isRegular` to say.
 *
 * @param fromOther per 2-face: non-zero to take it from `other`
 */
export function crossClasses(
  one: TwoFaceClass,
  other: TwoFaceClass,
  fromOther: ArrayLike<number>,
): TwoFaceClass {
  const { polytope } = one
  if (other.polytope !== polytope) throw new InvariantError('The two classes are of different polytopes.')
  const triangles = new Int32Array(one.triangles.length)
  const faceOf = new Int32Array(one.faceOf.length)
  let filled = 0
  for (const [parent, taken] of [[one, false] as const, [other, true] as const]) {
    for (let t = 0; t < parent.faceOf.length; t++) {
      if ((fromOther[parent.faceOf[t]] !== 0) !== taken) continue
      triangles.set(parent.triangles.subarray(3 * t, 3 * t + 3), 3 * filled)
      faceOf[filled++] = parent.faceOf[t]
    }
  }
  return classOfTriangles(polytope, triangles, faceOf)
}
