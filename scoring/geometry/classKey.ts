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
  const moving = group.length === 1 ? new Int32Array(0) : movingTriangles(cls)
  if (moving.length === 0) return group[0]
  const n = form.polytope.pointCount
  const codes = new Int32Array(moving.length / 3)
  let best = group[0]
  imageCodes(moving, best, n, codes)
  let least = new CodeSet(codes)
  for (let g = 1; g < group.length; g++) {
    imageCodes(moving, group[g], n, codes)
    if (!least.precedes(codes)) {
      best = group[g]
      least = new CodeSet(codes)
    }
  }
  return best
}

/**
 * One number per triangle's image, in the lexicographic order of sorted triangles. It stays below 2^31: no
 * four-dimensional reflexive polytope has more than 680 lattice points (Kreuzer, Skarke, hep-th/0002240).
 */
function imageCodes(triangles: Int32Array, image: Int32Array, n: number, codes: Int32Array): void {
  for (let t = 0; t < codes.length; t++) {
    const p = image[triangles[3 * t]]
    const q = image[triangles[3 * t + 1]]
    const r = image[triangles[3 * t + 2]]
    const low = p < q ? (p < r ? p : r) : q < r ? q : r
    const high = p > q ? (p > r ? p : r) : q > r ? q : r
    codes[t] = (low * n + (p + q + r - low - high)) * n + high
  }
}

/** A set of numbers, sorted and hashed, to compare with others of the same size without sorting them. */
class CodeSet {
  private readonly sorted: Int32Array
  /** Open addressing: position in `sorted` plus one, 0 where empty. */
  private readonly table: Int32Array
  private readonly seen: Int32Array
  private round = 0

  constructor(codes: Int32Array) {
    this.sorted = codes.slice().sort()
    this.seen = new Int32Array(codes.length)
    this.table = new Int32Array(2 ** Math.ceil(Math.log2(4 * codes.length)))
    for (let t = 0; t < this.sorted.length; t++) {
      let slot = this.slot(this.sorted[t])
      while (this.table[slot] !== 0) slot = (slot + 1) & (this.table.length - 1)
      this.table[slot] = t + 1
    }
  }

  private slot(code: number): number {
    const mixed = Math.imul(code, 0x9e3779b1)
    return (mixed ^ (mixed >>> 15)) & (this.table.length - 1)
  }

  /** True when this set, sorted, comes before the other or is equal to it. */
  precedes(codes: Int32Array): boolean {
    const { sorted, table, seen } = this
    const round = ++this.round
    let foreign = Infinity
    for (let t = 0; t < codes.length; t++) {
      const code = codes[t]
      if (code >= foreign) continue
      let slot = this.slot(code)
      while (table[slot] !== 0 && sorted[table[slot] - 1] !== code) slot = (slot + 1) & (table.length - 1)
      if (table[slot] === 0) foreign = code
      else seen[table[slot] - 1] = round
    }
    // Elements above the least foreign one need not be known: they cannot be the least difference.
    let own = 0
    while (own < sorted.length && seen[own] === round) own++
    return own === sorted.length || sorted[own] < foreign
  }
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
