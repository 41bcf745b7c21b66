import { circuitCoefficient, exchange, next, previous, type FaceMesh } from './faceMesh.ts'

/**
 * Sign (or exact value) of w_k + w_l - a w_i - b w_j for corners i, j, k, l; a = 2 - b. Positive: the edge ij
 * is an edge of the lower hull where the two triangles meet; negative: the surface is reflex there.
 */
export type CircuitSign = (i: number, j: number, k: number, l: number, b: number) => number

/** Circuit values of integer heights per corner; exact while the heights keep to `heightBound`. */
export function circuitValue(heights: ArrayLike<number>): CircuitSign {
  return (i, j, k, l, b) => heights[k] + heights[l] - (2 - b) * heights[i] - b * heights[j]
}

/**
 * Turns the fine triangulation `mesh` into the regular one of the given heights, in place, by exchanging
 * diagonals at reflex edges. Returns the number of exchanges, or -1 when the heights are not fine; then the
 * mesh is left somewhere on the way.
 *
 * Why this never gets stuck. An exchange at a reflex edge lowers the piecewise linear surface over the
 * parallelogram and raises it nowhere, so no triangulation comes back and the process ends. It can end early
 * only at a reflex edge ij whose quadrilateral is no parallelogram: b != 1. As a + b = 2, one of a and b is at
 * most 0, say a. Then v_j = (v_k + v_l + |a| v_i) / b is a convex combination of other points, and value <= 0
 * says that w_j is not below the same combination of their heights: point j is no vertex of the lower hull and
 * the heights are not fine. Conversely, when all edges are convex the surface is convex, hence the hull.
 *
 * Ties, value 0 on a parallelogram, are decided as if w_p were raised by e^p for an infinitesimal e > 0 (p the
 * point's index): the lowest index among the four corners gives the sign. That perturbation is one height
 * function on all points, so the outcome is regular, unique and does not depend on the start. Heights with
 * ties may hide an unused point, which `flattenedPoints` finds.
 */
export function regularise(mesh: FaceMesh, sign: CircuitSign): number {
  const { from, twin, sheets } = mesh
  const { point } = sheets
  const stack: number[] = []
  for (let h = 0; h < twin.length; h++) if (twin[h] > h) stack.push(h)
  let exchanges = 0
  while (stack.length > 0) {
    const h = stack.pop() as number
    const g = twin[h]
    if (g < 0) continue
    const i = from[h]
    const j = from[g]
    const k = from[previous(h)]
    const l = from[previous(g)]
    const b = circuitCoefficient(mesh, h)
    const value = sign(i, j, k, l, b)
    if (value > 0) continue
    if (b !== 1) return -1
    // Within a face corners are in the order of their points.
    if (value === 0 && Math.min(point[k], point[l]) < Math.min(point[i], point[j])) continue
    exchange(mesh, h)
    exchanges++
    stack.push(h, next(h), g, next(g))
  }
  return exchanges
}

/**
 * Points that a convex but tied surface does not have as vertices: those that lie inside a flat cell, or inside
 * an edge between two flat cells. A point's triangles are walked around; it is a vertex unless no edge at it is
 * strictly convex, or exactly two are and these are opposite (on the boundary of a polygon the two boundary
 * edges count as convex). Returns corners; empty when the heights are strictly fine.
 */
export function flattenedPoints(mesh: FaceMesh, sign: CircuitSign): number[] {
  const { from, twin, sheets } = mesh
  const { x, y, point } = sheets
  const tied = new Set<number>()
  const isTie = (h: number): boolean => {
    const g = twin[h]
    if (g < 0) return false
    return sign(from[h], from[g], from[previous(h)], from[previous(g)], circuitCoefficient(mesh, h)) === 0
  }
  for (let h = 0; h < twin.length; h++) if (isTie(h)) tied.add(h)
  if (tied.size === 0) return []
  const outgoing = new Map<number, number[]>()
  for (let h = 0; h < from.length; h++) {
    const list = outgoing.get(from[h])
    if (list === undefined) outgoing.set(from[h], [h])
    else list.push(h)
  }
  const touched = new Set([...tied].map((h) => from[h]))
  const flattened: number[] = []
  for (const c of touched) {
    const ends: number[] = []
    for (const h of outgoing.get(c) ?? []) {
      if (!tied.has(h)) ends.push(from[next(h)])
      // A boundary edge that comes in here has no outgoing half-edge.
      if (twin[previous(h)] < 0) ends.push(from[previous(h)])
    }
    const opposite = (p: number, q: number): boolean => x[p] + x[q] === 2 * x[c] && y[p] + y[q] === 2 * y[c]
    if (ends.length === 0 || (ends.length === 2 && opposite(ends[0], ends[1]))) flattened.push(c)
  }
  return flattened.sort((p, q) => point[p] - point[q])
}
