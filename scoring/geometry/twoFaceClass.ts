import { InputError, InvariantError } from '../errors.ts'
import { copyMesh, meshOf, next, sweptMesh, type FaceMesh } from './faceMesh.ts'
import { faceSheets, type FaceSheets } from './faceSheets.ts'
import { checkedHeights, cornerHeights, quadraticHeights } from './heights.ts'
import { lowerHull } from './lowerHull.ts'
import { circuitValue, flattenedPoints, regularise } from './polygonTriangulation.ts'
import type { Polytope } from './polytope.ts'

/**
 * A candidate's 2-face class: the set of its triangles, a fine regular unimodular triangulation of every
 * 2-face at once. Two FRSTs that agree here give the same threefold topology.
 */
export interface TwoFaceClass {
  readonly polytope: Polytope
  /** 3 point indices per triangle, i < j < k; triangles in lexicographic order. */
  readonly triangles: Int32Array
  /** The 2-face (index into polytope.twoFaces) of each triangle. */
  readonly faceOf: Int32Array
}

/** What heights decide: a class, or the points they leave out. */
export type HeightsOutcome =
  | { readonly fine: true; readonly class: TwoFaceClass }
  | {
      readonly fine: false
      /** Points that some 2-face's lower hull does not have as a vertex, ascending. */
      readonly unused: Int32Array
      /** Triangles of the regular triangulations of the used points, as in a class; not all unimodular. */
      readonly triangles: Int32Array
    }

/** A class that keeps the half-edges it was read from, so that the next step need not pair them again. */
class MeshedClass implements TwoFaceClass {
  readonly polytope: Polytope
  readonly triangles: Int32Array
  readonly faceOf: Int32Array
  readonly #mesh: FaceMesh

  constructor({ polytope, triangles, faceOf }: TwoFaceClass, mesh: FaceMesh) {
    this.polytope = polytope
    this.triangles = triangles
    this.faceOf = faceOf
    this.#mesh = mesh
  }

  static meshOf(cls: TwoFaceClass): FaceMesh | undefined {
    return cls instanceof MeshedClass ? cls.#mesh : undefined
  }
}

/** Half-edges of classes that came without. */
const meshes = new WeakMap<TwoFaceClass, FaceMesh>()
const references = new WeakMap<Polytope, TwoFaceClass>()

/**
 * The regular triangulation that heights induce on every 2-face, exact. Ties between two fine triangulations
 * are broken by point index (see `regularise`), so the class is always determined; `tiedCircuits` tells.
 *
 * @param heights one integer per point, at most `heightBound(polytope)` in size
 * @param start a class of the same polytope to start from; one near the outcome saves time, and the class
 *   itself (the same object) is returned when nothing changes
 * @throws InputError for heights of the wrong number, not integers or too large
 */
export function classFromHeights(
  polytope: Polytope,
  heights: ArrayLike<number>,
  start?: TwoFaceClass,
): HeightsOutcome {
  const cls = fineClass(polytope, heights, start)
  if (cls !== undefined) return { fine: true, class: cls }
  const sheets = faceSheets(polytope)
  return { fine: false, ...lowerHull(sheets, cornerHeights(sheets, heights)) }
}

/** Like `classFromHeights`, without the account of what is unused: undefined when the heights are not fine. */
export function fineClass(
  polytope: Polytope,
  heights: ArrayLike<number>,
  start: TwoFaceClass = referenceClass(polytope),
): TwoFaceClass | undefined {
  if (start.polytope !== polytope) throw new InvariantError('The class to start from is of another polytope.')
  const lifted = cornerHeights(faceSheets(polytope), checkedHeights(polytope, heights))
  const sign = circuitValue(lifted)
  const mesh = copyMesh(meshOfClass(start))
  const exchanges = regularise(mesh, sign)
  if (exchanges < 0 || flattenedPoints(mesh, sign).length > 0) return undefined
  return exchanges === 0 ? start : classOfMesh(mesh)
}

