import type { Polytope, TwoFace } from './polytope.ts'

/**
 * The 2-faces of a polytope laid side by side: what all its triangulations have in common. A *corner* is a
 * point seen in one 2-face, so a point on three 2-faces is three corners. Corners of face f are
 * `start[f] .. start[f+1]`, its triangles always fill the slots `slot[f] .. slot[f+1]`, because every
 * unimodular triangulation of a polygon has as many triangles as its normalised area.
 */
export interface FaceSheets {
  readonly polytope: Polytope
  readonly start: Int32Array
  readonly slot: Int32Array
  readonly triangleCount: number
  /** Point of each corner, ascending within a face. */
  readonly point: Int32Array
  /** Coordinates of each corner in a reduced, positively oriented lattice basis of its face's plane. */
  readonly x: Int32Array
  readonly y: Int32Array
  /** Face of each triangle slot. */
  readonly faceOfSlot: Int32Array
  /** corner[f * pointCount + p], or -1 when point p is not on face f. */
  readonly corner: Int32Array
  /** Largest |height| for which every circuit value is exact in doubles (see `heightBound`). */
  readonly heightBound: number
}

const known = new WeakMap<Polytope, FaceSheets>()

/** The sheets of a polytope, computed once. */
export function faceSheets(polytope: Polytope): FaceSheets {
  let sheets = known.get(polytope)
  if (sheets === undefined) {
    sheets = layOut(polytope)
    known.set(polytope, sheets)
  }
  return sheets
}

/** Largest size of a height, whatever the polytope. */
const HEIGHT_LIMIT = 2 ** 44

/**
 * Largest |w_i| accepted as an integer height on this polytope: 2^44, less on polygons wider than 127.
 *
 * In a circuit v_k + v_l = a v_i + b v_j the vector b (v_j - v_i) = (v_k - v_i) + (v_l - v_i) is at most twice
 * as wide as the face, and v_j - v_i is a non-zero lattice vector, hence |b| <= 2 W and |a| = |2 - b| <=
 * 2 + 2 W, where W is the larger extent of the face in the basis used. So |w_k + w_l - a w_i - b w_j| <=
 * (4 + 4 W) max |w|, which is kept below 2^53; every intermediate sum obeys the same bound.
 */
export function heightBound(polytope: Polytope): number {
  return faceSheets(polytope).heightBound
}

/** The 2-face with three given points that are not on a line, or -1. */
export function faceWith({ corner, polytope }: FaceSheets, i: number, j: number, k: number): number {
  const n = polytope.pointCount
  for (let f = 0; f < polytope.twoFaces.length; f++) {
    if (corner[f * n + i] >= 0 && corner[f * n + j] >= 0 && corner[f * n + k] >= 0) return f
  }
  return -1
}

function layOut(polytope: Polytope): FaceSheets {
  const faces = polytope.twoFaces
  const start = new Int32Array(faces.length + 1)
  const slot = new Int32Array(faces.length + 1)
  for (let f = 0; f < faces.length; f++) {
    start[f + 1] = start[f] + faces[f].points.length
    slot[f + 1] = slot[f] + faces[f].area
  }
  const cornerCount = start[faces.length]
  const point = new Int32Array(cornerCount)
  const x = new Int32Array(cornerCount)
  const y = new Int32Array(cornerCount)
  const faceOfSlot = new Int32Array(slot[faces.length])
  const corner = new Int32Array(faces.length * polytope.pointCount).fill(-1)
  let width = 0
  for (let f = 0; f < faces.length; f++) {
    const face = faces[f]
    point.set(face.points, start[f])
    faceOfSlot.fill(f, slot[f], slot[f + 1])
    const plane = reducedPlane(face)
    for (let c = 0; c < face.points.length; c++) {
      x[start[f] + c] = plane[2 * c]
      y[start[f] + c] = plane[2 * c + 1]
      corner[f * polytope.pointCount + face.points[c]] = start[f] + c
      width = Math.max(width, plane[2 * c], plane[2 * c + 1])
    }
  }
  const exact = Math.floor((2 ** 53 - 1) / (4 + 4 * width))
  const bound = Math.min(HEIGHT_LIMIT, exact)
  const triangleCount = slot[faces.length]
  return { polytope, start, slot, triangleCount, point, x, y, faceOfSlot, corner, heightBound: bound }
}

/**
 * The face's plane coordinates in a basis that makes the polygon about as narrow as it can be, least
 * coordinate 0: the quadratic form sum over corner pairs of <u, p - q>^2 on the dual lattice is reduced by
 * Lagrange's method (rows u and v play the part of the new x and y). Orientation is kept.
 */
function reducedPlane(face: TwoFace): Int32Array {
  const { plane } = face
  const spread = (u: readonly [number, number], v: readonly [number, number]): number => {
    let sum = 0
    for (const p of face.corners) {
      for (const q of face.corners) {
        const a = face.points.indexOf(p)
        const b = face.points.indexOf(q)
        const dx = plane[2 * a] - plane[2 * b]
        const dy = plane[2 * a + 1] - plane[2 * b + 1]
        sum += (u[0] * dx + u[1] * dy) * (v[0] * dx + v[1] * dy)
      }
    }
    return sum
  }
  let u: [number, number] = [1, 0]
  let v: [number, number] = [0, 1]
  for (;;) {
    const uu = spread(u, u)
    const multiple = Math.round(spread(u, v) / uu)
    v = [v[0] - multiple * u[0], v[1] - multiple * u[1]]
    if (spread(v, v) >= uu) break
    // Exchange with a sign, so that the determinant stays +1.
    const w: [number, number] = [-u[0], -u[1]]
    u = v
    v = w
  }
  const out = new Int32Array(plane.length)
  let leastX = Infinity
  let leastY = Infinity
  for (let c = 0; c < plane.length; c += 2) {
    out[c] = u[0] * plane[c] + u[1] * plane[c + 1]
    out[c + 1] = v[0] * plane[c] + v[1] * plane[c + 1]
    leastX = Math.min(leastX, out[c])
    leastY = Math.min(leastY, out[c + 1])
  }
  for (let c = 0; c < plane.length; c += 2) {
    out[c] -= leastX
    out[c + 1] -= leastY
  }
  return out
}
