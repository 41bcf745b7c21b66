import type { FanSimplices } from '../../../scoring/geometry/fans/fan.ts'
import { facetPoints } from '../../../scoring/geometry/fans/facetPoints.ts'
import type { Polytope } from '../../../scoring/geometry/polytope.ts'

/** The simplices as a list. */
export function rowsOf({ simplices }: FanSimplices): number[][] {
  return Array.from({ length: simplices.length / 4 }, (_, s) => [...simplices.subarray(4 * s, 4 * s + 4)])
}

/** Determinant of integer rows by expansion, in big integers. */
function determinant(rows: readonly (readonly bigint[])[]): bigint {
  if (rows.length === 1) return rows[0][0]
  return rows[0].reduce((sum, entry, c) => {
    if (entry === 0n) return sum
    const rest = rows.slice(1).map((row) => row.filter((_, other) => other !== c))
    return sum + (c % 2 === 0 ? entry : -entry) * determinant(rest)
  }, 0n)
}

/**
 * Simplices of all facets whose lifted hyperplane has every other point of the facet strictly above it: tried on
 * all sets of four points, so only for small facets; larger ones are left to `fanFromSimplices`.
 */
export function lowerSimplices(polytope: Polytope, heights: ArrayLike<number>): number[][] {
  const vector = (p: number): bigint[] => [...polytope.points.subarray(4 * p, 4 * p + 4)].map(BigInt)
  const found: number[][] = []
  for (const list of facetPoints(polytope).points) {
    const points = [...list]
    const lifted = new Map(points.map((p) => [p, [...vector(p), BigInt(heights[p])]]))
    const row = (p: number): bigint[] => lifted.get(p) as bigint[]
    for (const [a, i] of points.entries()) {
      for (const [b, j] of points.entries()) {
        if (b <= a) continue
        for (const [c, k] of points.entries()) {
          if (c <= b) continue
          for (const l of points.slice(c + 1)) {
            const volume = determinant([i, j, k, l].map(vector))
            if (volume === 0n) continue
            const below = points.every((q) => {
              if (q === i || q === j || q === k || q === l) return true
              const raised = determinant([...[i, j, k, l].map(row), row(q)])
              return raised > 0n === volume > 0n && raised !== 0n
            })
            if (below) found.push([i, j, k, l])
          }
        }
      }
    }
  }
  return found.sort((s, t) => s[0] - t[0] || s[1] - t[1] || s[2] - t[2] || s[3] - t[3])
}
