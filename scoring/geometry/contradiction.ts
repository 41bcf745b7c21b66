import type { ConeRows } from './coneRows.ts'
import { gcdBig } from './integers.ts'

/** True when all weights are positive and sum_n weights[n] c_support[n] = 0. */
export function vanishes(rows: ConeRows, support: readonly number[], weights: readonly bigint[]): boolean {
  const sums = new Map<number, bigint>()
  const add = (point: number, amount: bigint): void => {
    sums.set(point, (sums.get(point) ?? 0n) + amount)
  }
  support.forEach((row, n) => {
    rows.each(row, (point, coefficient) => add(point, weights[n] * BigInt(coefficient)))
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
export function vanishingCombination(rows: ConeRows, support: readonly number[]): bigint[] | undefined {
  const size = support.length
  const equations = new Map<number, bigint[]>()
  const add = (point: number, n: number, amount: number): void => {
    let equation = equations.get(point)
    if (equation === undefined) equations.set(point, (equation = new Array<bigint>(size).fill(0n)))
    equation[n] += BigInt(amount)
  }
  support.forEach((row, n) => {
    rows.each(row, (point, coefficient) => add(point, n, coefficient))
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
