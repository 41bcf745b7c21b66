import { InvariantError } from '../errors.ts'
import { roundedQuotient } from './integers.ts'

/**
 * A change of lattice basis, exact. New coordinates of a point are `matrix` times the old ones; new coordinates
 * of a functional (a facet normal) are `dual` times the old ones, `dual` being the inverse transpose, so that
 * pairings do not change. Rows of big integers, determinant 1 or -1.
 */
export interface BasisChange {
  readonly matrix: readonly (readonly bigint[])[]
  readonly dual: readonly (readonly bigint[])[]
}

const size = 4

/**
 * The basis in which the given points (columns of coordinates in Z^4, spanning it over the rationals) have short
 * coordinate rows: the reduction of Lenstra, Lenstra and Lovász (1982) with factor 3/4, all in integers, applied
 * to the four rows of the matrix of points. A function of the ordered matrix's Gram matrix alone, hence of the
 * set of points.
 */
export function reducedBasis(points: Iterable<readonly bigint[]>): BasisChange {
  const gram = zero()
  for (const point of points) {
    for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) gram[i][j] += point[i] * point[j]
  }
  const matrix = identity()
  const dual = identity()
  let row = 1
  let orthogonal = orthogonalise(gram)
  while (row < size) {
    for (let other = row - 1; other >= 0; other--) {
      const factor = roundedQuotient(orthogonal.lambda[row][other], orthogonal.minors[other + 1])
      if (factor === 0n) continue
      addRow(matrix, row, other, -factor)
      addRow(dual, other, row, factor)
      addRow(gram, row, other, -factor)
      for (let i = 0; i < size; i++) gram[i][row] -= factor * gram[i][other]
      const lambda = orthogonal.lambda
      for (let i = 0; i < other; i++) lambda[row][i] -= factor * lambda[other][i]
      lambda[row][other] -= factor * orthogonal.minors[other + 1]
    }
    const { minors, lambda } = orthogonal
    const step = lambda[row][row - 1]
    const tooShort = 4n * (minors[row + 1] * minors[row - 1] + step * step) < 3n * minors[row] * minors[row]
    if (!tooShort) {
      row++
      continue
    }
    for (const rows of [matrix, dual, gram]) swap(rows, row)
    for (const entries of gram) swap(entries, row)
    orthogonal = orthogonalise(gram)
    row = Math.max(1, row - 1)
  }
  return { matrix, dual }
}

/** The image of an integer vector under rows of big integers. */
export function applyBig(matrix: readonly (readonly bigint[])[], vector: readonly bigint[]): bigint[] {
  return matrix.map((row) => row.reduce((sum, entry, i) => sum + entry * vector[i], 0n))
}

export const transposed = (rows: readonly (readonly bigint[])[]): bigint[][] =>
  rows[0].map((_, column) => rows.map((row) => row[column]))

/** Vectors of 4 coordinates, one after the other, as rows of big integers. */
export function rowsOf(flat: ArrayLike<number>): bigint[][] {
  const rows: bigint[][] = []
  for (let i = 0; i < flat.length; i += 4) rows.push([0, 1, 2, 3].map((axis) => BigInt(flat[i + axis])))
  return rows
}

/** Images of integer vectors (4 coordinates each), in doubles where every sum is provably below 2^53, in big integers elsewhere. */
export function transform(matrix: readonly (readonly bigint[])[], vectors: ArrayLike<number>): number[] {
  let largestEntry = 0
  for (const row of matrix)
    for (const entry of row) largestEntry = Math.max(largestEntry, Math.abs(Number(entry)))
  let largest = 0
  for (let i = 0; i < vectors.length; i++) largest = Math.max(largest, Math.abs(vectors[i]))
  if (4 * largestEntry * largest > Number.MAX_SAFE_INTEGER) {
    return rowsOf(vectors).flatMap((vector) => applyBig(matrix, vector).map(Number))
  }
  const rows = matrix.map((row) => row.map(Number))
  const images: number[] = []
  for (let i = 0; i < vectors.length; i += 4) {
    for (const [a, b, c, d] of rows) {
      images.push(a * vectors[i] + b * vectors[i + 1] + c * vectors[i + 2] + d * vectors[i + 3])
    }
  }
  return images
}

/** Leading minors of the Gram matrix (minors[0] = 1) and the integral Gram-Schmidt coefficients. */
function orthogonalise(gram: readonly (readonly bigint[])[]): { lambda: bigint[][]; minors: bigint[] } {
  const lambda = zero()
  const minors = [1n, 0n, 0n, 0n, 0n]
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      let entry = gram[i][j]
      for (let t = 0; t < j; t++) entry = (minors[t + 1] * entry - lambda[i][t] * lambda[j][t]) / minors[t]
      if (j < i) lambda[i][j] = entry
      else minors[i + 1] = entry
    }
    if (minors[i + 1] <= 0n)
      throw new InvariantError('Lattice reduction needs points that span four dimensions.')
  }
  return { lambda, minors }
}

function addRow(rows: bigint[][], target: number, source: number, factor: bigint): void {
  for (let i = 0; i < size; i++) rows[target][i] += factor * rows[source][i]
}

function swap<T>(items: T[], row: number): void {
  const kept = items[row]
  items[row] = items[row - 1]
  items[row - 1] = kept
}

const zero = (): bigint[][] => Array.from({ length: size }, () => [0n, 0n, 0n, 0n])
const identity = (): bigint[][] =>
  Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => (i === j ? 1n : 0n)))
