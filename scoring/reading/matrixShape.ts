import type { Orientation } from './given.ts'

export type MatrixReading =
  | { readonly rows: readonly (readonly number[])[]; readonly transposed: boolean }
  /** Both readings make sense. */
  | { readonly ambiguous: true }
  | { readonly wrong: string }

export type MatrixKind = 'points' | 'lifted points' | 'simplices' | 'triangles'

/** How many entries a row may have, and how many rows there are at the least. */
const shapes: Record<
  MatrixKind,
  { readonly widths: readonly number[]; readonly least: number; readonly words: string }
> = {
  points: { widths: [4], least: 5, words: 'points are rows of 4 integers, or the columns of 4 rows' },
  'lifted points': {
    widths: [5],
    least: 5,
    words: 'lifted points are rows of 4 coordinates and a height, or the columns of 5 rows',
  },
  simplices: {
    widths: [4, 5],
    least: 5,
    words: 'simplices are rows of 4 indices (the origin implied) or 5, or the columns of 4 or 5 rows',
  },
  // The fewest any polytope has: the 2-faces of a simplex.
  triangles: { widths: [3], least: 10, words: 'triangles are rows of 3 indices, or the columns of 3 rows' },
}

/**
 * Decides whether a matrix lists things by rows or by columns. Its shape decides as a rule. A square one is read the
 * only way that makes sense (no simplex has a corner twice); where both do, `ambiguous`, unless an orientation is
 * given.
 *
 * @param rows all of one length
 */
export function matrixRows(
  kind: MatrixKind,
  rows: readonly (readonly number[])[],
  orientation: Orientation | undefined,
): MatrixReading {
  const { widths, least, words } = shapes[kind]
  const [height, width] = [rows.length, rows[0].length]
  const byRows = widths.includes(width)
  const byColumns = widths.includes(height)
  const columns = (): number[][] => rows[0].map((_, c) => rows.map((row) => row[c]))
  const asRows = { rows, transposed: false }
  const asColumns = () => ({ rows: columns(), transposed: true })
  if (!byRows && !byColumns) return { wrong: `a ${height} x ${width} matrix was found; ${words}` }
  if (byRows && !byColumns) return asRows
  if (byColumns && !byRows) return asColumns()
  // Both fit: numbers of points or simplices below the least possible rule one reading out.
  if (height < least !== width < least) return height < least ? asColumns() : asRows
  if (orientation !== undefined) return orientation === 'rows' ? asRows : asColumns()
  if (height < least) return asRows
  if (kind === 'simplices') {
    const proper = (list: readonly (readonly number[])[]) =>
      list.every((row) => new Set(row).size === row.length)
    const [rowsMakeSense, columnsMakeSense] = [proper(rows), proper(columns())]
    if (rowsMakeSense !== columnsMakeSense) return rowsMakeSense ? asRows : asColumns()
  }
  return { ambiguous: true }
}
