import { InvariantError } from '../errors.ts'
import { classOfTriangles } from './classMesh.ts'
import { faceSheets, faceWith } from './faceSheets.ts'
import type { NormalForm } from './normalForm.ts'
import type { Polytope } from './polytope.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * The image of a class under a map of points that comes from an isomorphism of polytopes: point i goes to point
 * `permutation[i]` of `polytope` (which may be the class's own).
 * @throws InvariantError when a 2-face is not mapped to one
 */
export function transportClass(cls: TwoFaceClass, permutation: Int32Array, polytope: Polytope): TwoFaceClass {
  const faceMap = mappedFaces(cls.polytope, permutation, polytope)
  return classOfTriangles(
    polytope,
    cls.triangles.map((point) => permutation[point]),
    cls.faceOf.map((face) => faceMap[face]),
  )
}

/** Heights carried along with `transportClass`: the height of point i becomes that of `permutation[i]`. */
export function transportHeights(heights: ArrayLike<number>, permutation: Int32Array): Float64Array {
  const image = new Float64Array(permutation.length)
  for (let p = 0; p < permutation.length; p++) image[permutation[p]] = heights[p]
  return image
}

/** A class on a polytope in other coordinates as a class on `form.polytope`. */
export function toNormalForm(form: NormalForm, cls: TwoFaceClass): TwoFaceClass {
  return transportClass(cls, form.relabelling, form.polytope)
}

/** A class on `form.polytope` as one on the polytope the form was computed from. */
export function fromNormalForm(form: NormalForm, cls: TwoFaceClass, polytope: Polytope): TwoFaceClass {
  return transportClass(cls, inversePermutation(form.relabelling), polytope)
}

export function inversePermutation(permutation: Int32Array): Int32Array {
  const inverse = new Int32Array(permutation.length)
  for (let p = 0; p < permutation.length; p++) inverse[permutation[p]] = p
  return inverse
}

const known = new WeakMap<Int32Array, { from: Polytope; to: Polytope; faces: Int32Array }>()

function mappedFaces(from: Polytope, permutation: Int32Array, to: Polytope): Int32Array {
  const earlier = known.get(permutation)
  if (earlier !== undefined && earlier.from === from && earlier.to === to) return earlier.faces
  const sheets = faceSheets(to)
  const faces = Int32Array.from(from.twoFaces, ({ corners }, f) => {
    const image = faceWith(sheets, permutation[corners[0]], permutation[corners[1]], permutation[corners[2]])
    if (image < 0) throw new InvariantError(`The image of 2-face ${f} is no 2-face.`)
    return image
  })
  known.set(permutation, { from, to, faces })
  return faces
}
