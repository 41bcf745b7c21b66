import { greatestCommonDivisor } from './determinants.ts'
import type { CertifiedNumbers } from './intersectionChecks.ts'
import type { PointFigures } from './polytopeReading.ts'

/** A linear relation among points as a condition on Kaehler classes: sum of coefficient * w at the points. */
export interface Condition {
  readonly points: readonly number[]
  readonly coefficients: readonly number[]
}

export function valueAt({ points, coefficients }: Condition, w: ArrayLike<number>): number {
  let sum = 0
  for (let n = 0; n < points.length; n++) sum += coefficients[n] * w[points[n]]
  return sum
}

/**
 * The classes of the curves D_i . D_j on the edges of the triangles, from certified intersection numbers:
 * C . D_k = kappa_ijk divided by the greatest integer that divides the class. On an edge of the polytope (points on
 * three facets or more) the curve meets every component of a split divisor once, so there the pairings with single
 * components decide what divides it; on an edge inside a 2-face the curve itself has as many components.
 */
export function curveClasses(
  { triples }: CertifiedNumbers,
  triangles: readonly (readonly number[])[],
  { through, components }: PointFigures,
): Condition[] {
  const count = through.length
  const rows = new Map<number, Map<number, number>>()
  for (const [i, j, k] of triangles)
    for (const [p, q] of [
      [i, j],
      [i, k],
      [j, k],
    ])
      rows.set(p * count + q, new Map())
  const put = (p: number, q: number, at: number, value: number): void => {
    rows.get(p * count + q)?.set(at, value)
  }
  for (const [i, j, k, value] of triples) {
    if (i < j) put(i, j, k, value)
    if (j < k) put(j, k, i, value)
    if (i < j && j < k) put(i, k, j, value)
  }
  return [...rows].map(([code, row]) => {
    const [i, j] = [Math.floor(code / count), code % count]
    const onEdge = through[i].filter((facet) => through[j].includes(facet)).length > 2
    const entries = [...row].sort((a, b) => a[0] - b[0])
    const divisor = entries.reduce(
      (common, [k, value]) => greatestCommonDivisor(common, onEdge ? value / components[k] : value),
      0,
    )
    return {
      points: entries.map(([k]) => k),
      coefficients: entries.map(([, value]) => value / divisor),
    }
  })
}
