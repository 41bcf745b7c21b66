import { equality, equalLists, type CheckList } from './check.ts'
import type { Claims } from './claims.ts'
import { checkCoordinates } from './determinants.ts'
import { keyOfVertices } from './keys.ts'
import {
  pointDifferences,
  pointFigures,
  readPolytope,
  type PointFigures,
  type PolytopeReading,
} from './polytopeReading.ts'

export interface CertifiedPolytope {
  readonly reading: PolytopeReading
  readonly figures: PointFigures
}

/** The polytope as read from the vertices alone, against what is claimed; undefined when later checks make no sense. */
export function checkPolytope(claims: Claims, checks: CheckList): CertifiedPolytope | undefined {
  const { vertices, points, numbers } = claims
  const reading = checks.run('reflexive', () => {
    checkCoordinates(vertices, 'vertices')
    const value = readPolytope(vertices)
    const corners = value.boundary.filter(({ dimension }) => dimension === 0)
    const proper = corners.length === vertices.length
    return {
      ...equality(numbers.facets, value.normals.length),
      passed: proper && numbers.facets === value.normals.length,
      note: proper
        ? `${vertices.length} vertices; every facet at lattice distance one; lattice volume ${value.volume}.`
        : `Of the ${vertices.length} vertices given only ${corners.length} are vertices.`,
      value,
    }
  })
  if (reading === undefined) return undefined
  checks.run('polytope-key', () => equality(claims.polytopeKey, keyOfVertices(vertices)))
  checks.run('faces', () =>
    equality(
      `${numbers.faces.edges}, ${numbers.faces.twoFaces}`,
      `${reading.edges}, ${reading.twoFaces}`,
      'Edges, 2-faces.',
    ),
  )
  checks.run('normalised-volumes', () =>
    equality(
      `${numbers.normalisedVolumes.own}, ${numbers.normalisedVolumes.dual}`,
      `${reading.volume}, ${reading.dualVolume}`,
    ),
  )
  checks.run('lattice-points', () => equality(numbers.latticePoints, reading.boundary.length + 1))
  checks.run('dual-lattice-points', () =>
    equality(numbers.dualLatticePoints, reading.dualBoundary.length + 1),
  )
  const { hodge } = reading
  checks.run('hodge', () =>
    equality(`${numbers.hodge.h11}, ${numbers.hodge.h21}`, `${hodge.h11}, ${hodge.h21}`),
  )
  checks.run('favourable', () =>
    equality(
      numbers.favourable ? 'favourable' : 'not favourable',
      reading.favourable ? 'favourable' : 'not favourable',
      reading.favourable ? '' : 'The certificate covers the toric part of H11.',
    ),
  )
  const figures = checks.run('points', () => {
    checkCoordinates(points, 'points')
    const { missing, foreign, twice } = pointDifferences(reading, points)
    const first = (list: readonly (readonly number[])[], what: string): string[] =>
      list.length === 0 ? [] : [`${what}: (${list[0].join(', ')})`]
    const ordered = vertices.every((vertex, n) => points[n]?.join() === vertex.join())
    const wrong = [
      ...first(missing, 'missing'),
      ...first(foreign, 'no lattice point outside the insides of facets'),
      ...first(twice, 'listed twice'),
      ...(ordered ? [] : ['the list does not begin with the vertices']),
    ]
    const found = reading.boundary.filter(({ dimension }) => dimension < 3).length
    return {
      passed: wrong.length === 0,
      fast: points.length,
      independent: found,
      note: wrong.length === 0 ? 'The same set of points.' : `${wrong.join('; ')}.`,
      ...(wrong.length === 0 && { value: pointFigures(reading, points) }),
    }
  })
  if (figures === undefined) return undefined
  checks.run('carriers', () => equalLists(numbers.carriers, figures.dimension, 'Dimension of the carrier'))
  checks.run('components', () => equalLists(numbers.components, figures.components, 'Components'))
  checks.run('dual-interior', () =>
    equalLists(numbers.dualInterior, figures.dualInterior, 'Points inside the dual face'),
  )
  return { reading, figures }
}
