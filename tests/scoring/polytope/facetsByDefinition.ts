import { gcdOf } from '../../../scoring/geometry/integers.ts'

/**
 * Facets by definition: every hyperplane through four independent points with all points on one side. Primitive
 * inner normal and offset, as text.
 */
export function facetsByDefinition(points: readonly (readonly number[])[]): string[] {
  const found = new Set<string>()
  const count = points.length
  for (let i = 0; i < count; i++)
    for (let j = i + 1; j < count; j++)
      for (let k = j + 1; k < count; k++)
        for (let l = k + 1; l < count; l++) {
          const [a, b, c] = [j, k, l].map((other) => points[other].map((x, axis) => x - points[i][axis]))
          const minor = (p: number, q: number, r: number): number =>
            a[p] * (b[q] * c[r] - b[r] * c[q]) -
            a[q] * (b[p] * c[r] - b[r] * c[p]) +
            a[r] * (b[p] * c[q] - b[q] * c[p])
          const normal = [minor(1, 2, 3), -minor(0, 2, 3), minor(0, 1, 3), -minor(0, 1, 2)]
          const divisor = gcdOf(normal)
          if (divisor === 0) continue
          const values = points.map((point) => point.reduce((sum, x, axis) => sum + x * normal[axis], 0))
          const level = values[i]
          const sign = values.every((value) => value >= level) ? 1 : values.every((v) => v <= level) ? -1 : 0
          if (sign !== 0) found.add([...normal, -level].map((entry) => (sign * entry) / divisor + 0).join())
        }
  return [...found].sort()
}
