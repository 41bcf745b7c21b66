import type { CanonicalClass } from '../geometry/classKey.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import { inversePermutation } from '../geometry/transport.ts'
import type { Candidate } from '../observables/candidate.ts'

/**
 * The values of a canonical candidate in the labels of an input: point i of the input is point `to[i]` of the
 * candidate, point p of the candidate is point `back[p]` of the input.
 */
export interface Relabelling {
  readonly to: Int32Array
  readonly back: Int32Array
}

export function relabellingOf(form: NormalForm, canonical: CanonicalClass): Relabelling {
  const to = form.relabelling.map((point) => canonical.relabelling[point])
  return { to, back: inversePermutation(to) }
}

/** One value per point, in the input's order. */
export function perPoint({ to }: Relabelling, values: ArrayLike<number>): number[] {
  return Array.from(to, (point) => values[point])
}

/** Sorted triples of points, 3 per triangle, in lexicographic order. */
export function sortedTriangles(triangles: ArrayLike<number>, back: ArrayLike<number> | null): number[][] {
  const list: number[][] = []
  for (let t = 0; t < triangles.length; t += 3) {
    const corners = [0, 1, 2].map((c) => (back === null ? triangles[t + c] : back[triangles[t + c]]))
    list.push(corners.sort((i, j) => i - j))
  }
  return list.sort(lexicographic)
}

/** Non-zero [i, j, k, kappa_ijk], i <= j <= k, in lexicographic order. */
export function intersectionList(candidate: Candidate, { back }: Relabelling): number[][] {
  const { triangles, triangleNumbers, edges, edgeNumbers, cubes } = candidate.numbers()
  const list: number[][] = []
  const put = (points: number[], value: number): void => {
    if (value !== 0) list.push([...points.map((p) => back[p]).sort((i, j) => i - j), value])
  }
  cubes.forEach((value, i) => put([i, i, i], value))
  for (let e = 0; e < edges.length; e += 2) {
    put([edges[e], edges[e], edges[e + 1]], edgeNumbers[e])
    put([edges[e], edges[e + 1], edges[e + 1]], edgeNumbers[e + 1])
  }
  triangleNumbers.forEach((value, t) => put([...triangles.subarray(3 * t, 3 * t + 3)], value))
  return list.sort(lexicographic)
}

/** Primitive classes of the curves D_i . D_j, one row [[k, coefficient], ...] per edge, ordered by edge. */
export function curveList(candidate: Candidate, { back }: Relabelling): number[][][] {
  const { starts, points, coefficients } = candidate.curves()
  const { edges } = candidate.numbers()
  const rows: { edge: number[]; row: number[][] }[] = []
  for (let r = 0; r + 1 < starts.length; r++) {
    const row: number[][] = []
    for (let at = starts[r]; at < starts[r + 1]; at++) row.push([back[points[at]], coefficients[at]])
    const edge = [back[edges[2 * r]], back[edges[2 * r + 1]]].sort((i, j) => i - j)
    rows.push({ edge, row: row.sort(lexicographic) })
  }
  return rows.sort((a, b) => lexicographic(a.edge, b.edge)).map(({ row }) => row)
}

function lexicographic(a: readonly number[], b: readonly number[]): number {
  for (let n = 0; n < a.length; n++) if (a[n] !== b[n]) return a[n] - b[n]
  return 0
}
