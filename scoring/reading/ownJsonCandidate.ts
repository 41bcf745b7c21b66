import type { GivenCandidate, GivenPolytope } from './given.ts'
import type { JsonNode, JsonPlaces } from './jsonPlaces.ts'
import { candidateShape, type CandidateShape, type Corner } from './jsonShapes.ts'
import { PointList } from './pointList.ts'

/**
 * A candidate in our own form, or the input of a headless evaluation. Undefined when something is wrong with it, which
 * `places` then has among its problems.
 */
export function ownJsonCandidate(places: JsonPlaces, at: JsonNode): GivenCandidate | undefined {
  const given = places.shaped(at, candidateShape)
  const polytope = given && polytopeOf(places, at, given)
  if (!given || !polytope) return undefined
  const ways = (['heights', 'simplices', 'triangles'] as const).filter((way) => given[way] !== undefined)
  if (ways.length > 1) {
    const message = `The triangulation is given as ${ways.join(' and as ')}; give one of them.`
    places.fail(at, 'candidate.two-triangulations', message)
    return undefined
  }
  if (ways.length === 0) {
    if (given.candidate !== undefined && polytope.kind === 'key') {
      return addressed(at, given.name ?? null, polytope.key, given.candidate)
    }
    const message = 'There is no triangulation; give one of "heights", "simplices" and "triangles".'
    places.fail(at, 'candidate.no-triangulation', message)
    return undefined
  }
  return ways[0] === 'heights'
    ? withHeights(places, at, given, polytope)
    : withCorners(places, at, given, polytope, ways[0])
}

/** A candidate that is named by its key only. */
export function addressed(
  at: JsonNode,
  name: string | null,
  polytopeKey: string,
  candidateKey: string,
): GivenCandidate {
  return {
    line: at.line,
    entry: at.path,
    name,
    polytope: { kind: 'key', key: polytopeKey },
    points: null,
    triangulation: { kind: 'address' },
    naming: 0,
    claims: { polytopeKey, candidateKey },
    places: {},
  }
}

function withHeights(
  places: JsonPlaces,
  at: JsonNode,
  given: CandidateShape,
  polytope: GivenPolytope,
): GivenCandidate {
  const heights = given.heights ?? []
  const values = Array.isArray(heights) ? heights : 'values' in heights ? heights.values : undefined
  const points = pointsOfHeights(given) ?? given.points
  return {
    ...head(at, given, polytope),
    points: points ?? null,
    triangulation:
      values === undefined
        ? { kind: 'quadratic', ...(heights as { seed?: number; noise?: number }) }
        : { kind: 'heights', values },
    places: places.placesOf(at, { ...given, points, heights: values }),
  }
}

function withCorners(
  places: JsonPlaces,
  at: JsonNode,
  given: CandidateShape,
  polytope: GivenPolytope,
  kind: 'simplices' | 'triangles',
): GivenCandidate | undefined {
  const list = new PointList(given.points ?? (polytope.kind === 'points' ? polytope.rows : []))
  const stated = list.rows.length > 0
  const corners = given[kind] ?? []
  const byPoint = corners.flat().filter((corner) => typeof corner !== 'number').length
  if (byPoint > 0 && byPoint < corners.flat().length && !stated) {
    places.fail(
      at,
      'json.mixed-corners',
      `Some corners of the ${kind} are points and others indices; indices need a list of "points" to refer to.`,
    )
    return undefined
  }
  const from = given.indexFrom ?? 0
  const index = (corner: Corner): number =>
    typeof corner === 'number' ? corner - from : list.indexOfPoint(corner)
  const rows = corners.map((row) => row.map(index))
  return {
    ...head(at, given, polytope),
    ...(byPoint > 0 && { naming: 'coordinates' as const }),
    points: stated || list.rows.length > 0 ? list.rows : null,
    triangulation: { kind, rows },
    places: places.placesOf(at, { ...given, heights: undefined }),
  }
}

function head(at: JsonNode, given: CandidateShape, polytope: GivenPolytope) {
  return {
    line: at.line,
    entry: at.path,
    name: given.name ?? null,
    polytope,
    naming: (given.indexFrom ?? 0) as GivenCandidate['naming'],
    claims: { candidateKey: given.candidate },
  }
}

function polytopeOf(places: JsonPlaces, at: JsonNode, given: CandidateShape): GivenPolytope | undefined {
  const { polytope, vertices, weights, side } = given
  const points = given.points ?? pointsOfHeights(given)
  const ways = Object.entries({ polytope, vertices, weights })
    .filter(([, way]) => way !== undefined)
    .map(([name]) => name)
  if (ways.length > 1) {
    places.fail(at, 'candidate.two-polytopes', `The polytope is given as ${ways.join(' and as ')}; give one.`)
    return undefined
  }
  if (polytope !== undefined) return { kind: 'key', key: polytope }
  if (vertices !== undefined) return { kind: 'points', rows: vertices }
  if (weights !== undefined && side !== undefined) return { kind: 'weights', weights, side }
  if (weights === undefined && points !== undefined) return { kind: 'points', rows: points }
  if (weights !== undefined) {
    const message = 'Weights need a side: "fan" (the weighted hypersurface) or "newton" (its mirror).'
    places.fail(at, 'input.no-side', message)
  } else {
    places.fail(
      at,
      'candidate.no-polytope',
      'There is no polytope; give "vertices", "points", "weights" with a "side", or the key of a known "polytope".',
    )
  }
  return undefined
}

function pointsOfHeights({ heights }: CandidateShape): number[][] | undefined {
  return heights !== undefined && !Array.isArray(heights) && 'points' in heights ? heights.points : undefined
}
