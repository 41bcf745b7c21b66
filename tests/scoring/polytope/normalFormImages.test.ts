import { uniformInt } from 'pure-rand/distribution/uniformInt'
import { describe, expect, it } from 'vitest'
import { noiseGenerator } from '../../../scoring/geometry/heights.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { dualPolytope, polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { bundled } from './bundled.ts'
import { rowsOfFour, transformed, type RowOperation } from './unimodular.ts'

/** Every so many polytopes of the bundled lists, and mirrors of those with h11 = 5 that have 18 vertices or more. */
function fiftyPolytopes(): Polytope[] {
  const spread = [...bundled('small'), ...bundled('large').filter(({ h11 }) => h11 <= 60)]
  const step = Math.floor(spread.length / 38)
  const own = spread.filter((_, n) => n % step === 0).slice(0, 38)
  const mirrors = [
    '0200',
    '0270',
    '0543',
    '0634',
    '0690',
    '0704',
    '0921',
    '1166',
    '1705',
    '2272',
    '2398',
    '1593',
  ]
  return [
    ...own.map(({ vertices }) => polytopeFromPoints(vertices)),
    ...bundled('h11-5')
      .filter(({ id }) => mirrors.includes(id.slice(-4)))
      .map(({ vertices }) => dualPolytope(polytopeFromPoints(vertices))),
  ]
}

describe('the normal form', () => {
  it('is one for 20 random images under GL(4,Z) of each of 50 polytopes, vertices shuffled', () => {
    const generator = noiseGenerator(1)
    const below = (bound: number): number => uniformInt(generator, 0, bound - 1)
    const polytopes = fiftyPolytopes()
    expect(polytopes.length).toBe(50)
    expect(polytopes.filter(({ vertexCount }) => vertexCount >= 18).length).toBe(12)
    for (const polytope of polytopes) {
      const { key, polytope: normal, automorphisms } = normalForm(polytope)
      const vertices = rowsOfFour(polytope.points.subarray(0, 4 * polytope.vertexCount))
      for (let image = 0; image < 20; image++) {
        const operations = Array.from({ length: 12 }, (): RowOperation => ({
          to: below(4),
          from: below(4),
          factor: below(5) - 2,
        }))
        const images = transformed(vertices, operations)
        for (let n = images.length - 1; n > 0; n--) {
          const other = below(n + 1)
          ;[images[n], images[other]] = [images[other], images[n]]
        }
        const form = normalForm(polytopeFromPoints(images))
        expect(form.key).toBe(key)
        expect(form.polytope.points).toEqual(normal.points)
        expect(form.automorphisms.length).toBe(automorphisms.length)
      }
    }
  })
})
