import { InvariantError } from '../errors.ts'
import type { FaceSheets } from './faceSheets.ts'

/**
 * A unimodular triangulation of every 2-face as half-edges. Half-edge h runs counterclockwise along triangle
 * slot floor(h / 3), from corner `from[h]` to `from[next(h)]`; `twin[h]` is the half-edge of the neighbouring
 * triangle on the same face, -1 on the polygon's boundary. Both arrays are changed in place by `exchange`.
 */
export interface FaceMesh {
  readonly sheets: FaceSheets
  readonly from: Int32Array
  readonly twin: Int32Array
}

export function next(h: number): number {
  return h % 3 === 2 ? h - 2 : h + 1
}

export function previous(h: number): number {
  return h % 3 === 0 ? h + 2 : h - 1
}

export function copyMesh(mesh: FaceMesh): FaceMesh {
  return { sheets: mesh.sheets, from: mesh.from.slice(), twin: mesh.twin.slice() }
}

/**
 * Pairs the half-edges of triangles given as corners, 3 per slot, counterclockwise.
 * @throws InvariantError when one directed edge occurs twice: then the triangles overlap.
 */
export function meshOf(sheets: FaceSheets, from: Int32Array): FaceMesh {
  const head = new Int32Array(sheets.point.length).fill(-1)
  const link = new Int32Array(from.length)
  const twin = new Int32Array(from.length).fill(-1)
  for (let h = 0; h < from.length; h++) {
    const end = from[next(h)]
    for (let g = head[end]; g >= 0; g = link[g]) {
      if (from[next(g)] === from[h]) {
        twin[h] = g
        twin[g] = h
      }
    }
    for (let g = head[from[h]]; g >= 0; g = link[g]) {
      if (from[next(g)] === end) {
        throw new InvariantError(
          `Points ${sheets.point[from[h]]} and ${sheets.point[end]} are joined by two triangles on one side.`,
        )
      }
    }
    link[h] = head[from[h]]
    head[from[h]] = h
  }
  return { sheets, from, twin }
}

/**
 * The coefficient b in the circuit v_k + v_l = a v_i + b v_j, a + b = 2, of the interior half-edge h from i to
 * j, with k opposite in its own triangle and l opposite in its twin's. Both triangles are unimodular, so with
 * det(j - i, k - i) = 1 one has l - i = b (j - i) - (k - i), b = det(l - i, k - i).
 */
export function circuitCoefficient(mesh: FaceMesh, h: number): number {
  const { from, twin, sheets } = mesh
  const { x, y } = sheets
  const i = from[h]
  const k = from[previous(h)]
  const l = from[previous(twin[h])]
  return (x[l] - x[i]) * (y[k] - y[i]) - (y[l] - y[i]) * (x[k] - x[i])
}

/** True when integer heights give the triangulation, every circuit positive. */
export function isInside(mesh: FaceMesh, heights: ArrayLike<number>): boolean {
  const { from, twin, sheets } = mesh
  const { point } = sheets
  for (let h = 0; h < twin.length; h++) {
    const g = twin[h]
    if (g <= h) continue
    const b = circuitCoefficient(mesh, h)
    const ends = (2 - b) * heights[point[from[h]]] + b * heights[point[from[g]]]
    if (!(heights[point[from[previous(h)]]] + heights[point[from[previous(g)]]] - ends > 0)) return false
  }
  return true
}

/**
 * Exchanges the diagonal of the unit parallelogram around the interior half-edge a. Afterwards the four outer
 * edges are a, next(a), twin's b and next(b); the new diagonal is previous(a) and previous(b).
 */
export function exchange(mesh: FaceMesh, a: number): void {
  const { from, twin } = mesh
  const b = twin[a]
  const ap = previous(a)
  const bp = previous(b)
  const outerA = twin[bp]
  const outerB = twin[ap]
  from[a] = from[bp]
  from[b] = from[ap]
  twin[a] = outerA
  if (outerA >= 0) twin[outerA] = a
  twin[b] = outerB
  if (outerB >= 0) twin[outerB] = b
  twin[ap] = bp
  twin[bp] = ap
}

/**
 * A fine triangulation of every 2-face without heights: the corners of a face in lexicographic order of their
 * coordinates, each joined to the edges of the hull so far that it sees. Each new corner lies outside the hull
 * of the earlier ones, so none is left out; a triangulation that uses all lattice points is unimodular.
 */
export function sweptMesh(sheets: FaceSheets): FaceMesh {
  const from = new Int32Array(3 * sheets.triangleCount)
  for (let f = 0; f + 1 < sheets.start.length; f++) {
    const corners: number[] = []
    for (let c = sheets.start[f]; c < sheets.start[f + 1]; c++) corners.push(c)
    const triangles = sweep(corners, sheets.x, sheets.y)
    if (triangles.length !== 3 * (sheets.slot[f + 1] - sheets.slot[f])) {
      throw new InvariantError(`2-face ${f} has ${triangles.length / 3} triangles, which is not its area.`)
    }
    from.set(triangles, 3 * sheets.slot[f])
  }
  return meshOf(sheets, from)
}

/** Triangles (3 corners each, counterclockwise) of the sweep over the given corners. */
export function sweep(corners: readonly number[], x: Int32Array, y: Int32Array): number[] {
  const order = [...corners].sort((p, q) => x[p] - x[q] || y[p] - y[q])
  const left = (p: number, q: number, r: number): number =>
    (x[q] - x[p]) * (y[r] - y[p]) - (y[q] - y[p]) * (x[r] - x[p])
  const triangles: number[] = []
  // Lower and upper chain of the hull so far, both from the first corner to the last one added.
  let lower = [order[0]]
  let upper = [order[0]]
  let flat = true
  for (let n = 1; n < order.length; n++) {
    const p = order[n]
    if (flat) {
      const turn = n === 1 ? 0 : left(order[0], order[n - 1], p)
      if (turn === 0) {
        lower.push(p)
        continue
      }
      flat = false
      const line = lower
      for (let c = 0; c + 1 < line.length; c++) {
        if (turn > 0) triangles.push(line[c], line[c + 1], p)
        else triangles.push(line[c + 1], line[c], p)
      }
      const short = [line[0], p]
      lower = turn > 0 ? [...line, p] : short
      upper = turn > 0 ? short : [...line, p]
      continue
    }
    while (lower.length > 1 && left(lower[lower.length - 2], lower[lower.length - 1], p) < 0) {
      const last = lower.pop() as number
      triangles.push(last, lower[lower.length - 1], p)
    }
    while (upper.length > 1 && left(upper[upper.length - 2], upper[upper.length - 1], p) > 0) {
      const last = upper.pop() as number
      triangles.push(upper[upper.length - 1], last, p)
    }
    lower.push(p)
    upper.push(p)
  }
  return triangles
}
