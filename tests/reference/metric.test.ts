import { EigenvalueDecomposition, Matrix, inverse } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import { chargeMatrix } from '../../scoring/geometry/chargeMatrix.ts'
import { latticeBasis } from '../../scoring/geometry/latticeBasis.ts'
import { basisSpectrum, divisorSpectrum, topEigenvalue } from '../../scoring/geometry/spectra.ts'
import { classOf, stagesOf, volumesAt, type Stages } from '../scoring/cone/stages.ts'
import { largePolytope } from './bundledPolytopes.ts'

const quintic = [
  [1, 0, 0, 0],
  [0, 1, 0, 0],
  [0, 0, 1, 0],
  [0, 0, 0, 1],
  [-1, -1, -1, -1],
]

/** M_ij = 4 (tau_i tau_j - V A_ij) over all points, written out. */
function metricByHand({ polytope, pairs, volumes }: Stages): Matrix {
  const { divisors, total } = volumes
  const matrix = Matrix.zeros(polytope.pointCount, polytope.pointCount)
  pairs.diagonal.forEach((value, i) => matrix.set(i, i, -4 * total * value))
  pairs.offDiagonal.forEach((value, e) => {
    const [i, j] = pairs.edges.subarray(2 * e, 2 * e + 2)
    matrix.set(i, j, -4 * total * value)
    matrix.set(j, i, -4 * total * value)
  })
  divisors.forEach((tau, i) =>
    divisors.forEach((other, j) => matrix.set(i, j, matrix.get(i, j) + 4 * tau * other)),
  )
  return matrix
}

const ascending = (values: readonly number[]): number[] => [...values].sort((a, b) => a - b)
const eigenvalues = (matrix: Matrix): number[] =>
  ascending(new EigenvalueDecomposition(matrix, { assumeSymmetric: true }).realEigenvalues)

/** Rows and columns of the lattice basis. */
function onBasis(matrix: Matrix, basis: Int32Array): Matrix {
  return matrix.selection(Array.from(basis), Array.from(basis))
}

describe('metric of a threefold with one modulus', () => {
  // K = -2 log V and V proportional to tau^(3/2) give K = -3 log tau + const, so G = 1/4 K'' = 3 / (4 tau^2).
  const { polytope, pairs, volumes } = stagesOf(classOf(quintic))
  const tau = volumes.divisors[0]

  it('is G = 3 / (4 tau^2) for the hyperplane divisor', () => {
    expect(Array.from(basisSpectrum(polytope, pairs, volumes).eigenvalues)).toEqual([
      expect.closeTo(3 / (4 * tau * tau), 14),
    ])
  })

  it('is a fifth of that over the five prime divisors, all of the same class', () => {
    // Q is a column of five ones, Q^T Q = 5.
    const expected = expect.closeTo(3 / (20 * tau * tau), 14)
    expect(Array.from(divisorSpectrum(polytope, pairs, volumes))).toEqual([expected])
    expect(topEigenvalue(polytope, pairs, volumes).value).toEqual(expected)
  })
})

