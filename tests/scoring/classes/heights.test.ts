import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { classFromTriangles } from '../../../scoring/geometry/classFromTriangles.ts'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { heightBound } from '../../../scoring/geometry/faceSheets.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { classFromHeights, referenceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { polygonAlone, rectangle } from './polygonAlone.ts'
import { codeOf, isomorphicCopy, unimodular } from './copies.ts'
import { transportClass, transportHeights } from '../../../scoring/geometry/transport.ts'

const small = bundledPolytopes('small')
const anyPolytope = fc.nat(small.length - 1).map((n) => polytopeFromPoints(small[n].vertices))
const noise = fc.double({ min: 0, max: 0.499, noNaN: true })

describe('quadratic heights', () => {
  it('are fine with any seed, noise and form', () => {
    fc.assert(
      fc.property(
        anyPolytope,
        fc.integer(),
        noise,
        fc.constantFrom('euclidean', 'facets'),
        (polytope, seed, size, form) => {
          const heights = quadraticHeights(polytope, { seed, noise: size, form })
          const outcome = classFromHeights(polytope, heights)
          expect(outcome.fine).toBe(true)
          if (outcome.fine) expect(isGeneric(outcome.class, heights)).toBe(true)
        },
      ),
    )
  })

  it('are fine on the largest polytope and reach many classes there', () => {
    // In the reduced coordinates of the normal form; in elongated ones the form outweighs the noise.
    const { polytope } = normalForm(polytopeFromPoints(largePolytope('w491').vertices))
    const classes = new Set<string>()
    for (let seed = 0; seed < 20; seed++) {
      const outcome = classFromHeights(polytope, quadraticHeights(polytope, { seed, noise: 0.49 }))
      expect(outcome.fine).toBe(true)
      if (outcome.fine) classes.add(outcome.class.triangles.join())
    }
    expect(classes.size).toBe(20)
  })

  it("of the form 'facets' give the image of the class in other coordinates", () => {
    fc.assert(
      fc.property(anyPolytope, unimodular, (polytope, matrix) => {
        const copy = isomorphicCopy(polytope, matrix)
        const heights = quadraticHeights(polytope, { form: 'facets' })
        const outcome = classFromHeights(copy.polytope, transportHeights(heights, copy.permutation))
        const moved = transportClass(referenceClass(polytope), copy.permutation, copy.polytope)
        expect(outcome.fine && outcome.class.triangles).toEqual(moved.triangles)
      }),
      { numRuns: 50 },
    )
  })

  it('refuse noise of half a step', () => {
    const polytope = polytopeFromPoints(small[0].vertices)
    expect(codeOf(() => quadraticHeights(polytope, { noise: 0.5 }))).toBe('heights.noise')
    expect(codeOf(() => quadraticHeights(polytope, { noise: Number.NaN }))).toBe('heights.noise')
    expect(codeOf(() => quadraticHeights(polytope, { seed: 0.5 }))).toBe('heights.seed')
  })
})

describe('heights that cannot be used', () => {
  const polytope = polytopeFromPoints(small[10].vertices)
  const good = Array.from(quadraticHeights(polytope))

  it('are refused by count, kind and size, naming the one at fault', () => {
    expect(codeOf(() => classFromHeights(polytope, good.slice(1)))).toBe('heights.wrong-count')
    expect(codeOf(() => classFromHeights(polytope, good.with(2, 0.5)))).toBe('heights.not-integers')
    expect(codeOf(() => classFromHeights(polytope, good.with(2, heightBound(polytope) + 1)))).toBe(
      'heights.too-large',
    )
    try {
      classFromHeights(polytope, good.with(2, Number.NaN))
    } catch (error) {
      expect(error).toBeInstanceOf(InputError)
      expect((error as InputError).path).toBe('heights[2]')
    }
  })

  it('are bounded by 2^44, less on wide polygons, where circuits would lose exactness', () => {
    expect(heightBound(polytope)).toBe(2 ** 44)
    const wide = polygonAlone(rectangle(1, 1000))
    expect(heightBound(wide)).toBeLessThan(2 ** 42)
    expect(heightBound(wide) * 4 * 1001).toBeLessThanOrEqual(2 ** 53)
    // The same strip in a sheared basis is as wide: the basis is reduced first.
    const sheared = polygonAlone(
      rectangle(1, 1000).map(([x, y]) => [x + 5 * y, y + 3 * (x + 5 * y)] as const),
    )
    expect(heightBound(sheared)).toBe(heightBound(wide))
  })
})

describe('a class from triangles', () => {
  const polytope = polytopeFromPoints(largePolytope('w10-46').vertices)
  const { triangles, faceOf } = referenceClass(polytope)

  it('is the class, in whatever order the triangles and their points come', () => {
    const shuffled = Array.from(triangles).reverse()
    const cls = classFromTriangles(polytope, shuffled)
    expect(cls.triangles).toEqual(triangles)
    expect(cls.faceOf).toEqual(faceOf)
  })

  it('is refused when triangles are missing, repeated, coarse, off the faces or name no points', () => {
    const list = Array.from(triangles)
    const code = (changed: number[]): string => codeOf(() => classFromTriangles(polytope, changed))
    expect(code(list.slice(3))).toBe('triangles.gap')
    expect(code(list.with(0, polytope.pointCount))).toBe('triangles.no-such-point')
    expect(code(list.with(0, list[1]))).toBe('triangles.repeated-point')
    expect(code([...list.slice(3), ...list.slice(3, 6)])).toBe('triangles.twice')
    const face = polytope.twoFaces.findIndex(({ area, corners }) => area > 1 && corners.length === 3)
    const at = 3 * Array.from(faceOf).indexOf(face)
    const whole = Array.from(polytope.twoFaces[face].corners)
    expect(code([...list.slice(0, at), ...whole, ...list.slice(at + 3)])).toBe('triangles.not-unimodular')
    const apart = [...Array(polytope.pointCount).keys()].find((p) =>
      polytope.twoFaces.every(
        ({ points }) => !(points.includes(list[1]) && points.includes(list[2]) && points.includes(p)),
      ),
    )
    if (apart === undefined) throw new Error('some point shares no 2-face with the edge')
    expect(code(list.with(0, apart))).toBe('triangles.not-on-a-face')
  })
})
