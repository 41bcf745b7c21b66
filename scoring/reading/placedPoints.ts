import { InputError } from '../errors.ts'
import { applyBig, transposed, type BasisChange } from '../geometry/latticeReduction.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import type { PointNames } from '../geometry/pointNames.ts'
import type { Polytope } from '../geometry/polytope.ts'
import { checkPoint } from '../geometry/polytopeInput.ts'
import type { GivenCandidate } from './given.ts'
import { inSection, type PlacingSession } from './placingSession.ts'

/** What a listed point is to the polytope: one of its points (an index), or one that a triangulation does not count. */
export type PointPlace = number | 'origin' | 'inside-a-facet'

/** A polytope that a text gives, with the points that the text's heights and indices refer to. */
export interface PlacedPoints {
  readonly polytope: Polytope
  readonly form: NormalForm
  /** Of each listed point, in the order of the list. */
  readonly places: readonly PointPlace[]
  /** True when the text lists points; false when the polytope's own order is meant. */
  readonly listed: boolean
  /** Coordinates of a point of the polytope as the text would give them: `(1, 0, 0, 0)`. */
  nameOf(point: number): string
  /** A point as the text's own simplices name it. */
  readonly labelOf: PointNames
}

/**
 * The polytope of a candidate and its list of points.
 *
 * @throws InputError of the geometry, with paths that begin with the section (`vertices[2][1]`), and points.outside,
 *   points.twice
 */
export function placedPoints(
  {
    polytope: given,
    points,
    triangulation,
    naming,
  }: Pick<GivenCandidate, 'polytope' | 'points' | 'triangulation' | 'naming'>,
  session: PlacingSession,
): PlacedPoints {
  // |v|^2 means the coordinates given.
  const { polytope, basis, form } = session.polytope(given, triangulation.kind !== 'quadratic')
  const list = points ?? (given.kind === 'points' ? given.rows : null)
  const back = basis && transposed(basis.dual)
  const nameOf = (point: number): string => {
    const own = [...polytope.points.subarray(4 * point, 4 * point + 4)]
    return `(${(back ? applyBig(back, own.map(BigInt)) : own).join(', ')})`
  }
  const places =
    list === null
      ? Array.from({ length: polytope.pointCount }, (_, point) => point)
      : placesOf(polytope, list, basis, points !== null ? 'points' : 'vertices')
  const labelOf = (point: number): string => {
    const at = naming === 'coordinates' ? -1 : places.indexOf(point)
    return at < 0 || naming === 'coordinates' ? nameOf(point) : String(at + naming)
  }
  return { polytope, form, places, listed: list !== null, nameOf, labelOf }
}

function placesOf(
  polytope: Polytope,
  rows: readonly (readonly number[])[],
  basis: BasisChange | undefined,
  section: 'points' | 'vertices',
): PointPlace[] {
  const indexOf = new Map<string, number>()
  const { points, pointCount } = polytope
  for (let p = 0; p < pointCount; p++) indexOf.set(points.subarray(4 * p, 4 * p + 4).join(), p)
  const first = new Map<string, number>()
  return rows.map((row, index) => {
    inSection(section, () => checkPoint(row, index))
    const own = basis ? applyBig(basis.matrix, row.map(BigInt)) : row.map(BigInt)
    const name = own.join()
    const earlier = first.get(name)
    if (earlier !== undefined) {
      throw new InputError(
        'points.twice',
        `The point (${row.join(', ')}) is listed twice, as point ${earlier} and as point ${index} (counted from 0).`,
        `${section}[${index}]`,
        row,
      )
    }
    first.set(name, index)
    return indexOf.get(name) ?? placeApart(polytope, own, row, `${section}[${index}]`)
  })
}

function placeApart(
  { facets, facetCount }: Polytope,
  own: readonly bigint[],
  row: readonly number[],
  path: string,
): PointPlace {
  if (own.every((entry) => entry === 0n)) return 'origin'
  for (let a = 0; a < facetCount; a++) {
    let value = 0n
    for (let axis = 0; axis < 4; axis++) value += BigInt(facets[4 * a + axis]) * own[axis]
    if (value < -1n) {
      throw new InputError(
        'points.outside',
        `The point (${row.join(', ')}) lies outside the polytope: at lattice distance ${-value - 1n} beyond one of its facets.`,
        path,
        row,
      )
    }
  }
  return 'inside-a-facet'
}
