import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex } from '@noble/hashes/utils.js'
import { InvariantError } from '../errors.ts'
import { flippableEdges } from './flips.ts'
import type { NormalForm } from './normalForm.ts'
import { transportClass } from './transport.ts'
import { referenceClass, type TwoFaceClass } from './twoFaceClass.ts'

/** The representative of a class modulo automorphisms that every stored value refers to. */
export interface CanonicalClass {
  readonly class: TwoFaceClass
  /** 32 hexadecimal digits, the permanent address of the candidate. See `classKey`. */
  readonly key: string
  /** The automorphism that leads to it: point i of the class given is point `relabelling[i]` of `class`. */
  readonly relabelling: Int32Array
}

/**
 * The image of a class under the automorphism group whose sorted triangle list is least in lexicographic order,
 * and its key. Equal for classes that an automorphism maps to each other, different otherwise.
 *
 * @param cls a class on `form.polytope`
 */
export function canonicalClass(form: NormalForm, cls: TwoFaceClass): CanonicalClass {
  if (cls.polytope !== form.polytope) throw new InvariantError('The class is not on the normal form given.')
  const relabelling = leastImage(form, cls)
  const least = relabelling === form.automorphisms[0] ? cls : transportClass(cls, relabelling, form.polytope)
  return { class: least, key: classKey(form, least), relabelling }
}

/**
 * The key of a canonical class: the first 32 hexadecimal digits of the SHA-256 hash of these bytes, final since
 * keys are addresses:
 *
 *     "tessellary.class/1" newline, the 32 digits of the polytope's key, newline     (ASCII)
 *     per triangle, in order: i, j, k with i < j < k, each as two bytes, the higher first
 */
export function classKey(form: NormalForm, canonical: TwoFaceClass): string {
  const head = `tessellary.class/1\n${form.key}\n`
  const { triangles } = canonical
  const bytes = new Uint8Array(head.length + 2 * triangles.length)
  for (let c = 0; c < head.length; c++) bytes[c] = head.charCodeAt(c)
  let at = head.length
  for (const point of triangles) {
    bytes[at++] = point >> 8
    bytes[at++] = point & 255
  }
  return bytesToHex(sha256(bytes)).slice(0, 32)
}

/**
 * The automorphism with the least image, the first of them in the group's order.
 *
 * Faces that have one triangulation only hold the same triangles in every class, and automorphisms permute
 * these. Of two sorted lists of equal length the lesser is the one that has the least element of their
 * symmetric difference, so triangles common to all classes do not matter and only the others are compared.
 */
function leastImage(form: NormalForm, cls: TwoFaceClass): Int32Array {
  const group = form.automorphisms
  if (group.length === 1) return group[0]
  const moving = movingTriangles(cls)
  if (moving.length === 0) return group[0]
  let best = group[0]
  let bestCodes = imageCodes(moving, best, form.polytope.pointCount).sort()
  for (let g = 1; g < group.length; g++) {
    const codes = imageCodes(moving, group[g], form.polytope.pointCount)
    let first = codes[0]
    for (let t = 1; t < codes.length; t++) if (codes[t] < first) first = codes[t]
    if (first > bestCodes[0]) continue
    codes.sort()
    let t = 0
    while (t < codes.length && codes[t] === bestCodes[t]) t++
    if (t < codes.length && codes[t] < bestCodes[t]) {
      best = group[g]
      bestCodes = codes
    }
  }
  return best
}

/** One number per triangle's image, in the lexicographic order of sorted triangles. */
function imageCodes(triangles: Int32Array, image: Int32Array, n: number): Float64Array {
  const codes = new Float64Array(triangles.length / 3)
  for (let t = 0; t < codes.length; t++) {
    const p = image[triangles[3 * t]]
    const q = image[triangles[3 * t + 1]]
    const r = image[triangles[3 * t + 2]]
    const low = p < q ? (p < r ? p : r) : q < r ? q : r
    const high = p > q ? (p > r ? p : r) : q > r ? q : r
    codes[t] = (low * n + (p + q + r - low - high)) * n + high
  }
  return codes
}

const movable = new WeakMap<TwoFaceClass['polytope'], Uint8Array>()

/** The triangles of a class on the 2-faces that have more than one fine triangulation. */
function movingTriangles(cls: TwoFaceClass): Int32Array {
  let faces = movable.get(cls.polytope)
  if (faces === undefined) {
    // Exchanges connect all fine triangulations of a polygon, so one that allows none is the only one.
    faces = new Uint8Array(cls.polytope.twoFaces.length)
    for (const edge of flippableEdges(referenceClass(cls.polytope))) faces[edge.face] = 1
    movable.set(cls.polytope, faces)
  }
  const { triangles, faceOf } = cls
  const moving = new Int32Array(triangles.length)
  let count = 0
  for (let t = 0; t < faceOf.length; t++) {
    if (faces[faceOf[t]] === 0) continue
    for (let c = 0; c < 3; c++) moving[count++] = triangles[3 * t + c]
  }
  return moving.subarray(0, count)
}
