/** At most this many entries per row. */
const carried = new Float64Array(3)

/**
 * Moves a row of `width` entries from one place to another, where the rows in between make room. For every array
 * that is aligned with sorted rows, when one of them is going to be replaced by one that belongs elsewhere.
 */
export function moveRow(rows: Int32Array | Float64Array, width: number, from: number, to: number): void {
  if (from === to) return
  for (let c = 0; c < width; c++) carried[c] = rows[width * from + c]
  if (from < to) rows.copyWithin(width * from, width * (from + 1), width * (to + 1))
  else rows.copyWithin(width * (to + 1), width * to, width * from)
  for (let c = 0; c < width; c++) rows[width * to + c] = carried[c]
}

/** Number of sorted rows that come before (p, q, r); r does not count where rows have two entries. */
export function lowerBound(rows: Int32Array, width: 2 | 3, p: number, q: number, r: number): number {
  let low = 0
  let high = rows.length / width
  while (low < high) {
    const middle = (low + high) >> 1
    const at = width * middle
    const order = rows[at] - p || rows[at + 1] - q || (width === 3 ? rows[at + 2] - r : 0)
    if (order < 0) low = middle + 1
    else high = middle
  }
  return low
}
