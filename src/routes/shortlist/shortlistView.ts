import { type CertificateMark } from '../../../shared/certificates.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { standingOf, verdictValues, type VerdictValue } from '../../../shared/verdicts.ts'
import { meets, readConditions, valueOf, type Condition, type ListColumn } from './listColumns.ts'

export const certificateStates = ['none', 'waiting', 'passed', 'failed'] as const

/** Which rows of a shortlist are shown, in which order; kept in the address. */
export interface ShortlistView {
  /** `other-version`: any verdict that was given for another version than the list's. */
  verdict: VerdictValue | 'all' | 'other-version'
  certificate: CertificateMark['state'] | 'all'
  hits: boolean
  text: string
  /** Conditions on columns. */
  conditions: readonly Condition[]
  /** Name of a column (`listColumns`). */
  sort: string
  descending: boolean
  /** Columns that are not shown. */
  hidden: readonly string[]
}

export function readView(search: URLSearchParams): ShortlistView {
  const verdict = search.get('verdict')
  return {
    verdict: [...verdictValues, 'other-version' as const].find((value) => value === verdict) ?? 'all',
    certificate: certificateStates.find((state) => state === search.get('certificate')) ?? 'all',
    hits: search.get('hits') === 'yes',
    text: search.get('text') ?? '',
    conditions: readConditions(search),
    sort: search.get('sort') ?? 'rank',
    descending: search.get('order') === 'desc',
    hidden: search.getAll('hide'),
  }
}

export const verdictOf = (row: ShortlistRow): VerdictValue => standingOf(row.verdict)

/** A verdict belongs to the target; it may have been given for another of its versions. */
export const isForOther = (row: ShortlistRow, { targetVersion }: Pick<ShortlistDetail, 'targetVersion'>) =>
  row.verdict !== null && row.verdict.targetVersion !== targetVersion

/** @param columns those of the list, by which it may be sorted and filtered */
export function visibleRows(
  list: Pick<ShortlistDetail, 'rows' | 'targetVersion'>,
  columns: readonly ListColumn[],
  view: ShortlistView,
): ShortlistRow[] {
  const text = view.text.toLowerCase()
  const byName = new Map(columns.map((column) => [column.name, column]))
  const conditions = view.conditions.flatMap((condition) => {
    const column = byName.get(condition.column)
    return column ? [{ condition, column }] : []
  })
  const kept = list.rows.filter(
    (row) =>
      (view.verdict === 'all' ||
        (view.verdict === 'other-version' ? isForOther(row, list) : verdictOf(row) === view.verdict)) &&
      (view.certificate === 'all' || row.certificate.state === view.certificate) &&
      (!view.hits || (row.outcome.kind === 'feasible' && row.outcome.hit === true)) &&
      (text === '' || row.polytopeName.toLowerCase().includes(text) || row.candidateKey.startsWith(text)) &&
      conditions.every(({ condition, column }) => meets(valueOf(row, column), condition)),
  )
  const sorted = byName.get(view.sort) ?? byName.get('rank')!
  const sign = view.descending ? -1 : 1
  const keyed = kept.map((row) => ({ row, value: valueOf(row, sorted) }))
  keyed.sort((a, b) => sign * compareValues(a.value, b.value) || a.row.rank - b.row.rank)
  return keyed.map(({ row }) => row)
}

/** What has no value is smaller than everything. */
function compareValues(a: number | string | null, b: number | string | null): number {
  if (a === null || b === null) return a === b ? 0 : a === null ? -1 : 1
  if (typeof a === 'string' || typeof b === 'string') return String(a).localeCompare(String(b))
  return a === b ? 0 : a < b ? -1 : 1
}

/** Key of the row to go to after deciding `key`: the next one shown, else the one before. */
export function nextKey(rows: readonly ShortlistRow[], key: string): string | null {
  const at = rows.findIndex((row) => row.candidateKey === key)
  return (rows[at + 1] ?? rows[at - 1])?.candidateKey ?? null
}

/** The next undecided row after `key`, going round at the end. */
export function nextUndecided(rows: readonly ShortlistRow[], key: string | null): string | null {
  const at = rows.findIndex((row) => row.candidateKey === key)
  const round = [...rows.slice(at + 1), ...rows.slice(0, Math.max(0, at))]
  return round.find((row) => verdictOf(row) === 'undecided')?.candidateKey ?? null
}
