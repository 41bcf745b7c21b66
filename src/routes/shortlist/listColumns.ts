import { reportColumn, scoreColumn } from '../../../shared/assemblies.ts'
import { type ExternalColumn } from '../../../shared/externalTables.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { formatNumber } from '../../lib/numbers.ts'

/** A column that can be hidden, sorted by or filtered by; its name stands in addresses. */
export interface ListColumn {
  readonly name: string
  readonly label: string
  /** Without one it cannot be sorted or filtered by. */
  readonly type: 'number' | 'text' | null
  /** Of an external column: its place among them, and where it comes from. */
  readonly external?: { readonly at: number; readonly column: ExternalColumn }
}

export const externalColumn = (name: string): string => `external:${name}`

type Contents = Pick<ShortlistDetail, 'rows' | 'columns' | 'external' | 'reissueOf'>

/** The columns of a list, in their order; those that no row has a value for are left out. */
export function listColumns({ rows, columns, external, reissueOf }: Contents): ListColumn[] {
  const fronts = rows.some(({ front }) => front !== null)
  const previous = rows.some((row) => row.previous !== null)
  return [
    { name: 'rank', label: 'rank', type: 'number' },
    ...(fronts ? [{ name: 'front', label: 'front', type: 'number' } as const] : []),
    ...(previous
      ? ([
          { name: 'change', label: 'change of rank', type: 'number' },
          // Scores do not change from issue to issue.
          ...(reissueOf ? [] : [{ name: 'previous', label: 'score before', type: 'number' } as const]),
        ] as const)
      : []),
    { name: 'verdict', label: 'verdict', type: null },
    ...(rows.some(({ assignee }) => assignee !== null)
      ? [{ name: 'assignee', label: 'assigned to', type: 'text' } as const]
      : []),
    { name: 'certificate', label: 'certificate', type: null },
    { name: scoreColumn, label: 'score', type: 'number' },
    { name: 'hit', label: 'hit', type: null },
    ...columns.map((name): ListColumn => ({ name: reportColumn(name), label: name, type: 'number' })),
    ...external.map((column, at): ListColumn => ({
      name: externalColumn(column.name),
      label: column.name,
      type: column.type,
      external: { at, column },
    })),
    { name: 'picture', label: 'largest 2-faces', type: null },
    { name: 'polytope', label: 'polytope', type: 'text' },
    { name: 'h11', label: 'h11', type: 'number' },
  ]
}

/** What a row has in a column, for order and conditions; truth values are 0 and 1, null is no value. */
export function valueOf(row: ShortlistRow, { name, external }: ListColumn): number | string | null {
  if (external) return row.external[external.at] ?? null
  const { outcome, previous } = row
  switch (name) {
    case 'rank':
      return row.rank
    case 'front':
      return row.front
    case 'change':
      return previous && previous.rank - row.rank
    case 'previous':
      return previous && previous.score
    case 'polytope':
      return row.polytopeName
    case 'h11':
      return row.h11
    case 'assignee':
      return row.assignee?.name ?? null
  }
  if (outcome.kind !== 'feasible') return null
  if (name === scoreColumn) return outcome.score
  const cell = outcome.report[name.slice(reportColumn('').length)]
  return typeof cell === 'number' || typeof cell === 'boolean' ? Number(cell) : null
}

/**
 * Decimals with which a column of numbers that people brought along is written: as many as its longest value has, so
 * that nothing is rounded and points stand under each other; null where that would be too many.
 */
export function givenDecimals(values: readonly (number | string | null)[]): number | null {
  let most = 0
  for (const value of values) {
    if (typeof value !== 'number') continue
    const text = String(value)
    if (text.includes('e')) return null
    most = Math.max(most, text.split('.')[1]?.length ?? 0)
  }
  return most <= 6 ? most : null
}

/** A range of a column of numbers, or a part of a text. What has no value meets none. */
export interface Condition {
  readonly column: string
  readonly from: number | null
  readonly to: number | null
  readonly has: string
}

const ends = ['from', 'to', 'has'] as const

/** In the address: `from:COLUMN`, `to:COLUMN`, `has:COLUMN`. */
export function readConditions(search: URLSearchParams): Condition[] {
  const columns = new Set<string>()
  for (const name of search.keys()) {
    const end = ends.find((one) => name.startsWith(`${one}:`))
    if (end) columns.add(name.slice(end.length + 1))
  }
  return [...columns].flatMap((column) => {
    const number = (end: 'from' | 'to') => {
      const text = search.get(`${end}:${column}`)?.trim() ?? ''
      return text === '' || !Number.isFinite(Number(text)) ? null : Number(text)
    }
    const condition = {
      column,
      from: number('from'),
      to: number('to'),
      has: search.get(`has:${column}`) ?? '',
    }
    return condition.from === null && condition.to === null && condition.has === '' ? [] : [condition]
  })
}

/** The parts of an address that a condition on a column stands in. */
export const conditionParts = (column: string): string[] => ends.map((end) => `${end}:${column}`)

export function meets(value: number | string | null, { from, to, has }: Condition): boolean {
  if (value === null) return false
  if (has !== '' && !String(value).toLowerCase().includes(has.toLowerCase())) return false
  return (from === null || Number(value) >= from) && (to === null || Number(value) <= to)
}

export function conditionWords({ from, to, has }: Condition, label: string): string {
  if (has !== '') return `${label} contains “${has}”`
  if (from !== null && to !== null) return `${formatNumber(from)} ≤ ${label} ≤ ${formatNumber(to)}`
  return from === null ? `${label} ≤ ${formatNumber(to ?? 0)}` : `${label} ≥ ${formatNumber(from)}`
}
