import { type CertificateMark } from '../../../shared/certificates.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { byOneReader, standingOf, verdictValues, type VerdictValue } from '../../../shared/verdicts.ts'
import { meets, readConditions, valueOf, type Condition, type ListColumn } from './listColumns.ts'

export const certificateStates = ['none', 'waiting', 'passed', 'failed'] as const

/** Beside what stands: verified by the first of two readers; given for another version than the list's. */
const furtherVerdicts = ['one-reader', 'other-version'] as const

/** Which rows of a shortlist are shown, in which order and how; kept in the address. */
export interface ShortlistView {
  verdict: VerdictValue | 'all' | (typeof furtherVerdicts)[number]
  certificate: CertificateMark['state'] | 'all'
  /** `all`, `me`, `none`, or the identifier of an account. */
  reviewer: string
  hits: boolean
  text: string
  /** Conditions on columns. */
  conditions: readonly Condition[]
  /** Name of a column (`listColumns`). */
  sort: string
  descending: boolean
  /** Columns that are not shown. */
  hidden: readonly string[]
  /** As a table, or as pictures of 2-faces. */
  show: 'table' | 'pictures'
  /** Columns of the scatter; null while there is none. */
  scatter: { readonly across: string; readonly up: string } | null
}

export function readView(search: URLSearchParams): ShortlistView {
  const verdict = search.get('verdict')
  const [across, up] = [search.get('across'), search.get('up')]
  return {
    verdict: [...verdictValues, ...furtherVerdicts].find((value) => value === verdict) ?? 'all',
    certificate: certificateStates.find((state) => state === search.get('certificate')) ?? 'all',
    reviewer: search.get('reviewer') ?? 'all',
    hits: search.get('hits') === 'yes',
    text: search.get('text') ?? '',
    conditions: readConditions(search),
    sort: search.get('sort') ?? 'rank',
    descending: search.get('order') === 'desc',
    hidden: search.getAll('hide'),
    show: search.get('show') === 'pictures' ? 'pictures' : 'table',
    scatter: across !== null && up !== null ? { across, up } : null,
  }
}

/** Columns that an address names and the list does not have. */
export function unknownColumns(view: ShortlistView, columns: readonly ListColumn[]): string[] {
  const known = new Set(columns.map(({ name }) => name))
  const named = [
    view.sort,
    ...view.conditions.map(({ column }) => column),
    ...(view.scatter ? [view.scatter.across, view.scatter.up] : []),
  ]
  return [...new Set(named)].filter((name) => !known.has(name))
}

/** Parts of an address that belong to a person's place in the list, not to the view. */
const placeParts = ['row']

/** The parts of an address that make a view, to be kept under a name. */
export function viewAddress(search: URLSearchParams): string {
  const parts = new URLSearchParams(search)
  for (const part of placeParts) parts.delete(part)
  return parts.toString()
}

export const verdictOf = (row: ShortlistRow): VerdictValue => standingOf(row.verdict)

/** A verdict belongs to the target; it may have been given for another of its versions. */
export const isForOther = (row: ShortlistRow, { targetVersion }: Pick<ShortlistDetail, 'targetVersion'>) =>
  row.verdict !== null && row.verdict.targetVersion !== targetVersion

/** Whether a row needs a word from this person: one that they were the first of two to verify needs another's. */
export const isOpenFor = (me: string | null, row: ShortlistRow): boolean =>
  verdictOf(row) === 'undecided' && !(byOneReader(row.verdict) && row.verdict?.readers?.[0]?.id === me)

function hasVerdict(
  row: ShortlistRow,
  wanted: ShortlistView['verdict'],
  list: Pick<ShortlistDetail, 'targetVersion'>,
): boolean {
  switch (wanted) {
    case 'all':
      return true
    case 'other-version':
      return isForOther(row, list)
    case 'one-reader':
      return byOneReader(row.verdict)
    default:
      return verdictOf(row) === wanted
  }
}

function hasReviewer({ assignee }: ShortlistRow, wanted: string, me: string | null): boolean {
  if (wanted === 'all') return true
  if (wanted === 'none') return assignee === null
  return assignee !== null && assignee.id === (wanted === 'me' ? me : wanted)
}

/**
 * @param columns those of the list, by which it may be sorted and filtered
 * @param me identifier of the account that looks
 */
export function visibleRows(
  list: Pick<ShortlistDetail, 'rows' | 'targetVersion'>,
  columns: readonly ListColumn[],
  view: ShortlistView,
  me: string | null = null,
): ShortlistRow[] {
  const text = view.text.toLowerCase()
  const byName = new Map(columns.map((column) => [column.name, column]))
  const conditions = view.conditions.flatMap((condition) => {
    const column = byName.get(condition.column)
    return column ? [{ condition, column }] : []
  })
  const kept = list.rows.filter(
    (row) =>
      hasVerdict(row, view.verdict, list) &&
      (view.certificate === 'all' || row.certificate.state === view.certificate) &&
      hasReviewer(row, view.reviewer, me) &&
      (!view.hits || (row.outcome.kind === 'feasible' && row.outcome.hit === true)) &&
      (text === '' || row.polytopeName.toLowerCase().includes(text) || row.candidateKey.startsWith(text)) &&
      conditions.every(({ condition, column }) => meets(valueOf(row, column), condition)),
  )
  const sorted = byName.get(view.sort) ?? byName.get('rank')!
  if (sorted.name === 'rank') return view.descending ? kept.reverse() : kept
  const sign = view.descending ? -1 : 1
  const keyed = kept.map((row) => ({ row, value: valueOf(row, sorted) }))
  keyed.sort((a, b) => sign * compareValues(a.value, b.value) || a.row.rank - b.row.rank)
  return keyed.map(({ row }) => row)
}

const collator = new Intl.Collator('en', { numeric: true })

/** What has no value is smaller than everything. */
function compareValues(a: number | string | null, b: number | string | null): number {
  if (a === null || b === null) return a === b ? 0 : a === null ? -1 : 1
  if (typeof a === 'string' || typeof b === 'string') return collator.compare(String(a), String(b))
  return a === b ? 0 : a < b ? -1 : 1
}

/** Key of the row to go to after deciding `key`: the next one shown, else the one before. */
export function nextKey(rows: readonly ShortlistRow[], key: string): string | null {
  const at = rows.findIndex((row) => row.candidateKey === key)
  return (rows[at + 1] ?? rows[at - 1])?.candidateKey ?? null
}

/** The next row after `key` that needs a word from this person, going round at the end. */
export function nextUndecided(
  rows: readonly ShortlistRow[],
  key: string | null,
  me: string | null = null,
): string | null {
  const at = rows.findIndex((row) => row.candidateKey === key)
  const round = [...rows.slice(at + 1), ...rows.slice(0, Math.max(0, at))]
  return round.find((row) => isOpenFor(me, row))?.candidateKey ?? null
}
