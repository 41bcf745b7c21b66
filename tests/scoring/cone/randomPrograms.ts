import fc from 'fast-check'
import type { SparseRows } from '../../../scoring/geometry/sparseRows.ts'

/** Compressed rows from lists of [column, coefficient]. */
export function sparseRows(rows: readonly (readonly (readonly [number, number])[])[]): SparseRows {
  const starts = new Int32Array(rows.length + 1)
  rows.forEach((row, r) => (starts[r + 1] = starts[r] + row.length))
  const entries = rows.flat()
  return {
    starts,
    points: Int32Array.from(entries, ([column]) => column),
    coefficients: Float64Array.from(entries, ([, coefficient]) => coefficient),
  }
}

/** The rows as lists of [column, coefficient]. */
export function rowLists(rows: SparseRows): [number, number][][] {
  return Array.from({ length: rows.starts.length - 1 }, (_, r) =>
    Array.from({ length: rows.starts[r + 1] - rows.starts[r] }, (_, e): [number, number] => [
      rows.points[rows.starts[r] + e],
      rows.coefficients[rows.starts[r] + e],
    ]),
  )
}

export function valueOf(row: readonly (readonly [number, number])[], x: ArrayLike<number>): number {
  return row.reduce((sum, [column, coefficient]) => sum + coefficient * x[column], 0)
}

/**
 * Sparse integer rows that a hidden integer point satisfies with values of at least one, so that the program
 * A w >= 1 has a solution. Duplicate and dependent rows occur, as among curve classes.
 */
export const feasibleRows: fc.Arbitrary<{ size: number; rows: [number, number][][] }> = fc
  .integer({ min: 1, max: 12 })
  .chain((size) =>
    fc.record({
      size: fc.constant(size),
      hidden: fc.array(fc.integer({ min: -5, max: 9 }), { minLength: size, maxLength: size }),
      drafts: fc.array(
        fc.array(fc.tuple(fc.nat(size - 1), fc.integer({ min: -3, max: 3 })), { minLength: 1, maxLength: 5 }),
        { minLength: 1, maxLength: 25 },
      ),
    }),
  )
  .map(({ size, hidden, drafts }) => {
    const rows = drafts.flatMap((draft) => {
      const entries = [...new Map(draft)].filter(([, coefficient]) => coefficient !== 0)
      const value = valueOf(entries, hidden)
      return value === 0 ? [] : [entries.map(([c, x]): [number, number] => [c, value > 0 ? x : -x])]
    })
    return { size, rows }
  })
  .filter(({ rows }) => rows.length > 0)
