import type { ConeRows } from './coneRows.ts'
import { InvariantError } from '../errors.ts'

/** Exactly one of the two exists (Gordan's alternative); both are integers. */
export type ExactConeAnswer =
  | { readonly kind: 'inside'; readonly heights: bigint[] }
  /** weights[n] > 0 for row rows[n], with sum_n weights[n] c_rows[n] = 0. */
  | { readonly kind: 'empty'; readonly rows: number[]; readonly weights: bigint[] }

/**
 * Decides whether heights at which all rows are positive exist, in integers throughout: the simplex method with
 * Bland's rule on  sum_r x_r c_r = 0, sum_r x_r = 1, x >= 0. A solution is a contradiction among the rows;
 * if there is none, the final multipliers are heights. Pivots are fraction-free (Edmonds): the tableau holds
 * integers over one common denominator. Slow on large polytopes; the fall-back when floating point is unsure.
 */
export function decideExactly(rows: ConeRows, pointCount: number): ExactConeAnswer {
  const columns = rows.count
  const height = pointCount + 1
  // Rows of the tableau: one per point, one for the sum; columns: circuits, artificials, right-hand side.
  const width = columns + height + 1
  const tableau: bigint[][] = Array.from({ length: height + 1 }, () => new Array<bigint>(width).fill(0n))
  for (let r = 0; r < columns; r++) {
    rows.each(r, (point, coefficient) => (tableau[point][r] = BigInt(coefficient)))
    tableau[pointCount][r] = 1n
  }
  for (let p = 0; p < height; p++) tableau[p][columns + p] = 1n
  tableau[pointCount][width - 1] = 1n
  // Objective: the sum of the artificials, to be minimised; the last row holds reduced costs, negated.
  const cost = tableau[height]
  for (let p = 0; p < height; p++) for (let c = 0; c < width; c++) cost[c] += tableau[p][c]
  for (let p = 0; p < height; p++) cost[columns + p] = 0n
  const basis = Array.from({ length: height }, (_, p) => columns + p)
  let denominator = 1n
  for (;;) {
    const entering = cost.findIndex((value, c) => c < columns && value > 0n)
    if (entering < 0) break
    let leaving = -1
    for (let p = 0; p < height; p++) {
      if (tableau[p][entering] <= 0n) continue
      if (leaving >= 0) {
        const mine = tableau[p][width - 1] * tableau[leaving][entering]
        const best = tableau[leaving][width - 1] * tableau[p][entering]
        if (mine > best || (mine === best && basis[p] > basis[leaving])) continue
      }
      leaving = p
    }
    if (leaving < 0) throw new InvariantError('A bounded linear program has no leaving row.')
    const pivotRow = tableau[leaving]
    const pivot = pivotRow[entering]
    for (let p = 0; p <= height; p++) {
      if (p === leaving) continue
      const row = tableau[p]
      const factor = row[entering]
      for (let c = 0; c < width; c++) {
        if (factor === 0n && row[c] === 0n) continue
        row[c] = (row[c] * pivot - factor * pivotRow[c]) / denominator
      }
    }
    basis[leaving] = entering
    denominator = pivot
  }
  if (cost[width - 1] === 0n) {
    const used: number[] = []
    const weights: bigint[] = []
    for (let p = 0; p < height; p++) {
      if (basis[p] >= columns || tableau[p][width - 1] === 0n) continue
      used.push(basis[p])
      weights.push(tableau[p][width - 1])
    }
    return { kind: 'empty', rows: used, weights }
  }
  // The multiplier of equation p is 1 + cost at its artificial; -multiplier . c_r >= multiplier of the sum > 0.
  const heights: bigint[] = []
  for (let p = 0; p < pointCount; p++) heights.push(-(denominator + cost[columns + p]))
  return { kind: 'inside', heights }
}