/**
 * The class of the quadratic heights 'facets' (least noise, seed 0): always the same for a polytope and its
 * order of points, whatever the coordinates. A start for flips.
 */
export function referenceClass(polytope: Polytope): TwoFaceClass {
  let reference = references.get(polytope)
  if (reference === undefined) {
    const sheets = faceSheets(polytope)
    const mesh = sweptMesh(sheets)
    const heights = quadraticHeights(polytope, { form: 'facets' })
    if (regularise(mesh, circuitValue(cornerHeights(sheets, heights))) < 0) {
      throw new InvariantError('Quadratic heights are not fine.')
    }
    reference = classOfMesh(mesh)
    references.set(polytope, reference)
  }
  return reference
}

/**
 * A class from its triangles in any order, as a file or another program may give them. Checks that they are
 * unimodular and cover every 2-face exactly once; regularity is for `isRegular` to say.
 * @param triangles 3 point indices per triangle
 * @throws InputError naming the triangle at fault
 */
export function classFromTriangles(polytope: Polytope, triangles: ArrayLike<number>): TwoFaceClass {
  const sheets = faceSheets(polytope)
  const expected = sheets.triangleCount
  if (triangles.length !== 3 * expected) {
    throw new InputError(
      'triangles.wrong-count',
      `There are ${triangles.length / 3} triangles; a fine triangulation of the 2-faces has ${expected}.`,
      'triangles',
      triangles.length / 3,
    )
  }
  const from = new Int32Array(3 * expected)
  const filled = sheets.slot.slice(0, -1)
  for (let t = 0; t < expected; t++) {
    const named = [triangles[3 * t], triangles[3 * t + 1], triangles[3 * t + 2]]
    const fail = (code: string, what: string): never => {
      throw new InputError(code, `Triangle ${t} (${named.join(', ')}) ${what}.`, `triangles[${t}]`, named)
    }
    if (!named.every((p) => Number.isInteger(p) && p >= 0 && p < polytope.pointCount)) {
      fail('triangles.no-such-point', `names no points; indices run from 0 to ${polytope.pointCount - 1}`)
    }
    const [i, j, k] = named.sort((p, q) => p - q)
    const f = faceWith(sheets, i, j, k)
    if (f < 0) fail('triangles.not-on-a-face', 'does not lie on one 2-face')
    if (filled[f] === sheets.slot[f + 1])
      fail('triangles.overlap', `is one more than 2-face ${f} has room for`)
    const turn = orient(sheets, f, i, j, k, from, 3 * filled[f]++)
    if (Math.abs(turn) !== 1) fail('triangles.not-unimodular', `has area ${Math.abs(turn)} in place of 1`)
  }
  let mesh: FaceMesh
  try {
    mesh = meshOf(sheets, from)
  } catch (error) {
    if (!(error instanceof InvariantError)) throw error
    throw new InputError('triangles.overlap', error.message, 'triangles')
  }
  // Unit triangles with as many as the area allows, edges paired or on the boundary: an exact cover.
  for (let h = 0; h < from.length; h++) {
    if (mesh.twin[h] < 0 && !onBoundary(sheets, Math.floor(h / 3), from[h], from[next(h)])) {
      const p = sheets.point[from[h]]
      const q = sheets.point[from[next(h)]]
      throw new InputError(
        'triangles.gap',
        `No triangle lies on the other side of edge (${p}, ${q}).`,
        'triangles',
      )
    }
  }
  return classOfMesh(mesh)
}

