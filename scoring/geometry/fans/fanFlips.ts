import { fanSimplices, type FanSimplices } from './fan.ts'
import { distinctWalls } from './fanRegularity.ts'

/**
 * The fine star triangulations one flip away. A circuit Z = (Z+, Z-) of points has two triangulations: all Z minus
 * a point of Z+, and all Z minus a point of Z-. Where a fan contains the first, and the sets that complete each of
 * its simplices to one of the fan are the same for all of them, the second can take its place in all facets at once.
 * It must have two points at least in Z-, or its only simplex leaves one out. Every wall of a regular fan's cone of
 * heights belongs to such a flip, whose result is regular; other flips may be possible, with results that are not
 * (De Loera, Rambau, Santos, Triangulations, Springer 2010, chapters 4.4 and 5.3).
 */
export function fanNeighbours(fan: FanSimplices): FanSimplices[] {
  const neighbours: FanSimplices[] = []
  for (const { circuit } of distinctWalls(fan)) {
    const plus = circuit.points.filter((_, m) => circuit.coefficients[m] > 0)
    const minus = circuit.points.filter((_, m) => circuit.coefficients[m] < 0)
    if (minus.length === 1) continue
    const flipped = exchange(fan, plus, minus)
    if (flipped !== undefined) neighbours.push(flipped)
  }
  return neighbours
}

function exchange(
  { polytope, simplices, facetOf }: FanSimplices,
  plus: readonly number[],
  minus: readonly number[],
): FanSimplices | undefined {
  const inside = (point: number): boolean => plus.includes(point) || minus.includes(point)
  const size = plus.length + minus.length
  const kept: number[][] = []
  const keptFacets: number[] = []
  /** Per completion, with its facet: how many points of Z+ are missing in turn. */
  const links = new Map<string, { readonly rest: number[]; readonly facet: number; times: number }>()
  for (let s = 0; s < facetOf.length; s++) {
    const simplex = [...simplices.subarray(4 * s, 4 * s + 4)]
    const rest = simplex.filter((point) => !inside(point))
    // All of Z but one point, and that one of Z+: a simplex never holds all of Z+.
    if (simplex.length - rest.length !== size - 1 || !minus.every((point) => simplex.includes(point))) {
      kept.push(simplex)
      keptFacets.push(facetOf[s])
      continue
    }
    const name = `${facetOf[s]}:${rest.join()}`
    const link = links.get(name)
    if (link === undefined) links.set(name, { rest, facet: facetOf[s], times: 1 })
    else link.times++
  }
  for (const { rest, facet, times } of links.values()) {
    if (times !== plus.length) return undefined
    for (const left of minus) {
      kept.push([...rest, ...plus, ...minus.filter((point) => point !== left)].sort((p, q) => p - q))
      keptFacets.push(facet)
    }
  }
  return fanSimplices(polytope, kept, keptFacets)
}
