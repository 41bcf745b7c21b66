import { InvariantError } from '../errors.ts'
import { circuits, isGeneric, type Circuits } from './circuits.ts'
import { decideExactly } from './exactCone.ts'
import { heightBound } from './faceSheets.ts'
import { quadraticHeights } from './heights.ts'
import { gcdBig } from './integers.ts'
import { nearestInCone } from './strictCone.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** The answer on regularity, with its proof. */
export type Regularity =
  /** Integer heights that give the class, every circuit positive (checked exactly). */
  | { readonly regular: true; readonly heights: Float64Array }
  /**
   * Interior edges whose circuits, taken `weights` times (positive integers), add up to zero (checked exactly):
   * no heights can make all of them positive.
   */
  | {
      readonly regular: false
      readonly edges: readonly (readonly [number, number])[]
      readonly weights: bigint[]
    }

export interface RegularityOptions {
  /**
   * Heights to look near to, for instance those of a neighbouring class: the answer comes sooner and the
   * witness stays close. Default: quadratic heights.
   */
  readonly near?: ArrayLike<number>
}

/** Least circuit value asked of a witness: rounding its heights to integers cannot lose it. */
const MARGIN = 2 ** 12

/**
 * Decides exactly whether some heights give the class: w_k + w_l - a w_i - b w_j > 0 for all its circuits at
 * once. Floating point only proposes; the proposal, heights or a contradiction, is turned into integers and
 * verified, and where that fails the linear program is solved in integers.
 */
export function isRegular(cls: TwoFaceClass, options: RegularityOptions = {}): Regularity {
  const rows = circuits(cls)
  const near = options.near ?? quadraticHeights(cls.polytope, { form: 'facets' })
  const answer = nearestInCone(rows, near, MARGIN)
  if (answer.kind === 'inside') {
    const heights = answer.heights.map((height) => Math.round(height) + 0)
    const bound = heightBound(cls.polytope)
    if (heights.every((height) => Math.abs(height) <= bound) && isGeneric(cls, heights)) {
      return { regular: true, heights }
    }
  }
  if (answer.kind === 'empty') {
    const weights = vanishingCombination(rows, answer.support)
    if (weights !== undefined) return contradiction(rows, answer.support, weights)
  }
  return decideInIntegers(cls)
}

/** The slow road of `isRegular`: no floating point at all. */
export function decideInIntegers(cls: TwoFaceClass): Regularity {
  const rows = circuits(cls)
  const exact = decideExactly(rows, cls.polytope.pointCount)
  if (exact.kind === 'empty') return contradiction(rows, exact.rows, exact.weights)
  const bound = heightBound(cls.polytope)
  const divisor = exact.heights.reduce(gcdBig, 0n) || 1n
  const heights = Float64Array.from(exact.heights, (height) => Number(height / divisor))
  if (!heights.every((height) => Math.abs(height) <= bound) || !isGeneric(cls, heights)) {
    throw new InvariantError('The class is regular, but the heights found for it are too large to be stored.')
  }
  return { regular: true, heights }
}

function contradiction(rows: Circuits, support: readonly number[], weights: bigint[]): Regularity {
  if (!vanishes(rows, support, weights))
    throw new InvariantError('A certificate of irregularity does not add up.')
  return { regular: false, edges: support.map((row) => [rows.i[row], rows.j[row]] as const), weights }
}

/** True when all weights are positive and sum_n weights[n] c_support[n] = 0. */
function vanishes(rows: Circuits, support: readonly number[], weights: readonly bigint[]): boolean {
  const sums = new Map<number, bigint>()
  const add = (point: number, amount: bigint): void => {
    sums.set(point, (sums.get(point) ?? 0n) + amount)
  }
  support.forEach((row, n) => {
    add(rows.k[row], weights[n])
    add(rows.l[row], weights[n])
    add(rows.i[row], -weights[n] * BigInt(rows.a[row]))
    add(rows.j[row], -weights[n] * BigInt(rows.b[row]))
  })
  return (
    support.length > 0 &&
    weights.every((weight) => weight > 0n) &&
    [...sums.values()].every((sum) => sum === 0n)
  )
}

/**
 * The integers, unique up to a factor, with which the given rows add up to zero; undefined unless there is one
 * such relation and its weights have one sign. Gauss-Jordan without fractions on the transposed rows.
 */
function vanishingCombination(rows: Circuits, support: readonly number[]): bigint[] | undefined {
  const size = support.length
  const equations = new Map<number, bigint[]>()
  const add = (point: number, n: number, amount: number): void => {
    let equation = equations.get(point)
    if (equation === undefined) equations.set(point, (equation = new Array<bigint>(size).fill(0n)))
    equation[n] += BigInt(amount)
  }
  support.forEach((row, n) => {
    add(rows.k[row], n, 1)
    add(rows.l[row], n, 1)
    add(rows.i[row], n, -rows.a[row])
    add(rows.j[row], n, -rows.b[row])
  })
  const matrix = [...equations.values()]
  const pivots: number[] = []
  let free = -1
  let denominator = 1n
  for (let c = 0; c < size; c++) {
    const rank = pivots.length
    const found = matrix.findIndex((row, r) => r >= rank && row[c] !== 0n)
    if (found < 0) {
      if (free >= 0) return undefined
      free = c
      continue
    }
    ;[matrix[rank], matrix[found]] = [matrix[found], matrix[rank]]
    const pivot = matrix[rank][c]
    for (let r = 0; r < matrix.length; r++) {
      if (r === rank) continue
      const factor = matrix[r][c]
      matrix[r] = matrix[r].map((value, n) => (value * pivot - factor * matrix[rank][n]) / denominator)
    }
    denominator = pivot
    pivots.push(c)
  }
  if (free < 0) return undefined
  const weights = new Array<bigint>(size)
  weights[free] = denominator
  pivots.forEach((c, r) => (weights[c] = -matrix[r][free]))
  const sign = denominator < 0n ? -1n : 1n
  const divisor = weights.reduce(gcdBig, 0n)
  const reduced = weights.map((weight) => (sign * weight) / divisor)
  return vanishes(rows, support, reduced) ? reduced : undefined
}
