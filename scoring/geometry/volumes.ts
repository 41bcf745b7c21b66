import { InvariantError } from '../errors.ts'
import type { CurveRows } from './curves.ts'
import { edgeRow, type IntersectionNumbers } from './intersectionNumbers.ts'
import { timesColumn } from './sparseRows.ts'

/** Einstein-frame volumes in units 2 pi sqrt(alpha') = 1, leading order, at one Kaehler class. */
export interface Volumes {
  /** Volume of the threefold, 1/6 J^3. */
  readonly total: number
  /** tau_i per point (sum over components of a split divisor). */
  readonly divisors: Float64Array
  /** Volume of each row of CurveRows. */
  readonly curves: Float64Array
}

/**
 * The symmetric matrix A_ij = D_i . D_j . J over all points: `diagonal[i]` = A_ii, and `offDiagonal[e]` = A_ij
 * for edge e = (i, j) of the class, as listed in `edges`; all other entries vanish.
 */
export interface PairNumbers {
  readonly edges: Int32Array
  readonly diagonal: Float64Array
  readonly offDiagonal: Float64Array
}

/** A_ij = sum_k kappa_ijk w_k at the Kaehler class J = sum_k w_k D_k. */
export function pairNumbers(numbers: IntersectionNumbers, weights: Float64Array): PairNumbers {
  const { edges, edgeNumbers, triangles, triangleNumbers, cubes, pointCount } = numbers
  const diagonal = new Float64Array(pointCount)
  const offDiagonal = new Float64Array(edges.length / 2)
  for (let i = 0; i < pointCount; i++) diagonal[i] = cubes[i] * weights[i]
  for (let e = 0; e < offDiagonal.length; e++) {
    const i = edges[2 * e]
    const j = edges[2 * e + 1]
    offDiagonal[e] = edgeNumbers[2 * e] * weights[i] + edgeNumbers[2 * e + 1] * weights[j]
    diagonal[i] += edgeNumbers[2 * e] * weights[j]
    diagonal[j] += edgeNumbers[2 * e + 1] * weights[i]
  }
  for (let t = 0; t < triangleNumbers.length; t++) {
    const i = triangles[3 * t]
    const j = triangles[3 * t + 1]
    const k = triangles[3 * t + 2]
    offDiagonal[edgeRow(edges, i, j)] += triangleNumbers[t] * weights[k]
    offDiagonal[edgeRow(edges, i, k)] += triangleNumbers[t] * weights[j]
    offDiagonal[edgeRow(edges, j, k)] += triangleNumbers[t] * weights[i]
  }
  return { edges, diagonal, offDiagonal }
}

/**
 * Volumes at the Kaehler class J = sum_k w_k D_k: tau_i = 1/2 sum_j A_ij w_j, V = 1/3 sum_i tau_i w_i, and C . J
 * for every curve. Throws InvariantError when V is not positive (w lies outside the cone).
 */
export function volumes(
  numbers: IntersectionNumbers,
  curves: CurveRows,
  weights: Float64Array,
  pairs: PairNumbers = pairNumbers(numbers, weights),
): Volumes {
  const divisors = new Float64Array(numbers.pointCount)
  for (let i = 0; i < divisors.length; i++) divisors[i] = pairs.diagonal[i] * weights[i]
  for (let e = 0; e < pairs.offDiagonal.length; e++) {
    const i = pairs.edges[2 * e]
    const j = pairs.edges[2 * e + 1]
    divisors[i] += pairs.offDiagonal[e] * weights[j]
    divisors[j] += pairs.offDiagonal[e] * weights[i]
  }
  let total = 0
  for (let i = 0; i < divisors.length; i++) {
    divisors[i] /= 2
    total += divisors[i] * weights[i]
  }
  total /= 3
  if (!(total > 0))
    throw new InvariantError(`The volume ${total} is not positive: the point lies outside the cone.`)
  const curveVolumes = new Float64Array(curves.starts.length - 1)
  timesColumn(curves, weights, curveVolumes)
  return { total, divisors, curves: curveVolumes }
}
