import { InputError } from '../errors.ts'
import type { PlacedPoints } from './placedPoints.ts'

type Kind = 'simplices' | 'triangles'

/**
 * Simplices or triangles in indices of the polytope's points. The origin is taken out of simplices that name it.
 *
 * @throws InputError KIND.wrong-shape, KIND.no-such-point, KIND.point-twice, KIND.inside-a-facet,
 *   simplices.not-star, triangles.origin; paths `simplices[3]`
 */
export function placedRows(
  placed: PlacedPoints,
  kind: Kind,
  rows: readonly (readonly number[])[],
): number[][] {
  const { places, listed } = placed
  const single = kind === 'simplices' ? 'simplex' : 'triangle'
  const withOrigin = places.includes('origin')
  return rows.map((row, n) => {
    const path = `${kind}[${n}]`
    const fail = (code: string, what: string): never => {
      throw new InputError(
        `${kind}.${code}`,
        `${capital(single)} ${n + 1} (${row.join(', ')}) ${what}.`,
        path,
        row,
      )
    }
    if (kind === 'triangles' && row.length !== 3) fail('wrong-shape', `has ${row.length} corners, and not 3`)
    if (kind === 'simplices' && row.length !== 4 && row.length !== 5) {
      fail('wrong-shape', `has ${row.length} corners; give 4 (the origin implied) or 5`)
    }
    const strange = row.find((index) => !Number.isInteger(index) || index < 0 || index >= places.length)
    if (strange !== undefined) {
      const list = listed ? 'the list of points' : 'the points of the polytope'
      fail('no-such-point', `names point ${strange}; ${list} runs from 0 to ${places.length - 1}`)
    }
    if (new Set(row).size !== row.length) fail('point-twice', 'has a corner twice')
    const inside = row.find((index) => places[index] === 'inside-a-facet')
    if (inside !== undefined) {
      fail(
        'inside-a-facet',
        `uses point ${inside}, which lies inside a facet; such points do not meet the hypersurface and are not used here. Give the triangles of the 2-faces instead`,
      )
    }
    const origins = row.filter((index) => places[index] === 'origin').length
    if (kind === 'triangles' && origins > 0)
      fail('origin', 'has the origin as a corner; triangles lie on 2-faces')
    if (kind === 'simplices' && row.length === 5 && origins === 0) {
      const why = withOrigin ? 'the triangulation is not star' : 'no point of the list is the origin'
      fail('not-star', `has five corners and none of them is the origin: ${why}`)
    }
    if (kind === 'simplices' && row.length === 4 && origins > 0) {
      fail('wrong-shape', 'has the origin among 4 corners: it is not four-dimensional')
    }
    return row.map((index) => places[index]).filter((place) => typeof place === 'number')
  })
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)
