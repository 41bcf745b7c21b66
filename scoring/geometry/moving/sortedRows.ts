/** An array with `width` entries per row, kept in the order of the rows. */
type Aligned = Int32Array | Float64Array

/**
 * The place of a row moves from `from` to `to`: the rows in between make room, in every array aligned with them.
 * What stands in row `to` afterwards is to be overwritten.
 */
export function moveRow(
  arrays: readonly Aligned[],
  widths: readonly number[],
  from: number,
  to: number,
): void {
  if (from === to) return
  for (let n = 0; n < arrays.length; n++) {
    const width = widths[n]
    if (from < to) arrays[n].copyWithin(width * from, width * (from + 1), width * (to + 1))
    else arrays[n].copyWithin(width * (to + 1), width * to, width * from)
  }
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
