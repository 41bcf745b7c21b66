import { gcdOf } from '../../../scoring/geometry/integers.ts'
import type { TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'

type Vector = readonly number[]

/**
 * All circuits of the inner cone by determinants, as an independent road: for each triangle (i, j, k) and points
 * p, q strictly on different sides of its span, the relation among the five vectors by Cramer's rule; for each
 * other point p in the span, that among four. Primitive, positive at p (and q).
 */
export function circuitsByMinors({ polytope, triangles }: TwoFaceClass): [number, number][][] {
  const vector = (p: number): Vector => Array.from(polytope.points.subarray(4 * p, 4 * p + 4))
  const circuits: [number, number][][] = []
  for (let t = 0; t < triangles.length; t += 3) {
    const corners = Array.from(triangles.subarray(t, t + 3))
    const span = corners.map(vector)
    const side = Array.from({ length: polytope.pointCount }, (_, p) => determinant([...span, vector(p)]))
    const outside = [0, 1, 2, 3].map((axis) => [0, 1, 2, 3].map((i) => (i === axis ? 1 : 0)))
    const unit = outside.find((e) => determinant([...span, e]) !== 0) as Vector
    side.forEach((height, p) => {
      if (height === 0 && !corners.includes(p))
        circuits.push(primitive(relation([p, ...corners], vector, unit)))
      if (height <= 0) return
      side.forEach((depth, q) => {
        if (depth < 0) circuits.push(primitive(relation([p, q, ...corners], vector)))
      })
    })
  }
  return circuits
}

/** Cramer's rule: coefficient m is (-1)^m times the determinant of the other vectors (with `unit` added). */
function relation(
  points: readonly number[],
  vector: (p: number) => Vector,
  unit?: Vector,
): [number, number][] {
  return points.map((p, m) => {
    const others = points.filter((_, n) => n !== m).map(vector)
    return [p, (m % 2 === 0 ? 1 : -1) * determinant(unit ? [...others, unit] : others)]
  })
}

function primitive(entries: [number, number][]): [number, number][] {
  const divisor = gcdOf(entries.map(([, coefficient]) => coefficient)) * Math.sign(entries[0][1])
  return entries
    .map(([p, coefficient]): [number, number] => [p, coefficient / divisor])
    .filter(([, coefficient]) => coefficient !== 0)
    .sort((left, right) => left[0] - right[0])
}

/** Determinant by expansion along the first row. */
export function determinant(rows: readonly Vector[]): number {
  if (rows.length === 1) return rows[0][0]
  return rows[0].reduce((sum, entry, column) => {
    if (entry === 0) return sum
    const minor = rows.slice(1).map((row) => row.filter((_, c) => c !== column))
    return sum + (column % 2 === 0 ? 1 : -1) * entry * determinant(minor)
  }, 0)
}
