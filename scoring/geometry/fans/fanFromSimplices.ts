import { InputError, InvariantError } from '../../errors.ts'
import { classFromTriangles } from '../classFromTriangles.ts'
import { listed, type PointNames } from '../pointNames.ts'
import type { Polytope } from '../polytope.ts'
import { fanSimplices, type Fan } from './fan.ts'
import { commonFacets, facetPoints } from './facetPoints.ts'
import { wallCode } from './facetTriangulation.ts'
import { minorsOf, pairing, simplexVolume } from './simplexFrame.ts'

/** Stands for the origin in a list of simplices. */
export const originIndex = -1

/** A simplex that has passed the checks on itself. */
interface Placed {
  /** Where it stands in the list given. */
  readonly at: number
  /** Four points, ascending. */
  readonly points: readonly number[]
  readonly facet: number
}

/**
 * A fan from its simplices in any order, as a file or another program may give them: four points each, or five
 * with the origin (`originIndex`). Proves that they are a fine star triangulation:
 *
 * 1. each simplex has the origin as a vertex, and its other four points lie on one facet and span it;
 * 2. each triangle of a simplex is shared with exactly one other, on its other side: of the same facet, or where
 *    the triangle lies in a 2-face, of the facet beyond. So the number of simplices over a point of a facet is the
 *    same almost everywhere on it;
 * 3. in each facet the volumes add up to the facet's, so that number is one: no two overlap, nothing is left
 *    open. Simplices that fit together along whole walls fit together along all faces (Gruber, Ryshkov,
 *    Facet-to-facet implies face-to-face, European J. Combin. 10 (1989) 83);
 * 4. every point is used.
 *
 * Regularity is for `isRegularFan` to say.
 *
 * @param names how messages name points
 * @throws InputError that names the first simplex, wall, facet or points at fault: simplices.empty, .wrong-size,
 *   .no-such-point, .repeated-point, .not-star, .not-in-a-facet, .degenerate, .twice, .overlap, .open-wall, .not-fine
 */
export function fanFromSimplices(
  polytope: Polytope,
  simplices: readonly (readonly number[])[],
  names: PointNames = String,
): Fan {
  const placed = simplices.map((simplex, at) => place(polytope, simplex, at, names))
  if (placed.length === 0) throw fault('empty', 'No simplices are given.')
  refuseTwice(placed, names)
  const triangles = pairWalls(polytope, placed, names)
  requireCover(polytope, placed, names)
  requireFine(polytope, placed, names)
  const fan = fanSimplices(
    polytope,
    placed.map(({ points }) => points),
    placed.map(({ facet }) => facet),
  )
  return { ...fan, class: classFromTriangles(polytope, triangles.flat()) }
}

function place(polytope: Polytope, simplex: readonly number[], at: number, names: PointNames): Placed {
  const named = `Simplex ${at} ${listed(simplex, (p) => (p === originIndex ? 'origin' : names(p)))}`
  const refuse = (code: string, what: string): never => {
    throw fault(code, `${named} ${what}.`, `simplices[${at}]`, [...simplex])
  }
  if (simplex.length !== 4 && simplex.length !== 5)
    refuse('wrong-size', `has ${simplex.length} vertices; give four points, or five vertices with the origin`)
  for (const p of simplex) {
    if (Number.isInteger(p) && p >= originIndex && p < polytope.pointCount) continue
    refuse('no-such-point', `names ${p}, which is no point; indices run from 0 to ${polytope.pointCount - 1}`)
  }
  if (new Set(simplex).size < simplex.length) refuse('repeated-point', 'names a point twice')
  const points = simplex.filter((p) => p !== originIndex).sort((p, q) => p - q)
  if (points.length === 5)
    refuse('not-star', 'does not have the origin as a vertex, so the triangulation is not star')
  if (points.length === 3)
    refuse('wrong-size', 'has three points besides the origin; a simplex of four dimensions has four')
  const frame = facetPoints(polytope)
  const [facet] = commonFacets(frame, points)
  if (facet === undefined) {
    const alone = points.find(
      (p) =>
        commonFacets(
          frame,
          points.filter((q) => q !== p),
        ).length > 0,
    )
    refuse(
      'not-in-a-facet',
      alone === undefined
        ? 'does not lie on one facet of the polytope'
        : `does not lie on one facet of the polytope: point ${names(alone)} is on none that holds the others`,
    )
  }
  if (simplexVolume(polytope, points) === 0) refuse('degenerate', 'is degenerate: its points lie in a plane')
  return { at, points, facet }
}

function refuseTwice(placed: readonly Placed[], names: PointNames): void {
  const seen = new Map<string, number>()
  for (const { at, points } of placed) {
    const name = points.join()
    const earlier = seen.get(name)
    if (earlier !== undefined)
      throw fault(
        'twice',
        `Simplices ${earlier} and ${at} are the same ${listed(points, names)}.`,
        `simplices[${at}]`,
      )
    seen.set(name, at)
  }
}

/** One side of a wall: the simplex there, and the vertex of it off the wall. */
interface Side {
  readonly simplex: Placed
  readonly apex: number
}