/** The half-edges of a class. Not to be changed: copy first. */
export function meshOfClass(cls: TwoFaceClass): FaceMesh {
  let mesh = MeshedClass.meshOf(cls) ?? meshes.get(cls)
  if (mesh === undefined) {
    const sheets = faceSheets(cls.polytope)
    const from = new Int32Array(cls.triangles.length)
    const filled = sheets.slot.slice(0, -1)
    for (let t = 0; t < cls.faceOf.length; t++) {
      const f = cls.faceOf[t]
      const at = 3 * filled[f]++
      orient(sheets, f, cls.triangles[3 * t], cls.triangles[3 * t + 1], cls.triangles[3 * t + 2], from, at)
    }
    mesh = meshOf(sheets, from)
    meshes.set(cls, mesh)
  }
  return mesh
}

/** The class with these triangles; the mesh must not be changed afterwards. */
export function classOfMesh(mesh: FaceMesh): TwoFaceClass {
  const { sheets, from } = mesh
  const points = new Int32Array(from.length)
  for (let h = 0; h < from.length; h++) points[h] = sheets.point[from[h]]
  return new MeshedClass(classOfTriangles(sheets.polytope, points, sheets.faceOfSlot), mesh)
}

/** Puts the triangles of a class in order. They are taken on trust: see `classFromTriangles`. */
export function classOfTriangles(polytope: Polytope, unordered: Int32Array, faces: Int32Array): TwoFaceClass {
  const n = polytope.pointCount
  const faceCount = polytope.twoFaces.length
  // One number per triangle, ordered as the triangles are; far below 2^53 as n is below 1,000.
  const codes = new Float64Array(faces.length)
  for (let t = 0; t < codes.length; t++) {
    const p = unordered[3 * t]
    const q = unordered[3 * t + 1]
    const r = unordered[3 * t + 2]
    const low = p < q ? (p < r ? p : r) : q < r ? q : r
    const high = p > q ? (p > r ? p : r) : q > r ? q : r
    codes[t] = ((low * n + (p + q + r - low - high)) * n + high) * faceCount + faces[t]
  }
  codes.sort()
  const triangles = new Int32Array(3 * codes.length)
  const faceOf = new Int32Array(codes.length)
  for (let t = 0; t < codes.length; t++) {
    const withoutFace = Math.floor(codes[t] / faceCount)
    const pair = Math.floor(withoutFace / n)
    const low = Math.floor(pair / n)
    faceOf[t] = codes[t] - withoutFace * faceCount
    triangles[3 * t] = low
    triangles[3 * t + 1] = pair - low * n
    triangles[3 * t + 2] = withoutFace - pair * n
  }
  return { polytope, triangles, faceOf }
}

/** Writes the corners of a triangle counterclockwise to from[at..]; returns its signed area before ordering. */
function orient(
  { corner, x, y, polytope }: FaceSheets,
  f: number,
  i: number,
  j: number,
  k: number,
  from: Int32Array,
  at: number,
): number {
  const row = f * polytope.pointCount
  const p = corner[row + i]
  const q = corner[row + j]
  const r = corner[row + k]
  const turn = (x[q] - x[p]) * (y[r] - y[p]) - (y[q] - y[p]) * (x[r] - x[p])
  from[at] = p
  from[at + 1] = turn > 0 ? q : r
  from[at + 2] = turn > 0 ? r : q
  return turn
}

/** The 2-face with three given points that are not on a line, or -1. */
export function faceWith({ corner, polytope }: FaceSheets, i: number, j: number, k: number): number {
  const n = polytope.pointCount
  for (let f = 0; f < polytope.twoFaces.length; f++) {
    if (corner[f * n + i] >= 0 && corner[f * n + j] >= 0 && corner[f * n + k] >= 0) return f
  }
  return -1
}

function onBoundary(sheets: FaceSheets, slot: number, p: number, q: number): boolean {
  const { x, y, start } = sheets
  const f = sheets.faceOfSlot[slot]
  for (let c = start[f]; c < start[f + 1]; c++) {
    if ((x[q] - x[p]) * (y[c] - y[p]) - (y[q] - y[p]) * (x[c] - x[p]) < 0) return false
  }
  return true
}