describe('field-space metric', () => {
  // Fan and Newton side, favourable or not, h11 from 2 to 50; w18-72 and w40-40 have split divisors.
  const ids = [
    'w2-86',
    'w2-272',
    'w3-243',
    'w6-90',
    'w10-46',
    'w11-491',
    'w18-72',
    'w25-11',
    'w40-40',
    'w50-7',
  ]
  const samples = ids.map((id) => stagesOf(classOf(largePolytope(id).vertices, 6)))

  it('is the matrix of second derivatives of K = -2 log V by tau', () => {
    // Central differences of tau(w) and of dK / d tau_a = -w_a / V, both along the basis directions of w:
    // V = 1/3 sum tau_i w_i and dV = 1/2 w . d tau, so G = 1/4 d(-w / V) / d tau.
    for (const stages of samples.filter(({ polytope }) => polytope.pointCount <= 20)) {
      const { polytope, reference } = stages
      const { basis, excluded } = latticeBasis(polytope)
      const charges = chargeMatrix(polytope, excluded, basis)
      const rank = basis.length
      const at = (shift: number, step: number): { tau: number[]; slope: number[] } => {
        const weights = Float64Array.from(reference.weights)
        if (shift >= 0) weights[basis[shift]] += step
        const { volumes } = volumesAt(stages, weights)
        const slope = Array.from({ length: rank }, (_, a) => {
          let sum = 0
          for (let p = 0; p < polytope.pointCount; p++) sum += charges[p * rank + a] * weights[p]
          return -sum / volumes.total
        })
        return { tau: Array.from(basis, (p) => volumes.divisors[p]), slope }
      }
      const step = 1e-4
      const tauByW = Matrix.zeros(rank, rank)
      const slopeByW = Matrix.zeros(rank, rank)
      for (let b = 0; b < rank; b++) {
        const [up, down] = [at(b, step), at(b, -step)]
        for (let a = 0; a < rank; a++) {
          tauByW.set(a, b, (up.tau[a] - down.tau[a]) / (2 * step))
          slopeByW.set(a, b, (up.slope[a] - down.slope[a]) / (2 * step))
        }
      }
      const differences = slopeByW.mmul(inverse(tauByW)).mul(1 / 4)
      const metric = inverse(onBasis(metricByHand(stages), basis))
      const scale = Math.max(...metric.to1DArray().map(Math.abs))
      metric.to1DArray().forEach((entry, e) => {
        expect(Math.abs(entry - differences.to1DArray()[e])).toBeLessThan(1e-6 * scale)
      })
    }
  })

  it('has the potential with the slope dK / d tau_a = -w_a / V used above', () => {
    const stages = samples[1]
    const { basis, excluded } = latticeBasis(stages.polytope)
    const charges = chargeMatrix(stages.polytope, excluded, basis)
    const step = 1e-5
    for (let b = 0; b < basis.length; b++) {
      const shifted = (size: number): { potential: number; tau: number[] } => {
        const weights = Float64Array.from(stages.reference.weights)
        weights[basis[b]] += size
        const { volumes } = volumesAt(stages, weights)
        return { potential: -2 * Math.log(volumes.total), tau: Array.from(basis, (p) => volumes.divisors[p]) }
      }
      const [up, down] = [shifted(step), shifted(-step)]
      const byWeight = (up.potential - down.potential) / (2 * step)
      const byTau = up.tau.reduce((sum, tau, a) => {
        const slope = stages.reference.weights.reduce((w, x, p) => w + charges[p * basis.length + a] * x, 0)
        return sum - (slope / stages.volumes.total) * ((tau - down.tau[a]) / (2 * step))
      }, 0)
      expect(byWeight).toBeCloseTo(byTau, 7)
    }
  })

  it('is positive definite beside the four linear relations, and A has the signature (1, N - 5)', () => {
    for (const stages of samples) {
      const { polytope, volumes } = stages
      const count = polytope.pointCount
      const metric = metricByHand(stages)
      const values = eigenvalues(metric)
      const rounding = 1e-12 * values[count - 1]
      expect(values.slice(0, 4).every((value) => Math.abs(value) < rounding)).toBe(true)
      expect(values[4]).toBeGreaterThan(100 * rounding)
      const tau = Matrix.columnVector(volumes.divisors)
      const pairing = tau
        .mmul(tau.transpose())
        .mul(4)
        .sub(metric)
        .div(4 * volumes.total)
      const spectrum = eigenvalues(pairing)
      const zero = 1e-11 * Math.max(...spectrum.map(Math.abs))
      expect(spectrum.filter((value) => value > zero)).toHaveLength(1)
      expect(spectrum.filter((value) => value < -zero)).toHaveLength(count - 5)
    }
  })

  it('has as divisor spectrum the generalised eigenvalues of G against Q^T Q', () => {
    for (const stages of samples) {
      const { polytope, pairs, volumes } = stages
      const { basis, excluded } = latticeBasis(polytope)
      const charges = Matrix.from1DArray(
        polytope.pointCount,
        basis.length,
        chargeMatrix(polytope, excluded, basis),
      )
      // G x = mu Q^T Q x has the eigenvalues of (Q^T Q)^(-1) G, here by the symmetric square root of Q^T Q.
      const gram = new EigenvalueDecomposition(charges.transpose().mmul(charges), { assumeSymmetric: true })
      const root = gram.eigenvectorMatrix
        .mmul(Matrix.diag(gram.realEigenvalues.map((value) => 1 / Math.sqrt(value))))
        .mmul(gram.eigenvectorMatrix.transpose())
      const metric = inverse(onBasis(metricByHand(stages), basis))
      const expected = eigenvalues(root.mmul(metric).mmul(root))
      const found = divisorSpectrum(polytope, pairs, volumes)
      expect(found).toHaveLength(basis.length)
      found.forEach((value, a) => expect(Math.abs(value / expected[a] - 1)).toBeLessThan(1e-6))
    }
  })

  it('has the largest of the divisor spectrum as top eigenvalue', () => {
    for (const { polytope, pairs, volumes } of samples) {
      const spectrum = divisorSpectrum(polytope, pairs, volumes)
      const top = topEigenvalue(polytope, pairs, volumes)
      expect(top.value / spectrum[spectrum.length - 1]).toBeCloseTo(1, 12)
      expect(top.residual).toBeLessThan(1e-9)
      expect(Array.from(spectrum)).toEqual(ascending(Array.from(spectrum)))
    }
  })

  it('has as basis spectrum the eigenvalues of G in the lattice basis', () => {
    for (const stages of samples) {
      const { eigenvalues: found, basis } = basisSpectrum(stages.polytope, stages.pairs, stages.volumes)
      const expected = eigenvalues(inverse(onBasis(metricByHand(stages), basis)))
      found.forEach((value, a) => expect(Math.abs(value / expected[a] - 1)).toBeLessThan(1e-6))
    }
  })

  it('agrees at h11 = 491 between the sparse and the dense road', () => {
    // Tr G^-1 and the top eigenvalue from the full spectrum.
    const { polytope, pairs, volumes } = stagesOf(classOf(largePolytope('w491-11').vertices, 1))
    const spectrum = divisorSpectrum(polytope, pairs, volumes)
    const top = topEigenvalue(polytope, pairs, volumes)
    expect(spectrum).toHaveLength(491)
    expect(top.value / spectrum[490]).toBeCloseTo(1, 11)
    const trace = volumes.divisors.reduce(
      (sum, tau, i) => sum + 4 * (tau * tau - volumes.total * pairs.diagonal[i]),
      0,
    )
    expect(spectrum.reduce((sum, value) => sum + 1 / value, 0) / trace).toBeCloseTo(1, 11)
  })
})
