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
      packed[own + j] = (packed[own + j] - rowProduct(packed, own, other, j)) / packed[other + j]
    }
    const pivot = packed[own + i] - rowProduct(packed, own, own, i)
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

function rowProduct(packed: Float64Array, a: number, b: number, length: number): number {
  let s0 = 0
  let s1 = 0
  let s2 = 0
  let s3 = 0
  let k = 0
  for (; k + 3 < length; k += 4) {
    s0 += packed[a + k] * packed[b + k]
    s1 += packed[a + k + 1] * packed[b + k + 1]
    s2 += packed[a + k + 2] * packed[b + k + 2]
    s3 += packed[a + k + 3] * packed[b + k + 3]
  }
  for (; k < length; k++) s0 += packed[a + k] * packed[b + k]
  return s0 + s1 + (s2 + s3)
}
