/**
 * A sparse matrix by rows: row r has the entries `coefficients[e]` in the columns `points[e]` for
 * `starts[r] <= e < starts[r + 1]`.
 */
export interface SparseRows {
  readonly starts: Int32Array
  readonly points: Int32Array
  readonly coefficients: Float64Array
}

export function rowCount(rows: SparseRows): number {
  return rows.starts.length - 1
}

/** y = A x. */
export function timesColumn(rows: SparseRows, x: Float64Array, y: Float64Array): void {
  const { starts, points, coefficients } = rows
  for (let r = 0; r + 1 < starts.length; r++) {
    let sum = 0
    for (let e = starts[r]; e < starts[r + 1]; e++) sum += coefficients[e] * x[points[e]]
    y[r] = sum
  }
}

/** x = A^T y. */
export function timesRow(rows: SparseRows, y: Float64Array, x: Float64Array): void {
  const { starts, points, coefficients } = rows
  x.fill(0)
  for (let r = 0; r + 1 < starts.length; r++) {
    const factor = y[r]
    if (factor === 0) continue
    for (let e = starts[r]; e < starts[r + 1]; e++) x[points[e]] += coefficients[e] * factor
  }
}

/**
 * The distinct rows, in order of first appearance. Rows are compared entry by entry, so equal rows must list
 * their columns in the same order.
 */
export function distinctRows(rows: SparseRows): SparseRows {
  const count = rowCount(rows)
  let capacity = 4
  while (capacity < 2 * count) capacity *= 2
  const table = new Int32Array(capacity).fill(-1)
  const keep = new Int32Array(count)
  let kept = 0
  for (let r = 0; r < count; r++) {
    let slot = rowHash(rows, r) & (capacity - 1)
    while (table[slot] >= 0 && !sameRow(rows, table[slot], r)) slot = (slot + 1) & (capacity - 1)
    if (table[slot] >= 0) continue
    table[slot] = r
    keep[kept++] = r
  }
  return kept === count ? rows : selectedRows(rows, keep.subarray(0, kept))
}

/** The rows whose value at x is below the threshold. */
export function rowsBelow(rows: SparseRows, x: Float64Array, threshold: number): SparseRows {
  const values = new Float64Array(rowCount(rows))
  timesColumn(rows, x, values)
  const keep = new Int32Array(values.length)
  let kept = 0
  for (let r = 0; r < values.length; r++) if (values[r] < threshold) keep[kept++] = r
  return selectedRows(rows, keep.subarray(0, kept))
}

/** The rows listed, in that order. */
export function selectedRows(rows: SparseRows, keep: Int32Array): SparseRows {
  const { starts, points, coefficients } = rows
  const newStarts = new Int32Array(keep.length + 1)
  for (let k = 0; k < keep.length; k++)
    newStarts[k + 1] = newStarts[k] + starts[keep[k] + 1] - starts[keep[k]]
  const newPoints = new Int32Array(newStarts[keep.length])
  const newCoefficients = new Float64Array(newStarts[keep.length])
  let to = 0
  for (let k = 0; k < keep.length; k++) {
    for (let e = starts[keep[k]]; e < starts[keep[k] + 1]; e++) {
      newPoints[to] = points[e]
      newCoefficients[to++] = coefficients[e]
    }
  }
  return { starts: newStarts, points: newPoints, coefficients: newCoefficients }
}

/** The rows of `first`, then those of `second`. */
export function stackRows(first: SparseRows, second: SparseRows): SparseRows {
  const offset = first.points.length
  const starts = new Int32Array(first.starts.length + rowCount(second))
  starts.set(first.starts)
  for (let r = 0; r < rowCount(second); r++) starts[first.starts.length + r] = offset + second.starts[r + 1]
  const points = new Int32Array(offset + second.points.length)
  points.set(first.points)
  points.set(second.points, offset)
  const coefficients = new Float64Array(points.length)
  coefficients.set(first.coefficients)
  coefficients.set(second.coefficients, offset)
  return { starts, points, coefficients }
}

function rowHash(rows: SparseRows, r: number): number {
  let hash = 0x811c9dc5
  for (let e = rows.starts[r]; e < rows.starts[r + 1]; e++) {
    hash = Math.imul(hash ^ rows.points[e], 0x01000193)
    hash = Math.imul(hash ^ (rows.coefficients[e] | 0), 0x01000193)
  }
  return (hash ^ (hash >>> 15)) >>> 0
}

function sameRow(rows: SparseRows, a: number, b: number): boolean {
  const { starts, points, coefficients } = rows
  const length = starts[a + 1] - starts[a]
  if (starts[b + 1] - starts[b] !== length) return false
  for (let e = 0; e < length; e++) {
    if (points[starts[a] + e] !== points[starts[b] + e]) return false
    if (coefficients[starts[a] + e] !== coefficients[starts[b] + e]) return false
  }
  return true
}

/** Largest absolute value. */
export function largestSize(x: Float64Array): number {
  let largest = 0
  for (let k = 0; k < x.length; k++) largest = Math.max(largest, Math.abs(x[k]))
  return largest
}

export function squaredLength(x: Float64Array): number {
  let sum = 0
  for (let k = 0; k < x.length; k++) sum += x[k] * x[k]
  return sum
}
