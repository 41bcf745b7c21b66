import type { IntegerRow } from './elementaryDivisors.ts'
import { edgeRow, type IntersectionNumbers } from './intersectionNumbers.ts'

/**
 * The map Sym^2 L -> L*, x y -> (z -> kappa(x, y, z)), as sparse rows over the generators: first the squares
 * D_i D_i, then the products D_i D_j of `form.edges`. All other products vanish.
 */
export function productRows(form: IntersectionNumbers): IntegerRow[] {
  const { edges, edgeNumbers, triangles, triangleNumbers, cubes, pointCount } = form
  const squares: IntegerRow[] = Array.from({ length: pointCount }, () => new Map<number, number>())
  const mixed: IntegerRow[] = Array.from({ length: edges.length / 2 }, () => new Map<number, number>())
  const put = (row: IntegerRow, k: number, value: number): void => {
    if (value !== 0) row.set(k, value)
  }
  cubes.forEach((cube, i) => put(squares[i], i, cube))
  for (let e = 0; e < mixed.length; e++) {
    const [i, j] = [edges[2 * e], edges[2 * e + 1]]
    put(squares[i], j, edgeNumbers[2 * e])
    put(squares[j], i, edgeNumbers[2 * e + 1])
    put(mixed[e], i, edgeNumbers[2 * e])
    put(mixed[e], j, edgeNumbers[2 * e + 1])
  }
  for (let t = 0; t < triangleNumbers.length; t++) {
    const [i, j, k] = triangles.subarray(3 * t, 3 * t + 3)
    put(mixed[edgeRow(edges, j, k)], i, triangleNumbers[t])
    put(mixed[edgeRow(edges, i, k)], j, triangleNumbers[t])
    put(mixed[edgeRow(edges, i, j)], k, triangleNumbers[t])
  }
  return [...squares, ...mixed]
}
