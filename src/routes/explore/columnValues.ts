import { type Exploration } from '../../../shared/explorations.ts'
import { type Cell } from '../../../shared/outcomes.ts'
import { type ExploredRow } from '../../api/explorations.ts'
import { type Range } from './exploreAddress.ts'

export type ColumnView = Exploration['columns'][number]

/** A cell as a number: truth values are 0 and 1, an undefined cell is null. */
export function numberOf(cell: Cell | undefined): number | null {
  if (typeof cell === 'number') return cell
  return typeof cell === 'boolean' ? Number(cell) : null
}

/** One column over all rows, summed up. */
export interface ColumnSummary {
  /** Per row; null where undefined. */
  readonly values: readonly (number | null)[]
  /** The defined ones in ascending order. */
  readonly sorted: readonly number[]
  /** Reasons of undefined cells, the commonest first. */
  readonly reasons: readonly (readonly [reason: string, count: number])[]
}

export function summarise(rows: readonly ExploredRow[], place: number): ColumnSummary {
  const reasons = new Map<string, number>()
  const values = rows.map(({ cells }) => {
    const cell = cells[place]
    if (typeof cell === 'object') reasons.set(cell.undefined, (reasons.get(cell.undefined) ?? 0) + 1)
    return numberOf(cell)
  })
  const sorted = values.filter((value) => value !== null).sort((a, b) => a - b)
  return { values, sorted, reasons: [...reasons].sort((a, b) => b[1] - a[1]) }
}

/** The smallest value that at least the share p of the values does not exceed; null for none. */
export function quantile(sorted: readonly number[], p: number): number | null {
  return sorted[Math.max(0, Math.ceil(p * sorted.length) - 1)] ?? null
}

export const inRange = (value: number | null, { low = -Infinity, high = Infinity }: Range): boolean =>
  value !== null && value >= low && value <= high

/** Places of the rows that every range holds. */
export function selectedRows(
  columns: readonly ColumnSummary[],
  ranges: ReadonlyMap<number, Range>,
  rowCount: number,
): number[] {
  const wanted = [...ranges].filter(([place]) => place < columns.length)
  return Array.from({ length: rowCount }, (_, row) => row).filter((row) =>
    wanted.every(([place, range]) => inRange(columns[place]?.values[row] ?? null, range)),
  )
}

/** Rows of the largest, middle and smallest values of a column, `count` of each. */
export function members(
  { values }: ColumnSummary,
  count: number,
): { readonly largest: number[]; readonly median: number[]; readonly smallest: number[] } {
  const order = values.flatMap((value, row) => (value === null ? [] : [{ value, row }]))
  // Equal values in the order of the sample.
  order.sort((a, b) => b.value - a.value || a.row - b.row)
  const ranked = order.map(({ row }) => row)
  const middle = Math.max(0, Math.floor((ranked.length - count) / 2))
  return {
    largest: ranked.slice(0, count),
    median: ranked.slice(middle, middle + count),
    smallest: ranked.slice(-count).reverse(),
  }
}
