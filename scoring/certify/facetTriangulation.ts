import { InvariantError } from '../errors.ts'
import { pairing, rank, type Vector } from './determinants.ts'
import { facetNormals } from './facets.ts'
import { checkVolume, LiftedSimplex, liftedPoints, type LiftedPoints } from './liftedSimplex.ts'
import { latticeVolume } from './pullingTriangulation.ts'

/** The lower hull of a facet, or five and more points that the heights put on one lifted hyperplane. */
export type FacetOutcome =
  | { readonly generic: true; readonly simplices: readonly (readonly number[])[] }
  | { readonly generic: false; readonly tied: readonly number[] }

/** Points of each facet: those on which its normal takes the value -1. */
export function pointsOnFacets(points: readonly Vector[], normals: readonly Vector[]): number[][] {
  return normals.map((normal) => [...points.keys()].filter((p) => pairing(normal, points[p]) === -1))
}

/**
 * The regular triangulation of one facet by its points' heights, in exact arithmetic: gift wrapping in three
 * dimensions. The facet lies in a hyperplane that misses the origin, so its simplices are cones, and affine
 * functions on it are linear ones. The first simplex grows along a chain of faces, vertex, edge, 2-face, facet, by
 * turning about the simplex before; then each wall that has one simplex and does not lie on the facet's boundary
 * is turned about. Every simplex is compared with all points of the facet: none may lie below, and none on it but
 * its corners.
 *
 * @param onFacets points of all facets
 * @param facet which facet to triangulate
 */
export function triangulateFacet(
  lifted: LiftedPoints,
  onFacets: readonly (readonly number[])[],
  facet: number,
): FacetOutcome {
  const members = onFacets[facet]
  const start = firstSimplex(lifted, onFacets, facet)
  if ('tied' in start) return { generic: false, tied: start.tied }
  const count = lifted.points.length
  const simplices: number[][] = []
  const sides = new Map<number, number>()
  const open: number[][] = [start.corners]
  const seen = new Set<string>([name(start.corners)])
  for (let corners = open.pop(); corners !== undefined; corners = open.pop()) {
    const simplex = new LiftedSimplex(lifted, corners)
    for (const p of members) {
      if (corners.includes(p)) continue
      const excess = simplex.excess(p)
      if (excess === 0) return { generic: false, tied: sorted([...corners, p]) }
      if (excess < 0) throw new InvariantError(`Point ${p} lies below the simplex ${name(corners)}.`)
    }
    simplices.push(sorted(corners))
    for (let at = 0; at < 4; at++) {
      const wall = corners.filter((_, n) => n !== at)
      const code = wallCode(wall, count)
      const known = (sides.get(code) ?? 0) + 1
      sides.set(code, known)
      if (known > 1) continue
      const turned = simplex.pivot(at, -1, members)
      if (turned === undefined) continue
      if (turned.ties.length > 0)
        return { generic: false, tied: sorted([...wall, turned.first, ...turned.ties]) }
      const next = corners.map((p, n) => (n === at ? turned.first : p))
      if (seen.has(name(next))) continue
      seen.add(name(next))
      open.push(next)
    }
  }
  return { generic: true, simplices: simplices.sort(compareIndices) }
}

/**
 * True when the heights induce a triangulation on every facet: no lower face of a facet holds more points than its
 * dimension plus one. This is what a witness of a candidate must satisfy beside giving its 2-face class.
 *
 * @param vertices of a reflexive polytope
 * @param points four integers per point, vertices included, those inside facets left out
 * @param heights one integer per point
 */
export function facetsAreGeneric(
  vertices: readonly Vector[],
  points: readonly Vector[],
  heights: ArrayLike<number>,
): boolean {
  return facetGenericity(vertices, points)(heights)
}

/** The same for many heights on one polytope: what does not depend on them is computed once. */
export function facetGenericity(
  vertices: readonly Vector[],
  points: readonly Vector[],
): (heights: ArrayLike<number>) => boolean {
  const normals = facetNormals(vertices)
  checkVolume(latticeVolume(vertices, normals))
  const onFacets = pointsOnFacets(points, normals)
  return (heights) => {
    const lifted = liftedPoints(points, heights)
    return onFacets.every((_, facet) => triangulateFacet(lifted, onFacets, facet).generic)
  }
}

/** A simplex of the lower hull that touches the facet's boundary in a vertex, an edge and a triangle. */
function firstSimplex(
  lifted: LiftedPoints,
  onFacets: readonly (readonly number[])[],
  facet: number,
): { corners: number[] } | { tied: number[] } {
  const { points } = lifted
  const members = onFacets[facet]
  const rankOf = (list: readonly number[]): number => rank(list.map((p) => points[p]))
  const within = (list: readonly number[], dimension: number): number[] => {
    for (const other of onFacets) {
      const common = list.filter((p) => other.includes(p))
      if (common.length < list.length && rankOf(common) === dimension + 1) return common
    }
    throw new InvariantError(`A face of facet ${facet} has no face of dimension ${dimension}.`)
  }
  const polygon = within(members, 2)
  const edge = within(polygon, 1)
  const [vertex] = within(edge, 0)
  const outside = (list: readonly number[], inner: readonly number[]): number =>
    list.find((p) => !inner.includes(p)) as number
  let corners = [vertex, outside(edge, [vertex]), outside(polygon, edge), outside(members, polygon)]
  for (const [at, list] of [edge, polygon, members].entries()) {
    const turned = new LiftedSimplex(lifted, corners).pivot(at + 1, 1, list)
    if (turned === undefined) throw new InvariantError('A face has no point beside its own faces.')
    if (turned.ties.length > 0)
      return { tied: sorted([...corners.slice(0, at + 1), turned.first, ...turned.ties]) }
    corners = corners.map((p, n) => (n === at + 1 ? turned.first : p))
  }
  return { corners }
}

const sorted = (list: readonly number[]): number[] => [...list].sort((a, b) => a - b)

const name = (corners: readonly number[]): string => sorted(corners).join()

function wallCode(wall: readonly number[], count: number): number {
  const [i, j, k] = sorted(wall)
  return (i * count + j) * count + k
}

export function compareIndices(a: readonly number[], b: readonly number[]): number {
  for (let n = 0; n < a.length; n++) if (a[n] !== b[n]) return a[n] - b[n]
  return 0
}
