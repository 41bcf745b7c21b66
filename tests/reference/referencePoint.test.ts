import { describe, expect, it } from 'vitest'
import { curveRows } from '../../scoring/geometry/curves.ts'
import { quadraticHeights } from '../../scoring/geometry/heights.ts'
import { intersectionNumbers } from '../../scoring/geometry/intersectionNumbers.ts'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { referencePoint } from '../../scoring/geometry/referencePoint.ts'
import { classFromHeights } from '../../scoring/geometry/twoFaceClass.ts'
import { volumes } from '../../scoring/geometry/volumes.ts'

function atReference(vertices: number[][]) {
  const polytope = polytopeFromPoints(vertices)
  const outcome = classFromHeights(polytope, quadraticHeights(polytope))
  if (!outcome.fine) throw new Error('heights |v|^2 are fine')
  const numbers = intersectionNumbers(outcome.class)
  const curves = curveRows(outcome.class, numbers)
  const reference = referencePoint(outcome.class, numbers, curves)
  return { polytope, numbers, reference, volumes: volumes(numbers, curves, reference.weights) }
}

const unit = [0, 1, 2, 3].map((i) => [0, 1, 2, 3].map((j) => (i === j ? 1 : 0)))

/** The tau of the prime divisors, largest first. */
function divisorVolumes(values: Float64Array): number[] {
  return Array.from(values).sort((a, b) => b - a)
}

describe('reference point of the quintic', () => {
  // One modulus: the curve H.H.H of degree 5 has the primitive class with H . C = 1, so w = H at scale 1, spread
  // evenly over five points: V = 5/6, tau = 5/2 for each of the five hyperplane sections.
  const quintic = atReference([...unit, [-1, -1, -1, -1]])

  it('lies where the line has volume one', () => {
    expect(Array.from(quintic.reference.weights)).toEqual(Array(5).fill(expect.closeTo(0.2, 13)))
    expect(quintic.volumes.total).toBeCloseTo(5 / 6, 13)
    expect(divisorVolumes(quintic.volumes.divisors)).toEqual(Array(5).fill(expect.closeTo(2.5, 12)))
    expect(quintic.reference.edgeCurvesSuffice).toBe(true)
  })
})

describe('reference point of the hypersurface of degree 18 in P(1,1,1,6,9)', () => {
  // Candelas, Font, Katz, Morrison 1994 (hep-th/9403187): H^3 = 9, H^2 L = 3, H L^2 = 1, H = 3L + E. The values at
  // the reference point follow from them by hand.
  const fibred = atReference([...unit, [-9, -6, -1, -1]].map(([a, b, c, d]) => [a, b, c, d]))

  it('has volume 7/2 and divisor volumes 24, 16, 5/2, 5/2, 5/2, 1/2', () => {
    expect(fibred.volumes.total).toBeCloseTo(3.5, 12)
    const expected = [24, 16, 2.5, 2.5, 2.5, 0.5]
    expect(divisorVolumes(fibred.volumes.divisors)).toEqual(expected.map((tau) => expect.closeTo(tau, 11)))
  })

  it('satisfies V = sqrt(2)/9 (tau_H^(3/2) - tau_E^(3/2)), with tau_H half of tau_2H', () => {
    const sorted = divisorVolumes(fibred.volumes.divisors)
    const tauH = sorted[1] / 2
    const tauE = sorted[5]
    expect(tauH).toBeCloseTo(8, 11)
    expect(fibred.volumes.total).toBeCloseTo((Math.SQRT2 / 9) * (tauH ** 1.5 - tauE ** 1.5), 12)
  })
})
