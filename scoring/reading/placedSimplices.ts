import { InputError } from '../errors.ts'
import { originIndex } from '../geometry/fans/fanFromSimplices.ts'
import type { GivenCandidate } from './given.ts'
import type { PlacedPoints } from './placedPoints.ts'

type Kind = 'simplices' | 'triangles'

/**
 * Simplices or triangles in indices of the polytope's points, `originIndex` for the origin. What indices cannot tell
 * is refused here; whether they make a triangulation is for `heightsOfSimplices` and `heightsOfTriangles` to prove.
 *
 * @throws InputError KIND.no-such-point, KIND.inside-a-facet, simplices.no-origin, triangles.origin; paths
 *   `simplices[3]`
 */
export function placedRows(
  { places, listed, nameOf }: PlacedPoints,
  kind: Kind,
  rows: readonly (readonly number[])[],
  naming: GivenCandidate['naming'],
): number[][] {
  const single = kind === 'simplices' ? 'Simplex' : 'Triangle'
  const withOrigin = places.includes('origin')
  const first = naming === 'coordinates' ? 0 : naming
  return rows.map((row, n) => {
    const labels = row.map((index) => {
      const place = places[index]
      return naming === 'coordinates' && typeof place === 'number' ? nameOf(place) : String(index + first)
    })
    const fail = (code: string, what: string): never => {
      throw new InputError(
        `${kind}.${code}`,
        `${single} ${n} (${labels.join(', ')}) ${what}.`,
        `${kind}[${n}]`,
        row,
      )
    }
    const strange = row.find((index) => !Number.isInteger(index) || index < 0 || index >= places.length)
    if (strange !== undefined) {
      const list = listed ? 'the list of points' : 'the points of the polytope'
      fail(
        'no-such-point',
        `names point ${strange + first}; ${list} runs from ${first} to ${places.length - 1 + first}`,
      )
    }
    const inside = row.find((index) => places[index] === 'inside-a-facet')
    if (inside !== undefined) {
      fail(
        'inside-a-facet',
        `uses point ${inside + first}, which lies inside a facet; such points do not meet the hypersurface and do not count here. Give the triangles of the 2-faces instead`,
      )
    }
    if (kind === 'triangles' && row.some((index) => places[index] === 'origin')) {
      fail('origin', 'has the origin as a corner; triangles lie on 2-faces')
    }
    if (kind === 'simplices' && row.length === 5 && !withOrigin) {
      fail(
        'no-origin',
        'has five corners, but no point of the list is the origin: the triangulation is not star, or the list is not complete',
      )
    }
    return row.map((index) => {
      const place = places[index]
      return typeof place === 'number' ? place : originIndex
    })
  })
}
