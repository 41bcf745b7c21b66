import { type CertificateMark } from '../../../shared/certificates.ts'
import { type ShortlistRow } from '../../../shared/shortlists.ts'
import { verdictValues, type VerdictValue } from '../../../shared/verdicts.ts'

export const certificateStates = ['none', 'waiting', 'passed', 'failed'] as const

/** Which rows of a shortlist are shown, in which order; kept in the address. */
export interface ShortlistView {
  verdict: VerdictValue | 'all'
  certificate: CertificateMark['state'] | 'all'
  hits: boolean
  text: string
  /** `rank`, or the name of a report column as `report:NAME`. */
  sort: string
  descending: boolean
}

export function readView(search: URLSearchParams): ShortlistView {
  const verdict = search.get('verdict')
  return {
    verdict: verdictValues.find((value) => value === verdict) ?? 'all',
    certificate: certificateStates.find((state) => state === search.get('certificate')) ?? 'all',
    hits: search.get('hits') === 'yes',
    text: search.get('text') ?? '',
    sort: search.get('sort') ?? 'rank',
    descending: search.get('order') === 'desc',
  }
}

export const verdictOf = (row: ShortlistRow): VerdictValue => row.verdict?.value ?? 'undecided'

function sortValue(row: ShortlistRow, sort: string): number {
  if (sort === 'rank') return row.rank
  if (sort === 'h11') return row.h11
  if (row.outcome.kind !== 'feasible') return Number.NEGATIVE_INFINITY
  if (sort === 'score') return row.outcome.score
  const cell = row.outcome.report[sort.slice('report:'.length)]
  if (typeof cell === 'number') return cell
  return typeof cell === 'boolean' ? Number(cell) : Number.NEGATIVE_INFINITY
}

export function visibleRows(rows: readonly ShortlistRow[], view: ShortlistView): ShortlistRow[] {
  const text = view.text.toLowerCase()
  const kept = rows.filter(
    (row) =>
      (view.verdict === 'all' || verdictOf(row) === view.verdict) &&
      (view.certificate === 'all' || row.certificate.state === view.certificate) &&
      (!view.hits || (row.outcome.kind === 'feasible' && row.outcome.hit === true)) &&
      (text === '' || row.polytopeName.toLowerCase().includes(text) || row.candidateKey.startsWith(text)),
  )
  const sign = view.descending ? -1 : 1
  return kept.sort((a, b) => {
    const first = sortValue(a, view.sort)
    const second = sortValue(b, view.sort)
    return (first === second ? 0 : sign * (first < second ? -1 : 1)) || a.rank - b.rank
  })
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
