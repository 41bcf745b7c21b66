import { innerProduct } from './innerProduct.ts'

/**
 * Overwrites the packed lower triangle (row i at i (i + 1) / 2) of a symmetric matrix by its Cholesky factor
 * L, M = L L^T, row by row, so that both factors of every inner product are contiguous. Returns false when a
 * pivot is not positive.
 */
export function factoriseDense(size: number, packed: Float64Array): boolean {
  for (let i = 0; i < size; i++) {
    const own = (i * (i + 1)) / 2
    for (let j = 0; j < i; j++) {
      const other = (j * (j + 1)) / 2
      packed[own + j] = (packed[own + j] - innerProduct(packed, own, other, j)) / packed[other + j]
    }
    const pivot = packed[own + i] - innerProduct(packed, own, own, i)
    if (!(pivot > 0)) return false
    packed[own + i] = Math.sqrt(pivot)
  }
  return true
}

/** Solves L L^T x = x in place. */
export function solveDense(size: number, packed: Float64Array, x: Float64Array): void {
  for (let i = 0; i < size; i++) {
    const own = (i * (i + 1)) / 2
    let value = x[i]
    for (let k = 0; k < i; k++) value -= packed[own + k] * x[k]
    x[i] = value / packed[own + i]
  }
  for (let i = size - 1; i >= 0; i--) {
    const own = (i * (i + 1)) / 2
    const value = x[i] / packed[own + i]
    x[i] = value
    for (let k = 0; k < i; k++) x[k] -= packed[own + k] * value
  }
}
