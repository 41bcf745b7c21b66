import { gcdBig } from './integers.ts'

/** A sparse integer row: column -> non-zero entry. */
export type IntegerRow = Map<number, number>

/**
 * The non-zero elementary divisors (Smith normal form) of a sparse integer matrix, ascending; their number is the
 * rank. Exact: entries +-1 are eliminated in doubles while everything stays below 2^53, what is left in BigInt.
 *
 * @param rows taken over and changed
 */
export function elementaryDivisors(rows: IntegerRow[]): bigint[] {
  const units = eliminateUnits(rows)
  const rest = smithDiagonal(denseRest(rows))
  return [...new Array<bigint>(units).fill(1n), ...rest]
}

/** Eliminates with entries +-1 as pivots, shortest rows and columns first; returns how many there were. */
function eliminateUnits(rows: IntegerRow[]): number {
  const columns = new Map<number, Set<number>>()
  rows.forEach((row, r) => {
    for (const column of row.keys()) {
      const there = columns.get(column)
      if (there) there.add(r)
      else columns.set(column, new Set([r]))
    }
  })
  const inColumn = (column: number): Set<number> => columns.get(column) ?? new Set()
  let units = 0
  const refused = new Set<number>()
  for (;;) {
    let pivotRow = -1
    let pivotColumn = -1
    let least = Infinity
    for (let r = 0; r < rows.length; r++) {
      const length = rows[r].size
      if (length === 0 || length - 1 >= least || refused.has(r)) continue
      for (const [column, entry] of rows[r]) {
        if (entry !== 1 && entry !== -1) continue
        const fill = (length - 1) * (inColumn(column).size - 1)
        if (fill < least) [least, pivotRow, pivotColumn] = [fill, r, column]
      }
      if (least === 0) break
    }
    if (pivotRow < 0) return units
    const pivot = rows[pivotRow]
    const unit = pivot.get(pivotColumn) as number
    const others = [...inColumn(pivotColumn)].filter((r) => r !== pivotRow)
    const replaced = others.map((r) => combined(rows[r], pivot, -unit * (rows[r].get(pivotColumn) as number)))
    if (replaced.includes(null)) {
      refused.add(pivotRow)
      continue
    }
    others.forEach((r, n) => put(r, replaced[n] as IntegerRow))
    put(pivotRow, new Map())
    units++
  }

  function put(r: number, row: IntegerRow): void {
    for (const column of rows[r].keys()) if (!row.has(column)) inColumn(column).delete(r)
    for (const column of row.keys()) inColumn(column).add(r)
    rows[r] = row
  }
}

/** row + factor * pivot; null when an entry would leave the safe integers. */
function combined(row: IntegerRow, pivot: IntegerRow, factor: number): IntegerRow | null {
  const sum = new Map(row)
  for (const [column, entry] of pivot) {
    const value = (sum.get(column) ?? 0) + factor * entry
    if (Math.abs(factor * entry) > Number.MAX_SAFE_INTEGER || Math.abs(value) > Number.MAX_SAFE_INTEGER)
      return null
    if (value === 0) sum.delete(column)
    else sum.set(column, value)
  }
  return sum
}

/** The distinct non-zero rows that are left, on the columns that occur in them. */
function denseRest(rows: readonly IntegerRow[]): bigint[][] {
  const left = rows.filter((row) => row.size > 0)
  const columns = [...new Set(left.flatMap((row) => [...row.keys()]))]
  const seen = new Set<string>()
  const dense: bigint[][] = []
  for (const row of left) {
    const entries = columns.map((column) => row.get(column) ?? 0)
    const lead = Math.sign(entries.find((entry) => entry !== 0) ?? 1)
    const named = entries.map((entry) => entry * lead).join()
    if (seen.has(named)) continue
    seen.add(named)
    dense.push(entries.map((entry) => BigInt(entry)))
  }
  return dense
}

/** Non-zero diagonal of the Smith form of a dense matrix (changed on the way), each entry dividing the next. */
function smithDiagonal(matrix: bigint[][]): bigint[] {
  const diagonal: bigint[] = []
  let rows = matrix
  while (rows.length > 0) {
    const place = smallestEntry(rows)
    if (place === undefined) break
    diagonal.push(clearCross(rows, place.row, place.column))
    rows = rows.slice(1).map((row) => row.slice(1))
  }
  // A diagonal matrix: pairs (a, b) become (gcd, lcm) until each divides the next.
  for (let i = 0; i < diagonal.length; i++) {
    for (let j = i + 1; j < diagonal.length; j++) {
      const common = gcdBig(diagonal[i], diagonal[j])
      diagonal[j] = (diagonal[i] / common) * diagonal[j]
      diagonal[i] = common
    }
  }
  return diagonal
}

function smallestEntry(rows: readonly (readonly bigint[])[]): { row: number; column: number } | undefined {
  let best: { row: number; column: number; size: bigint } | undefined
  rows.forEach((entries, row) =>
    entries.forEach((entry, column) => {
      const size = entry < 0n ? -entry : entry
      if (size !== 0n && (best === undefined || size < best.size)) best = { row, column, size }
    }),
  )
  return best
}

/** Brings the entry to the corner (0, 0) and clears its row and column; returns its final size. */
function clearCross(rows: bigint[][], row: number, column: number): bigint {
  for (;;) {
    ;[rows[0], rows[row]] = [rows[row], rows[0]]
    for (const entries of rows) [entries[0], entries[column]] = [entries[column], entries[0]]
    const corner = rows[0][0]
    for (let r = 1; r < rows.length; r++) {
      const quotient = rows[r][0] / corner
      if (quotient !== 0n) rows[r].forEach((entry, c) => (rows[r][c] = entry - quotient * rows[0][c]))
    }
    for (let c = 1; c < rows[0].length; c++) {
      const quotient = rows[0][c] / corner
      if (quotient !== 0n) for (const entries of rows) entries[c] -= quotient * entries[0]
    }
    // Remainders smaller than the corner: the least of them is the next corner.
    const size = (entry: bigint): bigint => (entry < 0n ? -entry : entry)
    const inColumn = rows.findIndex((entries, r) => r > 0 && entries[0] !== 0n)
    const inRow = rows[0].findIndex((entry, c) => c > 0 && entry !== 0n)
    if (inColumn < 0 && inRow < 0) return size(corner)
    if (inColumn >= 0) [row, column] = [inColumn, 0]
    else [row, column] = [0, inRow]
  }
}
