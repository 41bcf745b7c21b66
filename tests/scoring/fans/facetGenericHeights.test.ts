import { describe, expect, it } from 'vitest'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { facetGenericHeights, isFacetGeneric } from '../../../scoring/geometry/fans/facetGenericHeights.ts'
import { fanOverClass } from '../../../scoring/geometry/fans/fan.ts'
import { tiedWalls } from '../../../scoring/geometry/fans/fanWalls.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { facetsAreGeneric } from '../../../scoring/certify/facetTriangulation.ts'
import { bundledPolytopes } from '../../reference/bundledPolytopes.ts'
import { codeOf } from '../classes/copies.ts'

/** Bundled polytopes, every 40th, in normal form. */
const sample = [...bundledPolytopes('small'), ...bundledPolytopes('large').filter(({ h11 }) => h11 < 60)]
  .filter((_, n) => n % 40 === 0)
  .map(({ vertices }) => normalForm(polytopeFromPoints(vertices)).polytope)

/** |v|^2: fine, with all its ties. */
const squares = ({ points, pointCount }: Polytope): number[] =>
  Array.from({ length: pointCount }, (_, p) =>
    points.subarray(4 * p, 4 * p + 4).reduce((sum, entry) => sum + entry * entry, 0),
  )

describe('heights without ties in facets', () => {
  it('give the same class, and the same each time, where |v|^2 ties in most polytopes with walls', () => {
    let tied = 0
    for (const polytope of sample) {
      const heights = squares(polytope)
      const cls = fineClass(polytope, heights)
      if (cls === undefined) throw new Error('|v|^2 is fine')
      if (tiedWalls(fanOverClass(cls, heights), heights).length > 0) tied++
      const found = facetGenericHeights(polytope, heights)
      expect(found).toEqual(facetGenericHeights(polytope, heights))
      expect(fineClass(polytope, found)?.triangles).toEqual(cls.triangles)
      expect(isGeneric(cls, found)).toBe(true)
      expect(isFacetGeneric(cls, found)).toBe(true)
      // The certifying road, which shares no code, sees no tie either.
      const rows = (flat: Int32Array): number[][] =>
        Array.from({ length: flat.length / 4 }, (_, n) => [...flat.subarray(4 * n, 4 * n + 4)])
      const vertices = rows(polytope.points.subarray(0, 4 * polytope.vertexCount))
      expect(facetsAreGeneric(vertices, rows(polytope.points), [...found])).toBe(true)
    }
    expect(tied).toBeGreaterThan(10)
  })

  it('are left as they are when they do not tie', () => {
    const polytope = sample[sample.length - 1]
    const found = facetGenericHeights(polytope, squares(polytope))
    expect(facetGenericHeights(polytope, found)).toEqual(found)
  })

  it('are refused for heights that are not fine', () => {
    const flat = sample.find(({ pointCount, vertexCount }) => pointCount > vertexCount)
    if (flat === undefined) throw new Error('some polytope has points that are no vertices')
    const heights = Array.from({ length: flat.pointCount }, () => 0)
    expect(codeOf(() => facetGenericHeights(flat, heights))).toBe('heights.not-fine')
  })
})
