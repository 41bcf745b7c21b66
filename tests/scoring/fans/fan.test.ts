import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fanFromHeights } from '../../../scoring/geometry/fans/fan.ts'
import { facetPoints } from '../../../scoring/geometry/fans/facetPoints.ts'
import { fanFromSimplices } from '../../../scoring/geometry/fans/fanFromSimplices.ts'
import { fanWalls, isStrict, tiedWalls } from '../../../scoring/geometry/fans/fanWalls.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { polytopeFromWeights } from '../../../scoring/geometry/weights.ts'
import { classFromHeights } from '../../../scoring/geometry/twoFaceClass.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { lowerSimplices, rowsOf } from './byDefinition.ts'

const small = ['r2-0011', 'r3-0106', 'r4-0616', 'r4-0841'].map((id) => {
  const found = bundledPolytopes('small').find((entry) => entry.id === id)
  if (found === undefined) throw new Error(`no bundled polytope ${id}`)
  return polytopeFromPoints(found.vertices)
})
const middling = ['w6-90', 'w10-46', 'w20-17'].map((id) => polytopeFromPoints(largePolytope(id).vertices))

/** |v|^2 times a small factor plus small noise: fine, and full of ties in facets. */
function tiedHeights(polytope: Polytope, noise: readonly number[]): number[] {
  return Array.from({ length: polytope.pointCount }, (_, p) => {
    const [x, y, z, w] = polytope.points.subarray(4 * p, 4 * p + 4)
    return 8 * (x * x + y * y + z * z + w * w) + noise[p % noise.length]
  })
}

const noise = fc.array(fc.integer({ min: -1, max: 1 }), { minLength: 1, maxLength: 40 })

describe('the fan of heights', () => {
  it('has the simplices that lie below all other points of their facet', () => {
    fc.assert(
      fc.property(fc.constantFrom(...small, middling[0]), fc.nat(1000), (polytope, seed) => {
        const heights = quadraticHeights(polytope, { seed, noise: 0.45 })
        const fan = fanFromHeights(polytope, heights)
        if (fan === undefined) throw new Error('quadratic heights are fine')
        expect(rowsOf(fan)).toEqual(lowerSimplices(polytope, heights))
        expect(isStrict(fan, heights)).toBe(true)
      }),
      { numRuns: 25 },
    )
  })

  it('is a fine star triangulation over the class, also where heights tie', () => {
    let tied = 0
    fc.assert(
      fc.property(fc.constantFrom(...small, ...middling), noise, (polytope, shifts) => {
        const heights = tiedHeights(polytope, shifts)
        const outcome = classFromHeights(polytope, heights)
        const fan = fanFromHeights(polytope, heights)
        expect(fan !== undefined).toBe(outcome.fine)
        if (fan === undefined || !outcome.fine) return
        expect(fan.class.triangles).toEqual(outcome.class.triangles)
        const again = fanFromSimplices(polytope, rowsOf(fan).reverse())
        expect(again.simplices).toEqual(fan.simplices)
        expect(again.facetOf).toEqual(fan.facetOf)
        expect(again.class.triangles).toEqual(outcome.class.triangles)
        if (tiedWalls(fan, heights).length > 0) tied++
      }),
      { numRuns: 60 },
    )
    expect(tied).toBeGreaterThan(5)
  })

  it('is the same for heights beyond the precision of doubles in a product', () => {
    // Heights near 2^43 tie but for the last bits; times the circuits' coefficients they need more than 53.
    const polytope = normalForm(polytopeFromWeights([1, 1, 1, 6, 9], 'newton')).polytope
    const coarse = tiedHeights(polytope, [0])
    const decided = coarse.map((height, p) => height * 2 ** 31 + ((p * 7919) % 13))
    const fan = fanFromHeights(polytope, decided)
    if (fan === undefined) throw new Error('|v|^2 is fine')
    expect(fanFromSimplices(polytope, rowsOf(fan)).simplices).toEqual(fan.simplices)
    const sum = (values: readonly bigint[]): bigint => values.reduce((a, b) => a + b, 0n)
    for (const { circuit } of fanWalls(fan)) {
      const value = sum(circuit.points.map((p, m) => BigInt(circuit.coefficients[m]) * BigInt(decided[p])))
      expect(value >= 0n).toBe(true)
    }
  })
})

describe('the volumes of facets', () => {
  it('add up to 5 for the simplex of the quintic and to 5^4 for its dual', () => {
    // Five unimodular cones; and the simplex of all monomials of degree 5, whose edges have length 5.
    const volume = (side: 'fan' | 'newton'): number =>
      facetPoints(polytopeFromWeights([1, 1, 1, 1, 1], side)).volumes.reduce((a, b) => a + b)
    expect(volume('fan')).toBe(5)
    expect(volume('newton')).toBe(625)
  })
})
