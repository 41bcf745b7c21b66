import { InvariantError } from '../errors.ts'

/**
 * Hermite form under GL(4,Z) acting from the left: the unique row echelon matrix H = U V with positive pivots and,
 * above each pivot, entries between 0 and the pivot (exclusive). Two matrices have the same form exactly when one
 * is a unimodular matrix times the other.
 *
 * @param matrix 4 rows, `columns` entries each, row after row; the rank must be 4
 * @param columns number of columns that are brought into the form; further ones are carried along, so that an
 *   identity appended to V gives U
 * @throws InvariantError when the rank is below 4 or an entry leaves the safe integers
 */
export function hermiteForm(matrix: ArrayLike<number>, columns: number): Float64Array {
  const rows = new Float64Array(matrix)
  const width = rows.length / 4
  let pivot = 0
  for (let column = 0; column < columns && pivot < 4; column++) {
    if (!clearBelow(rows, width, column, pivot)) continue
    const here = rows[pivot * width + column]
    for (let row = 0; row < pivot; row++) {
      subtract(rows, width, row, pivot, Math.floor(rows[row * width + column] / here))
    }
    pivot++
  }
  if (pivot < 4) throw new InvariantError('A Hermite form was asked for columns of rank below 4.')
  return rows
}

/** Euclid's algorithm on the rows from `pivot` on; true when a non-zero (then positive) entry is left on top. */
function clearBelow(rows: Float64Array, width: number, column: number, pivot: number): boolean {
  for (;;) {
    let smallest = -1
    let nonZero = 0
    for (let row = pivot; row < 4; row++) {
      const size = Math.abs(rows[row * width + column])
      if (size === 0) continue
      nonZero++
      if (smallest < 0 || size < Math.abs(rows[smallest * width + column])) smallest = row
    }
    if (smallest < 0) return false
    const sign = rows[smallest * width + column] < 0 ? -1 : 1
    for (let i = 0; i < width && (smallest !== pivot || sign < 0); i++) {
      const entry = rows[smallest * width + i]
      rows[smallest * width + i] = rows[pivot * width + i]
      rows[pivot * width + i] = sign * entry + 0
    }
    if (nonZero === 1) return true
    for (let row = pivot + 1; row < 4; row++) {
      subtract(rows, width, row, pivot, Math.floor(rows[row * width + column] / rows[pivot * width + column]))
    }
  }
}

function subtract(rows: Float64Array, width: number, target: number, source: number, factor: number): void {
  if (factor === 0) return
  for (let i = 0; i < width; i++) {
    const entry = rows[target * width + i] - factor * rows[source * width + i]
    if (Math.abs(entry) > Number.MAX_SAFE_INTEGER)
      throw new InvariantError('A Hermite form left the safe integers.')
    rows[target * width + i] = entry
  }
}
