import { Link } from 'react-router-dom'
import { UserPen } from 'lucide-react'
import { scoreColumn } from '../../../shared/assemblies.ts'
import { type ExternalColumn } from '../../../shared/externalTables.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { ClassThumb } from '../../components/geometry/ClassThumb.tsx'
import { CertificateMark } from '../../components/ui/CertificateMark.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { HitMark, Outcome, ReportCell, type OutcomeFormat } from '../../components/ui/Outcome.tsx'
import { SortButton } from '../../components/ui/Table.tsx'
import { VerdictMark } from '../../components/ui/VerdictMark.tsx'
import { type Column } from '../../components/ui/VirtualTable.tsx'
import { formatTime } from '../../lib/numbers.ts'
import { type ListColumn } from './listColumns.ts'
import { RankChange } from './RankChange.tsx'
import { type ShortlistView } from './shortlistView.ts'

interface ColumnSetting {
  campaign: string
  list: Pick<ShortlistDetail, 'id' | 'targetVersion' | 'reissueOf'>
  /** The campaign asks for two readers. */
  twoReaders: boolean
  columns: readonly ListColumn[]
  format: OutcomeFormat
  /** Of the external columns, in their order. */
  decimals: readonly (number | null)[]
  view: Pick<ShortlistView, 'sort' | 'descending' | 'hidden'>
  onSort: (column: string) => void
}

const headings: Record<string, string> = {
  rank: 'Rank',
  front: 'Front',
  change: 'Change',
  previous: 'Score before',
  verdict: 'Verdict',
  assignee: 'Assigned to',
  certificate: 'Certificate',
  [scoreColumn]: 'Score',
  hit: 'Hit',
  picture: 'Largest 2-faces',
  polytope: 'Polytope',
  h11: 'h11, h21',
}

/** The columns that are shown, with headings that sort. */
export function triageColumns(setting: ColumnSetting): Column<ShortlistRow>[] {
  const { columns, view, onSort } = setting
  return columns
    .filter(({ name }) => !view.hidden.includes(name) || name === 'rank')
    .map((column): Column<ShortlistRow> => {
      const { name, label, type, external } = column
      const title = headings[name] ?? label
      const sorted = name === view.sort
      const heading = external ? <ExternalHeading label={label} column={external.column} /> : title
      return {
        key: name,
        numeric: name !== 'change' && type === 'number',
        header:
          type === null ? (
            heading
          ) : (
            <SortButton active={sorted} order={view.descending ? 'desc' : 'asc'} onClick={() => onSort(name)}>
              {heading}
            </SortButton>
          ),
        sorted: sorted ? (view.descending ? 'descending' : 'ascending') : undefined,
        className: name === 'rank' ? 'w-14' : undefined,
        cell: cellOf(column, setting),
      }
    })
}

function ExternalHeading({ label, column }: { label: string; column: ExternalColumn }) {
  return (
    <span
      className="inline-flex items-center gap-1"
      title={`External: brought along by ${column.author}, ${formatTime(column.createdAt)}, from ${column.tableName}. No rule can read it.`}
    >
      <UserPen size={12} aria-hidden />
      {label}
      <span className="sr-only">, external</span>
    </span>
  )
}

function cellOf(column: ListColumn, setting: ColumnSetting): Column<ShortlistRow>['cell'] {
  const { name, external } = column
  const { campaign, list, format, decimals, twoReaders } = setting
  if (external) {
    const shared = decimals[external.at] ?? null
    return (row) => <ExternalCell value={row.external[external.at] ?? null} decimals={shared} />
  }
  switch (name) {
    case 'rank':
      return (row) => (
        <Link
          to={`/candidates/${row.candidateKey}?campaign=${campaign}&shortlist=${list.id}`}
          className="text-action hover:underline"
          aria-label={`Rank ${row.rank}, open the dossier`}
        >
          {row.rank}
        </Link>
      )
    case 'front':
      return (row) => <Num value={row.front} />
    case 'change':
      return (row) => <RankChange row={row} entered={list.reissueOf !== null} />
    case 'previous':
      return ({ previous }) =>
        previous && previous.score === null ? (
          <span className="text-soft">{previous.kind}</span>
        ) : (
          <Num value={previous?.score ?? null} digits={6} rounded />
        )
    case 'verdict':
      return ({ verdict }) => (
        <VerdictMark verdict={verdict} version={list.targetVersion} twoReaders={twoReaders} />
      )
    case 'assignee':
      return ({ assignee }) => assignee?.name ?? <span className="text-soft">–</span>
    case 'certificate':
      return (row) => <CertificateMark state={row.certificate.state} />
    case scoreColumn:
      return (row) => <Outcome outcome={row.outcome} decimals={format.score} />
    case 'hit':
      return (row) => <HitMark outcome={row.outcome} />
    case 'picture':
      return (row) => <ClassThumb candidate={row.candidateKey} />
    case 'polytope':
      return (row) => (
        <Link to={`/library/${row.polytopeKey}?campaign=${campaign}`} className="hover:underline">
          {row.polytopeName}
        </Link>
      )
    case 'h11':
      return (row) => (
        <>
          {row.h11}, {row.h21}
        </>
      )
  }
  return ({ outcome }) => (
    <ReportCell
      decimals={format.report.get(column.label)}
      cell={outcome.kind === 'feasible' ? outcome.report[column.label] : undefined}
    />
  )
}

function ExternalCell({ value, decimals }: { value: number | string | null; decimals: number | null }) {
  if (value === null) return <span className="text-soft">–</span>
  if (typeof value === 'number') return <Num value={value} digits={6} decimals={decimals} />
  return (
    <span className="inline-block max-w-64 truncate align-middle" title={value} data-raw={value}>
      {value}
    </span>
  )
}
