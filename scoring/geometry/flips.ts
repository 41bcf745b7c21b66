import { InvariantError } from '../errors.ts'
import { circuitCoefficient, copyMesh, exchange, previous, type FaceMesh } from './faceMesh.ts'
import { classOfMesh, meshOfClass, type TwoFaceClass } from './twoFaceClass.ts'

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
  const { from, twin, sheets } = mesh
  const edges: InteriorEdge[] = []
  for (let h = 0; h < twin.length; h++) {
    if (twin[h] <= h || circuitCoefficient(mesh, h) !== 1) continue
    const p = sheets.point[from[h]]
    const q = sheets.point[from[twin[h]]]
    edges.push({ i: Math.min(p, q), j: Math.max(p, q), face: sheets.faceOfSlot[Math.floor(h / 3)] })
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
  const flipped = copyMesh(mesh)
  exchange(flipped, h)
  return classOfMesh(flipped)
}

/** The diagonal that a flip puts in the edge's place: what to flip to come back. */
export function oppositeDiagonal(
  cls: TwoFaceClass,
  edge: { readonly i: number; readonly j: number },
): InteriorEdge {
  const mesh = meshOfClass(cls)
  const { from, twin, sheets } = mesh
  const h = halfEdge(mesh, edge.i, edge.j)
  const k = sheets.point[from[previous(h)]]
  const l = sheets.point[from[previous(twin[h])]]
  return { i: Math.min(k, l), j: Math.max(k, l), face: sheets.faceOfSlot[Math.floor(h / 3)] }
}

function halfEdge({ from, twin, sheets }: FaceMesh, i: number, j: number): number {
  for (let h = 0; h < twin.length; h++) {
    if (twin[h] >= 0 && sheets.point[from[h]] === i && sheets.point[from[twin[h]]] === j) return h
  }
  throw new InvariantError(`Points ${i} and ${j} are not joined by an edge inside a 2-face of this class.`)
}
