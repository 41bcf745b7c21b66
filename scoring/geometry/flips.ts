import { InvariantError } from '../errors.ts'
import { classWithMesh, meshOfClass } from './classMesh.ts'
import { circuitCoefficient, copyMesh, exchange, previous, type FaceMesh } from './faceMesh.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** An edge i < j interior to a 2-face. */
export interface InteriorEdge {
  readonly i: number
  readonly j: number
  readonly face: number
}

/**
 * The edges of a class whose two triangles form a unit parallelogram, v_k + v_l = v_i + v_j: exchanging the
 * diagonal gives a fine triangulation again (regular or not: `isRegular`). Ordered by (i, j).
 */
export function flippableEdges(cls: TwoFaceClass): InteriorEdge[] {
  const mesh = meshOfClass(cls)
  const { twin } = mesh
  const edges: InteriorEdge[] = []
  for (let h = 0; h < twin.length; h++) {
    if (twin[h] > h && circuitCoefficient(mesh, h) === 1) edges.push(edgeAt(mesh, h))
  }
  return edges.sort((e, f) => e.i - f.i || e.j - f.j)
}

/** The number of edges interior to 2-faces, the same for all classes of a polytope. */
export function interiorEdgeCount(cls: TwoFaceClass): number {
  const { twin } = meshOfClass(cls)
  let count = 0
  for (let h = 0; h < twin.length; h++) if (twin[h] > h) count++
  return count
}

/**
 * The class with the diagonal exchanged at one edge, undefined when the edge cannot be exchanged.
 * @throws InvariantError when i and j are not joined by an edge interior to a 2-face
 */
export function flip(
  cls: TwoFaceClass,
  edge: { readonly i: number; readonly j: number },
): TwoFaceClass | undefined {
  const mesh = meshOfClass(cls)
  const h = halfEdge(mesh, edge.i, edge.j)
  if (circuitCoefficient(mesh, h) !== 1) return undefined
  const diagonal = oppositeCorners(mesh, h)
  const flipped = copyMesh(mesh)
  exchange(flipped, h)
  return classWithMesh(exchangedTriangles(cls, edgeAt(mesh, h), diagonal), flipped)
}

/** The diagonal that a flip puts in the edge's place: what to flip to come back. */
export function oppositeDiagonal(
  cls: TwoFaceClass,
  edge: { readonly i: number; readonly j: number },
): InteriorEdge {
  const mesh = meshOfClass(cls)
  return oppositeCorners(mesh, halfEdge(mesh, edge.i, edge.j))
}

function halfEdge({ from, twin, sheets }: FaceMesh, i: number, j: number): number {
  for (let h = 0; h < twin.length; h++) {
    if (twin[h] >= 0 && sheets.point[from[h]] === i && sheets.point[from[twin[h]]] === j) return h
  }
  throw new InvariantError(`Points ${i} and ${j} are not joined by an edge inside a 2-face of this class.`)
}

function edgeAt({ from, twin, sheets }: FaceMesh, h: number): InteriorEdge {
  const p = sheets.point[from[h]]
  const q = sheets.point[from[twin[h]]]
  return { i: Math.min(p, q), j: Math.max(p, q), face: sheets.faceOfSlot[Math.floor(h / 3)] }
}

function oppositeCorners({ from, twin, sheets }: FaceMesh, h: number): InteriorEdge {
  const p = sheets.point[from[previous(h)]]
  const q = sheets.point[from[previous(twin[h])]]
  return { i: Math.min(p, q), j: Math.max(p, q), face: sheets.faceOfSlot[Math.floor(h / 3)] }
}

/** The sorted triangles with those on one diagonal taken out and those on the other put in. */
function exchangedTriangles(cls: TwoFaceClass, out: InteriorEdge, into: InteriorEdge): TwoFaceClass {
  const { polytope, triangles, faceOf } = cls
  const added = [out.i, out.j]
    .map((end) => [end, into.i, into.j].sort((p, q) => p - q))
    .sort((s, t) => s[0] - t[0] || s[1] - t[1] || s[2] - t[2])
  const result = {
    polytope,
    triangles: new Int32Array(triangles.length),
    faceOf: new Int32Array(faceOf.length),
  }
  let filled = 0
  let pending = 0
  const put = (i: number, j: number, k: number, face: number): void => {
    result.triangles[3 * filled] = i
    result.triangles[3 * filled + 1] = j
    result.triangles[3 * filled + 2] = k
    result.faceOf[filled++] = face
  }
  for (let t = 0; t < faceOf.length; t++) {
    const i = triangles[3 * t]
    const j = triangles[3 * t + 1]
    const k = triangles[3 * t + 2]
    const hasFirst = i === out.i || j === out.i || k === out.i
    if (faceOf[t] === out.face && hasFirst && (i === out.j || j === out.j || k === out.j)) continue
    for (; pending < 2; pending++) {
      const [p, q, r] = added[pending]
      if ((p - i || q - j || r - k) > 0) break
      put(p, q, r, out.face)
    }
    put(i, j, k, faceOf[t])
  }
  for (; pending < 2; pending++) put(added[pending][0], added[pending][1], added[pending][2], out.face)
  return result
}
