/** Numbers of positive, negative and zero squares of a symmetric integer matrix, by exact congruence. */
export function inertia(matrix: readonly (readonly number[])[]): {
  plus: number
  minus: number
  zero: number
} {
  let rows = matrix.map((row) => row.map(BigInt))
  const count = { plus: 0, minus: 0, zero: 0 }
  while (rows.length > 0) {
    let pivot = rows.findIndex((row, i) => row[i] !== 0n)
    if (pivot < 0) {
      const i = rows.findIndex((row) => row.some((entry) => entry !== 0n))
      if (i < 0) {
        count.zero += rows.length
        break
      }
      // x_i y_j with both squares absent: take e_i + e_j in the place of e_i.
      const j = rows[i].findIndex((entry) => entry !== 0n)
      rows[i] = rows[i].map((entry, k) => entry + rows[j][k])
      for (const row of rows) row[i] += row[j]
      pivot = i
    }
    const scale = rows[pivot][pivot]
    if (scale > 0n) count.plus++
    else count.minus++
    // The complement, times the square of the pivot's size so that signs stay.
    const size = scale < 0n ? -scale : scale
    const sign = scale < 0n ? -1n : 1n
    const others = rows.map((_, i) => i).filter((i) => i !== pivot)
    rows = others.map((i) => others.map((j) => rows[i][j] * size - sign * rows[i][pivot] * rows[pivot][j]))
  }
  return count
}
