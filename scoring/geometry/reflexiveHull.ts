import { InputError } from '../errors.ts'
import { hull, hullVertexLimit } from './hull.ts'
import { compareLexicographic } from './integers.ts'
import { applyBig, reducedBasis, transposed } from './latticeReduction.ts'
import { linearForm } from './linearForm.ts'
import { checkedPoints } from './polytopeInput.ts'

/** Vertices and primitive inner facet normals of a reflexive polytope, in the coordinates given. */
export interface ReflexiveHull {
  /** Lexicographic order. */
  readonly vertices: readonly (readonly number[])[]
  readonly facets: readonly (readonly bigint[])[]
}

/** Largest coordinate in a reduced basis: the hull is exact up to here, whatever the points. */
const reducedLimit = 2000

/** Coordinates up to this size are taken as they are; larger ones go through a reduced basis first. */
const plainLimit = 100

/**
 * The hull of the points, certified to be reflexive: the origin inside and every facet at lattice distance 1.
 *
 * @throws InputError with the codes of `checkedPoints` and polytope.coordinates-too-large,
 *   polytope.too-many-vertices, polytope.origin-not-interior, polytope.facet-distance; facets are named in the
 *   coordinates given
 */
export function reflexiveHull(rows: readonly (readonly number[])[]): ReflexiveHull {
  const points = checkedPoints(rows)
  const { reduced, normalIn } = reducedPoints(points)
  const found = hull(reduced)
  if (found.kind === 'origin-not-interior') throw originNotInterior(normalIn(found.normal), found.offset)
  if (found.kind === 'too-large') throw tooLarge('the hull has facets', Number.MAX_SAFE_INTEGER)
  if (found.kind === 'too-many-vertices') {
    throw new InputError(
      'polytope.too-many-vertices',
      `The hull has more than ${hullVertexLimit} vertices; a reflexive polytope in four dimensions has at most 36.`,
    )
  }
  const facets = found.facets.map((facet) => ({
    normal: normalIn(facet.normal),
    offset: facet.offset,
    vertices: facet.vertices.map((position) => points[found.vertices[position]]).sort(compareLexicographic),
  }))
  for (const facet of facets) if (facet.offset !== 1) throw wrongDistance(facet)
  return {
    vertices: found.vertices.map((index) => points[index]).sort(compareLexicographic),
    facets: facets.map(({ normal }) => normal),
  }
}

/** The points in a basis where the hull is exact in doubles, and the way back for normals. */
function reducedPoints(points: readonly (readonly number[])[]): {
  reduced: readonly (readonly number[])[]
  normalIn: (normal: readonly number[]) => bigint[]
} {
  if (points.every((point) => point.every((entry) => Math.abs(entry) <= plainLimit))) {
    return { reduced: points, normalIn: (normal) => normal.map(BigInt) }
  }
  const exact = points.map((point) => point.map(BigInt))
  const { matrix } = reducedBasis(exact)
  const reduced = exact.map((point) =>
    applyBig(matrix, point).map((entry) => {
      const size = entry < 0n ? -entry : entry
      if (size > BigInt(reducedLimit)) throw tooLarge(`a coordinate of size ${size} is left`, reducedLimit)
      return Number(entry)
    }),
  )
  const back = transposed(matrix)
  return { reduced, normalIn: (normal) => applyBig(back, normal.map(BigInt)) }
}

function tooLarge(what: string, limit: number): InputError {
  return new InputError(
    'polytope.coordinates-too-large',
    `The coordinates are too large: in a reduced lattice basis ${what}, above ${limit}, where exact arithmetic would end.`,
  )
}

function originNotInterior(normal: readonly bigint[], offset: number): InputError {
  const place = offset === 0 ? 'lies on the boundary' : 'lies outside'
  return new InputError(
    'polytope.origin-not-interior',
    `The origin ${place}: all points satisfy ${linearForm(normal, 'x')} >= ${-offset}, so it is not in the interior.`,
    '',
    { normal: normal.map(String), atLeast: -offset },
  )
}

function wrongDistance(facet: { normal: bigint[]; offset: number; vertices: number[][] }): InputError {
  const vertices = facet.vertices.map((vertex) => `(${vertex.join(', ')})`).join(', ')
  return new InputError(
    'polytope.facet-distance',
    `The facet with vertices ${vertices} and normal (${facet.normal.join(', ')}) is at lattice distance ${facet.offset} from the origin; in a reflexive polytope every facet is at distance 1.`,
    '',
    { normal: facet.normal.map(String), distance: facet.offset, vertices: facet.vertices },
  )
}
