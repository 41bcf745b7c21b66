import { meshOf, type FaceMesh } from './faceMesh.ts'
import { faceSheets, type FaceSheets } from './faceSheets.ts'
import type { Polytope } from './polytope.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

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
  return classWithMesh(classOfTriangles(sheets.polytope, points, sheets.faceOfSlot), mesh)
}

/** A class together with its half-edges, which are taken on trust. */
export function classWithMesh(cls: TwoFaceClass, mesh: FaceMesh): TwoFaceClass {
  return new MeshedClass(cls, mesh)
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
export function orient(
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
