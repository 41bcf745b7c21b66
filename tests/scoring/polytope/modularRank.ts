/** A prime below 2^26, so that products stay exact. The rank modulo a prime is at most the true one. */
const prime = 67_108_859

/** Rank by elimination modulo the prime. */
export function rankOf(matrix: readonly (readonly number[])[]): number {
  const rows = matrix.map((row) => row.map((entry) => ((entry % prime) + prime) % prime))
  let rank = 0
  for (let column = 0; rank < rows.length && column < rows[0].length; column++) {
    const pivot = rows.findIndex((row, r) => r >= rank && row[column] !== 0)
    if (pivot < 0) continue
    ;[rows[rank], rows[pivot]] = [rows[pivot], rows[rank]]
    const own = rows[rank]
    for (let r = rank + 1; r < rows.length; r++) {
      const factor = rows[r][column]
      if (factor === 0) continue
      rows[r] = rows[r].map((entry, c) => {
        const value = ((entry * own[column]) % prime) - ((factor * own[c]) % prime)
        return value < 0 ? value + prime : value
      })
    }
    rank++
  }
  return rank
}
