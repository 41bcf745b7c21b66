import { Matrix, SVD } from 'ml-matrix'
import { InvariantError } from '../errors.ts'
import { chargeMatrix } from './chargeMatrix.ts'
import { factoriseDense } from './denseCholesky.ts'
import { inverseMetric, relationSpace } from './fieldSpaceMetric.ts'
import { largestEigenvalue, type TopEigenvalue } from './lanczos.ts'
import { latticeBasis } from './latticeBasis.ts'
import { MetricFactor } from './metricFactor.ts'
import { removeComponents } from './orthonormal.ts'
import type { Polytope } from './polytope.ts'
import type { PairNumbers, Volumes } from './volumes.ts'

/** Eigenvalues of the field-space metric G in the lattice basis formed by `basis`, ascending. */
export interface BasisSpectrum {
  readonly basis: Int32Array
  readonly eigenvalues: Float64Array
}

/** Relative residual at which the top eigenvalue is accepted; its error is of the order of the square. */
export const topEigenvalueTolerance = 1e-9

/**
 * Largest eigenvalue of the divisor spectrum: of the inverse of M over all points on the complement of the
 * linear relations. M x = b with b in the complement is solved over all points but four independent ones, then
 * projected.
 * That the factorisation succeeds proves, with V > 0, that A has the signature (1, N - 5) beside its kernel:
 * M is positive on the complement of the direction of J, where it is -4 V A. Throws InvariantError otherwise.
 */
export function topEigenvalue(polytope: Polytope, pairs: PairNumbers, volumes: Volumes): TopEigenvalue {
  const { relations, others } = relationSpace(polytope)
  const factor = new MetricFactor(others, pairs, volumes)
  const inner = new Float64Array(others.length)
  return largestEigenvalue(
    polytope.pointCount,
    (x, y) => {
      y.set(x)
      removeComponents(relations, y)
      for (let a = 0; a < others.length; a++) inner[a] = y[others[a]]
      factor.solve(inner, inner)
      y.fill(0)
      for (let a = 0; a < others.length; a++) y[others[a]] = inner[a]
      removeComponents(relations, y)
    },
    topEigenvalueTolerance,
  )
}

/**
 * All N - 4 non-zero eigenvalues of M over all points, inverted, ascending: the generalised eigenvalues of G
 * against Q^T Q, Q the charge matrix. With M over all points but four = L L^T, M over all points is (Q L)(Q L)^T, and
 * the eigenvalues are the squared singular values of Q L: small ones keep twice the digits that an eigenvalue
 * decomposition of M would leave them, and the kernel never enters.
 */
export function divisorSpectrum(polytope: Polytope, pairs: PairNumbers, volumes: Volumes): Float64Array {
  const { anchors, others } = relationSpace(polytope)
  const lower = lowerTriangle(others.length, choleskyOfMetric(pairs, volumes, others))
  const charges = Matrix.from1DArray(
    polytope.pointCount,
    others.length,
    chargeMatrix(polytope, anchors, others),
  )
  return invertedSquares(singularValues(charges.mmul(lower)))
}

/** Eigenvalues of G, the inverse of M over the points of the lattice basis, ascending. */
export function basisSpectrum(polytope: Polytope, pairs: PairNumbers, volumes: Volumes): BasisSpectrum {
  const { basis } = latticeBasis(polytope)
  const lower = lowerTriangle(basis.length, choleskyOfMetric(pairs, volumes, basis))
  return { basis, eigenvalues: invertedSquares(singularValues(lower)) }
}

function choleskyOfMetric(pairs: PairNumbers, volumes: Volumes, points: Int32Array): Float64Array {
  const packed = inverseMetric(pairs, volumes, points)
  if (!factoriseDense(points.length, packed)) {
    throw new InvariantError(
      'The field-space metric is not positive definite: the point lies outside the cone.',
    )
  }
  return packed
}

function lowerTriangle(size: number, packed: Float64Array): Matrix {
  const matrix = Matrix.zeros(size, size)
  for (let i = 0; i < size; i++) for (let j = 0; j <= i; j++) matrix.set(i, j, packed[(i * (i + 1)) / 2 + j])
  return matrix
}

function singularValues(matrix: Matrix): number[] {
  return new SVD(matrix, { computeLeftSingularVectors: false, computeRightSingularVectors: false }).diagonal
}

function invertedSquares(singular: readonly number[]): Float64Array {
  return Float64Array.from(singular, (value) => 1 / (value * value)).sort()
}
