import { determinant, EigenvalueDecomposition, inverse, Matrix } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import { axionSector, type AxionSector } from '../../../scoring/geometry/axions.ts'
import { chargeMatrix } from '../../../scoring/geometry/chargeMatrix.ts'
import { inverseMetric } from '../../../scoring/geometry/fieldSpaceMetric.ts'
import { sameClass } from '../../../scoring/geometry/instantons.ts'
import { latticeBasis } from '../../../scoring/geometry/latticeBasis.ts'
import { polytopeFromWeights } from '../../../scoring/geometry/weights.ts'
import { referenceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { rankOf } from '../polytope/modularRank.ts'
import { classOf, stagesOf, type Stages } from './stages.ts'

const allOf = ({ polytope }: Stages): Int32Array =>
  Int32Array.from({ length: polytope.pointCount }, (_, p) => p)
const sectorOf = (stages: Stages, scale = 1, candidates = allOf(stages)): AxionSector =>
  axionSector(stages.polytope, stages.pairs, stages.volumes, candidates, scale)
const ofWeights = (...weights: number[]): Stages =>
  stagesOf(referenceClass(polytopeFromWeights(weights, 'fan')))

/** log10 of Lambda for a divisor volume, by the definition. */
const scaleOf = (tau: number, volume: number): number =>
  (Math.log10((8 * Math.PI * tau) / volume ** 2) - 2 * Math.PI * tau * Math.LOG10E) / 4

describe('axions by hand', () => {
  it('one modulus: kinetic term 2 G = 3 / (2 tau^2), so f = sqrt(3/2) / (2 pi tau)', () => {
    const stages = ofWeights(1, 1, 1, 1, 1)
    for (const scale of [1, 1.7]) {
      const tau = stages.volumes.divisors[0] * scale ** 2
      const found = sectorOf(stages, scale)
      const f = Math.sqrt(3 / 2) / (2 * Math.PI * tau)
      const lambda = scaleOf(tau, stages.volumes.total * scale ** 3)
      expect([...found.decayConstants]).toEqual([expect.closeTo(f, 12)])
      expect([...found.logScales]).toEqual([expect.closeTo(lambda, 12)])
      expect([...found.logMasses]).toEqual([expect.closeTo(2 * lambda - Math.log10(f), 12)])
      expect([...found.separations]).toEqual([Infinity])
      expect([...found.divisors[0]]).toEqual([0, 1, 2, 3, 4])
    }
  })

  // With V = 3.5, tau_E = 0.5, tau_L = 2.5 and A_EE = -3, A_EL = 1, A_LL = 1 (from E^3 = 9, L = (H - E) / 3,
  // J = 4/3 H - 1/3 E; Candelas, Font, Katz, Morrison 1994): M / 2 = 2 (tau tau - V A) is 21.5, -4.5, 5.5.
  it('weights (1,1,1,6,9): E first, then L with E frozen', () => {
    const stages = ofWeights(1, 1, 1, 6, 9)
    const found = sectorOf(stages)
    const terms = [21.5, 5.5 - 4.5 ** 2 / 21.5]
    expect([...found.decayConstants]).toEqual(
      terms.map((p) => expect.closeTo(1 / (2 * Math.PI * Math.sqrt(p)), 10)),
    )
    expect([...found.logScales]).toEqual([0.5, 2.5].map((tau) => expect.closeTo(scaleOf(tau, 3.5), 10)))
    expect(found.divisors.map((list) => list.length)).toEqual([1, 3])

    const section = found.divisors[0]
    const alone = sectorOf(stages, 1, section)
    expect([...alone.decayConstants]).toEqual([expect.closeTo(1 / (2 * Math.PI * Math.sqrt(21.5)), 10)])
  })
})

/** Charges of divisors over the lattice basis, one row each. */
function chargesOf({ polytope }: Stages, divisors: readonly number[]): number[][] {
  const { excluded, basis } = latticeBasis(polytope)
  const charges = chargeMatrix(polytope, excluded, basis)
  return divisors.map((p) => [...charges.slice(p * basis.length, (p + 1) * basis.length)])
}

/** M / 2 over divisors, as a full matrix. */
function halfMetric({ pairs, volumes }: Stages, divisors: readonly number[]): Matrix {
  const packed = inverseMetric(pairs, volumes, Int32Array.from(divisors))
  return new Matrix(
    divisors.map((_, a) =>
      divisors.map((__, b) => packed[(Math.max(a, b) * (Math.max(a, b) + 1)) / 2 + Math.min(a, b)] / 2),
    ),
  )
}

describe('axions against other roads', () => {
  const some = ['w3-243', 'w6-90', 'w7-106', 'w9-117', 'w11-491', 'w15-27', 'w25-11'].map((id) =>
    stagesOf(classOf(largePolytope(id).vertices, 4)),
  )

  it('take the divisors that charges make independent, by falling scale', () => {
    for (const stages of some) {
      const { divisors, total } = stages.volumes
      const scale = (p: number): number => scaleOf(divisors[p], total)
      const order = [...allOf(stages)].sort((a, b) => scale(b) - scale(a))
      const chosen: number[] = []
      for (const p of order) {
        if (rankOf(chargesOf(stages, [...chosen, p])) > chosen.length) chosen.push(p)
      }
      const found = sectorOf(stages)
      expect(chosen).toHaveLength(stages.polytope.pointCount - 4)
      expect([...found.logScales]).toEqual(chosen.map((p) => expect.closeTo(scale(p), 6)))
      chosen.forEach((p, a) => expect([...found.divisors[a]]).toContain(p))
    }
  })

  it('have the product of squared masses that the determinant of the mass matrix gives, ties or not', () => {
    let compared = 0
    for (const stages of some) {
      const found = sectorOf(stages)
      // Where every run of tied scales has as many classes as axions, the charges are a square matrix.
      const runs = [...new Map(found.divisors.map((list) => [list.join(), list])).values()]
      const chosen = runs.flatMap((list) =>
        [...list].filter(
          (p, at) => ![...list].slice(0, at).some((other) => sameClass(stages.polytope, other, p)),
        ),
      )
      if (chosen.length !== found.divisors.length) continue
      // m^2 are the eigenvalues of (2 pi)^2 (2 G)^{-1} sum_a Lambda_a^4 q_a q_a^T.
      const logDeterminant = Math.log10(determinant(halfMetric(stages, chosen)))
      const expected =
        logDeterminant +
        2 * chosen.length * Math.log10(2 * Math.PI) +
        4 * found.logScales.reduce((sum, entry) => sum + entry, 0)
      expect(2 * found.logMasses.reduce((sum, entry) => sum + entry, 0)).toBeCloseTo(expected, 6)
      compared++
    }
    expect(compared).toBeGreaterThan(4)
  })

  it('have the masses of the full mass matrix where scales are widely separated', () => {
    // At twice the reference point the scales of the two axions of weights (1,1,1,6,9) differ by a factor 10^21 in the
    // fourth power, and the lighter mass is the determinant over the heavier.
    const stages = ofWeights(1, 1, 1, 6, 9)
    for (const scale of [1, 1.3]) {
      const found = sectorOf(stages, scale)
      const chosen = found.divisors.map((list) => list[0])
      const charges = new Matrix(chargesOf(stages, chosen))
      const { basis } = latticeBasis(stages.polytope)
      const metric = inverse(halfMetric(stages, [...basis]).mul(scale ** 4))
      const strengths = Matrix.diag([...found.logScales].map((log) => 10 ** (4 * log)))
      const masses = inverse(metric)
        .mmul(charges.transpose().mmul(strengths).mmul(charges))
        .mul((2 * Math.PI) ** 2)
      const largest = Math.max(...new EigenvalueDecomposition(masses).realEigenvalues)
      const ratio = 10 ** (4 * (found.logScales[1] - found.logScales[0]))
      expect(10 ** (2 * found.logMasses[0]) / largest).toBeCloseTo(1, 3)
      expect(10 ** (2 * found.logMasses[1]) / (determinant(masses) / largest)).toBeCloseTo(1, 3)
      expect(ratio).toBeLessThan(1e-4)
    }
  })

  it('on fewer divisors are the rank of these, and the axions they share keep their scales', () => {
    for (const stages of some) {
      const all = allOf(stages)
      const candidates = all.filter((p) => p % 3 !== 0)
      const found = sectorOf(stages, 1, candidates)
      expect(found.decayConstants).toHaveLength(rankOf(chargesOf(stages, [...candidates])))
    }
  })
})

describe('linear equivalence of prime toric divisors', () => {
  it('is equality of charges', () => {
    let equal = 0
    for (const id of ['w2-272', 'w9-117', 'w15-27']) {
      const stages = stagesOf(classOf(largePolytope(id).vertices))
      const charges = chargesOf(stages, [...allOf(stages)]).map((row) => row.join())
      charges.forEach((row, a) =>
        charges.slice(0, a).forEach((other, b) => {
          expect(sameClass(stages.polytope, a, b)).toBe(row === other)
          if (row === other) equal++
        }),
      )
    }
    expect(equal).toBeGreaterThan(3)
  })
})
