import { describe, expect, it } from 'vitest'
import { facetNormals } from '../../../scoring/certify/facets.ts'
import {
  facetsAreGeneric,
  pointsOnFacets,
  triangulateFacet,
} from '../../../scoring/certify/facetTriangulation.ts'
import { liftedPoints } from '../../../scoring/certify/liftedSimplex.ts'
import { latticeVolume, simplexVolume } from '../../../scoring/certify/pullingTriangulation.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { globalIntersectionNumbers } from '../../reference/globalIntersection.ts'
import { genericHeights, plain, type PlainPolytope } from './samples.ts'

function triangulation({ vertices, points }: PlainPolytope, heights: number[]): number[][] {
  const onFacets = pointsOnFacets(points, facetNormals(vertices))
  const lifted = liftedPoints(points, heights)
  return onFacets.flatMap((_, facet) => {
    const outcome = triangulateFacet(lifted, onFacets, facet)
    if (!outcome.generic) throw new Error(`tied: ${outcome.tied.join()}`)
    return outcome.simplices.map((simplex) => [...simplex])
  })
}

describe('the triangulation of facets', () => {
  it('has the simplices that trying all of them finds', () => {
    for (const { vertices } of bundledPolytopes('small').filter((_, n) => n % 197 === 0)) {
      const sample = plain(vertices)
      const heights = genericHeights(sample)
      const tried = globalIntersectionNumbers(sample.points, heights)?.cones.map((cone) => cone.join())
      expect(
        triangulation(sample, heights)
          .map((simplex) => simplex.join())
          .sort(),
      ).toEqual(tried?.sort())
    }
  })

  it('fills the polytope and uses every point', () => {
    for (const id of ['w12-30', 'w18-18', 'w40-24', 'w143-143']) {
      const sample = plain(largePolytope(id).vertices)
      const simplices = triangulation(sample, genericHeights(sample))
      const { points, vertices } = sample
      const filled = simplices.reduce((sum, simplex) => sum + simplexVolume(points, simplex), 0)
      expect(filled).toBe(latticeVolume(vertices, facetNormals(vertices)))
      expect(new Set(simplices.flat()).size).toBe(points.length)
    }
  })

  it('is refused for heights that tie on a facet', () => {
    const sample = plain(largePolytope('w7-47').vertices)
    const { points, vertices } = sample
    const squares = points.map((point) => point.reduce((sum, entry) => sum + entry * entry, 0))
    expect(facetsAreGeneric(vertices, points, squares)).toBe(false)
    expect(facetsAreGeneric(vertices, points, genericHeights(sample))).toBe(true)
    // A linear function added changes nothing, however large the heights become.
    const tilted = (heights: number[]) => heights.map((height, p) => height + 2 ** 46 * points[p][0])
    expect(facetsAreGeneric(vertices, points, tilted(squares))).toBe(false)
    expect(facetsAreGeneric(vertices, points, tilted(genericHeights(sample)))).toBe(true)
  })

  it('is refused for a cube all of whose points have one height', () => {
    // The cube [-1, 1]^4 has square 2-faces, whose middle points make the circuits of unit squares.
    const corners = [...Array(16).keys()].map((n) => [0, 1, 2, 3].map((bit) => ((n >> bit) & 1 ? 1 : -1)))
    const sample = plain(corners)
    const heights = genericHeights(sample)
    expect(facetsAreGeneric(sample.vertices, sample.points, heights)).toBe(true)
    const flat = sample.points.map(() => 0)
    expect(facetsAreGeneric(sample.vertices, sample.points, flat)).toBe(false)
  })
})
