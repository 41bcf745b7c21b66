import { InputError, InvariantError } from '../errors.ts'
import { classOfMesh, orient } from './classMesh.ts'
import { meshOf, next, type FaceMesh } from './faceMesh.ts'
import { faceSheets, faceWith, type FaceSheets } from './faceSheets.ts'
import type { Polytope } from './polytope.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

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

function onBoundary(sheets: FaceSheets, slot: number, p: number, q: number): boolean {
  const { x, y, start } = sheets
  const f = sheets.faceOfSlot[slot]
  for (let c = start[f]; c < start[f + 1]; c++) {
    if ((x[q] - x[p]) * (y[c] - y[p]) - (y[q] - y[p]) * (x[c] - x[p]) < 0) return false
  }
  return true
}
