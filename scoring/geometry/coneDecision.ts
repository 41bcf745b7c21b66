import { InvariantError } from '../errors.ts'
import { SparseConeRows, type ConeRows } from './coneRows.ts'
import { vanishes, vanishingCombination } from './contradiction.ts'
import { decideExactly } from './exactCone.ts'
import { gcdBig } from './integers.ts'
import { nearestInCone } from './strictCone.ts'

/** Whether heights exist at which all rows are positive, with its proof; exactly one of the two is the case. */
export type ConeDecision =
  /** Integer heights that the caller's check has accepted. */
  | { readonly kind: 'inside'; readonly heights: Float64Array }
  /** Rows that, taken `weights` times (positive integers), add up to zero. */
  | { readonly kind: 'empty'; readonly rows: number[]; readonly weights: bigint[] }

export interface ConeQuestion {
  readonly rows: ConeRows
  readonly pointCount: number
  /** Exact check of integer heights: within bounds, and every row positive. */
  readonly accepts: (heights: Float64Array) => boolean
}

/**
 * Floating point only proposes; the proposal, heights or a contradiction, is turned into integers and verified, and
 * where that fails the linear program is solved in integers.
 *
 * @param near heights to look near to
 * @param margin least row value asked of the heights, so that rounding them to integers cannot lose it
 */
export function decideCone(question: ConeQuestion, near: ArrayLike<number>, margin: number): ConeDecision {
  const { rows, accepts } = question
  const answer = nearestInCone(rows, near, margin)
  if (answer.kind === 'inside') {
    const heights = answer.heights.map((height) => Math.round(height) + 0)
    if (accepts(heights)) return { kind: 'inside', heights }
  }
  if (answer.kind === 'empty') {
    const weights = vanishingCombination(rows, answer.support)
    if (weights !== undefined) return { kind: 'empty', rows: answer.support, weights }
    const found = contradictionWithin(question, answer.support)
    if (found !== undefined) return found
  }
  return decideConeInIntegers(question)
}

/** The slow road of `decideCone`: no floating point at all. */
export function decideConeInIntegers({ rows, pointCount, accepts }: ConeQuestion): ConeDecision {
  const exact = decideExactly(rows, pointCount)
  if (exact.kind === 'empty') return proved(rows, exact.rows, exact.weights)
  const divisor = exact.heights.reduce(gcdBig, 0n) || 1n
  const heights = Float64Array.from(exact.heights, (height) => Number(height / divisor))
  if (!accepts(heights))
    throw new InvariantError('Heights exist, but those found are too large to be stored.')
  return { kind: 'inside', heights }
}

/** A contradiction among the rows proposed, when they have one: a linear program in integers, but a small one. */
function contradictionWithin(
  { rows, pointCount }: ConeQuestion,
  support: number[],
): ConeDecision | undefined {
  const few = support.map((row) => {
    const points: number[] = []
    const coefficients: number[] = []
    rows.each(row, (point, coefficient) => {
      points.push(point)
      coefficients.push(coefficient)
    })
    return { points, coefficients }
  })
  const exact = decideExactly(new SparseConeRows(few), pointCount)
  if (exact.kind === 'inside') return undefined
  return proved(
    rows,
    exact.rows.map((n) => support[n]),
    exact.weights,
  )
}

function proved(rows: ConeRows, support: number[], weights: bigint[]): ConeDecision {
  if (!vanishes(rows, support, weights)) throw new InvariantError('A contradiction does not add up.')
  return { kind: 'empty', rows: support, weights }
}