/** Checks that each wall has the two neighbours it must have; returns the walls in 2-faces. */
function pairWalls(polytope: Polytope, placed: readonly Placed[], names: PointNames): number[][] {
  const sides = new Map<number, Side[]>()
  for (const simplex of placed) {
    for (const apex of simplex.points) {
      const [i, j, k] = simplex.points.filter((p) => p !== apex)
      const code = wallCode(polytope, i, j, k)
      const list = sides.get(code)
      if (list === undefined) sides.set(code, [{ simplex, apex }])
      else list.push({ simplex, apex })
    }
  }
  const onFaces: number[][] = []
  for (const list of sides.values()) {
    const { simplex, apex } = list[0]
    const wall = simplex.points.filter((p) => p !== apex)
    const facets = commonFacets(facetPoints(polytope), wall)
    if (facets.length === 1) checkInside(polytope, wall, list, names)
    else {
      for (const facet of facets) checkBetween(wall, facet, list, names)
      onFaces.push(wall)
    }
  }
  return onFaces
}

function checkInside(
  polytope: Polytope,
  wall: readonly number[],
  sides: readonly Side[],
  names: PointNames,
): void {
  const off = sides[0].apex
  const { rows } = minorsOf(polytope, [...wall, off])
  const sideOf = (p: number): boolean => pairing(rows, 3, polytope.points, p) > 0
  const here = sides.filter(({ apex }) => sideOf(apex))
  const there = sides.filter(({ apex }) => !sideOf(apex))
  for (const side of [here, there]) if (side.length > 1) throw overlap(wall, side, names)
  if (here.length === 0 || there.length === 0)
    throw openWall(wall, sides[0].simplex, names, 'inside its facet')
}

function checkBetween(
  wall: readonly number[],
  facet: number,
  sides: readonly Side[],
  names: PointNames,
): void {
  const here = sides.filter(({ simplex }) => simplex.facet === facet)
  if (here.length > 1) throw overlap(wall, here, names)
  if (here.length === 0) throw openWall(wall, sides[0].simplex, names, `on facet ${facet}`)
}

function overlap(wall: readonly number[], sides: readonly Side[], names: PointNames): InputError {
  const [s, t] = sides.map(({ simplex }) => simplex)
  return fault(
    'overlap',
    `Simplices ${s.at} ${listed(s.points, names)} and ${t.at} ${listed(t.points, names)} overlap: they lie on ` +
      `the same side of the triangle ${listed(wall, names)}.`,
    `simplices[${t.at}]`,
    t.points,
  )
}

function openWall(wall: readonly number[], simplex: Placed, names: PointNames, where: string): InputError {
  return fault(
    'open-wall',
    `No simplex lies on the other side of the triangle ${listed(wall, names)} of simplex ${simplex.at} ` +
      `${listed(simplex.points, names)}, ${where}.`,
    `simplices[${simplex.at}]`,
    [...wall],
  )
}

function requireCover(polytope: Polytope, placed: readonly Placed[], names: PointNames): void {
  const { volumes } = facetPoints(polytope)
  const sums = new Float64Array(volumes.length)
  for (const { points, facet } of placed) sums[facet] += simplexVolume(polytope, points)
  volumes.forEach((volume, facet) => {
    if (sums[facet] === volume) return
    const [first, second] = crossing(
      polytope,
      placed.filter((simplex) => simplex.facet === facet),
    )
    throw fault(
      'overlap',
      `Simplices ${first.at} ${listed(first.points, names)} and ${second.at} ${listed(second.points, names)} overlap ` +
        `inside facet ${facet}: the volumes there add up to ${sums[facet]} in place of ${volume}.`,
      `simplices[${second.at}]`,
      second.points,
    )
  })
}

/** Two simplices of a facet that is covered more than once, of which one contains the centre of the other. */
function crossing(polytope: Polytope, placed: readonly Placed[]): Placed[] {
  for (const other of placed) {
    const { rows, determinant } = minorsOf(polytope, other.points)
    const found = placed.find(
      (simplex) =>
        simplex !== other &&
        [0, 1, 2, 3].every((m) => {
          const shares = simplex.points.map((p) => pairing(rows, m, polytope.points, p))
          return shares.reduce((sum, share) => sum + share, 0) * Math.sign(determinant) >= 0
        }),
    )
    if (found !== undefined) return [other, found].sort((s, t) => s.at - t.at)
  }
  throw new InvariantError('A facet is covered more than once, but no simplices overlap.')
}

function requireFine(polytope: Polytope, placed: readonly Placed[], names: PointNames): void {
  const used = new Set(placed.flatMap(({ points }) => points))
  const unused = Array.from({ length: polytope.pointCount }, (_, p) => p).filter((p) => !used.has(p))
  if (unused.length > 0)
    throw fault(
      'not-fine',
      `The triangulation is not fine: ${unused.length === 1 ? 'point' : 'points'} ${unused.map((p) => names(p)).join(', ')} ` +
        `${unused.length === 1 ? 'is' : 'are'} not used.`,
      'simplices',
      unused,
    )
}

function fault(code: string, message: string, path = 'simplices', found?: unknown): InputError {
  return new InputError(`simplices.${code}`, message, path, found)
}
