import { describe, expect, it } from 'vitest'
import { certify } from '../../scoring/certificates/certify.ts'
import { certificateRequest } from '../../scoring/certificates/requestOfInput.ts'
import { bundledPolytopes } from './bundledPolytopes.ts'

const heights = { seed: 1, noise: 0.3 }

/** A certificate of the fan polytope of weights; its c2 and kappa have been found by the independent road, too. */
function certified(weights: number[]) {
  const certificate = certify(certificateRequest({ weights, side: 'fan', heights }))
  expect(certificate.checks.filter(({ result }) => result !== 'pass')).toEqual([])
  const { hodge, c2, intersections, volumes } = certificate.numbers
  const cubes = c2.map((_, p) => intersections.find(([i, , k]) => i === p && k === p)?.[3] ?? 0)
  return { hodge, volumes, divisors: c2.map((chern, p) => [cubes[p], chern]) }
}

describe('certified numbers of known geometries', () => {
  it('quintic: H^3 = 5, c2 . H = 50, chi = -200 (Candelas, de la Ossa, Green, Parkes 1991)', () => {
    const { hodge, divisors } = certified([1, 1, 1, 1, 1])
    expect(hodge).toEqual({ h11: 1, h21: 101, euler: -200 })
    expect(divisors).toEqual(Array.from({ length: 5 }, () => [5, 50]))
  })

  it('(2,86): exceptional divisor E^3 = -16, c2 . E = 8 (Candelas, de la Ossa, Font, Katz, Morrison 1993)', () => {
    const { hodge, divisors } = certified([1, 1, 2, 2, 2])
    expect(hodge).toEqual({ h11: 2, h21: 86, euler: -168 })
    expect(divisors).toContainEqual([-16, 8])
    // H^3 = 8, c2 . H = 56, three times; L^3 = 0, c2 . L = 24, twice.
    expect(divisors.filter(([cube, chern]) => cube === 8 && chern === 56).length).toBe(3)
    expect(divisors.filter(([cube, chern]) => cube === 0 && chern === 24).length).toBe(2)
  })

  it('(2,272): section E^3 = 9, c2 . E = -6 (Candelas, Font, Katz, Morrison 1994); V = 3.5 by hand from the row', () => {
    const { divisors, volumes } = certified([1, 1, 1, 6, 9])
    expect(divisors).toContainEqual([9, -6])
    expect(volumes.total).toBeCloseTo(3.5, 12)
    expect([...volumes.divisors].map((tau) => +tau.toFixed(9)).sort((a, b) => a - b)).toEqual([
      0.5, 2.5, 2.5, 2.5, 16, 24,
    ])
  })
})

describe('both roads agree', () => {
  it('on every thirtieth polytope with h11 <= 3 and every fourhundredth with h11 = 4', () => {
    const small = bundledPolytopes('small')
    const sample = [
      ...small.filter(({ h11 }) => h11 <= 3).filter((_, n) => n % 30 === 0),
      ...small.filter(({ h11 }) => h11 === 4).filter((_, n) => n % 400 === 0),
    ]
    for (const { id, vertices } of sample) {
      const { checks } = certify(certificateRequest({ vertices, heights, rule: 'score metric.basis.top' }))
      expect([id, checks.filter(({ result }) => result !== 'pass')]).toEqual([id, []])
    }
  })
})
