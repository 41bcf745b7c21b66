import { gcdOf } from '../integers.ts'
import type { Polytope } from '../polytope.ts'
import { minorsOf, pairing } from './simplexFrame.ts'

/**
 * A linear relation sum_m coefficient_m v_(point_m) = 0 among points of a facet, primitive; entries with
 * coefficient 0 are left out. Oriented: see where it comes from.
 */
export interface Circuit {
  readonly points: readonly number[]
  readonly coefficients: readonly number[]
}

/**
 * The relation among the vertices of a simplex and one point more, in which that point has a positive
 * coefficient: for heights w, sum_m coefficient_m w_m > 0 says that it lies above the lifted simplex.
 *
 * @param simplex four independent points
 */
export function circuitOf(polytope: Polytope, simplex: readonly number[], point: number): Circuit {
  const { rows, determinant } = minorsOf(polytope, simplex)
  const sign = determinant > 0 ? 1 : -1
  const raw = [sign * determinant]
  const points = [point]
  for (let m = 0; m < 4; m++) {
    const share = pairing(rows, m, polytope.points, point)
    if (share === 0) continue
    points.push(simplex[m])
    raw.push(-sign * share)
  }
  const common = gcdOf(raw)
  return { points, coefficients: raw.map((entry) => entry / common) }
}

/**
 * Sign of sum_m coefficient_m w_m, exact for integer heights: in doubles when a rounding bound settles it, else
 * in BigInt.
 */
export function circuitSign({ points, coefficients }: Circuit, heights: ArrayLike<number>): number {
  let value = 0
  let size = 0
  for (let m = 0; m < points.length; m++) {
    const term = coefficients[m] * heights[points[m]]
    value += term
    size += Math.abs(term)
  }
  if (Math.abs(value) > 8 * Number.EPSILON * size) return Math.sign(value)
  let exact = 0n
  for (let m = 0; m < points.length; m++) exact += BigInt(coefficients[m]) * BigInt(heights[points[m]])
  return exact > 0n ? 1 : exact < 0n ? -1 : 0
}

/**
 * The same with ties decided as if w_p were raised by e^p for an infinitesimal e > 0: the entry of the least
 * point gives the sign. Never 0. The tie rule of `regularise`, so that facets agree with the 2-face class.
 */
export function settledSign(circuit: Circuit, heights: ArrayLike<number>): number {
  const sign = circuitSign(circuit, heights)
  if (sign !== 0) return sign
  let least = 0
  for (let m = 1; m < circuit.points.length; m++) if (circuit.points[m] < circuit.points[least]) least = m
  return Math.sign(circuit.coefficients[least])
}
