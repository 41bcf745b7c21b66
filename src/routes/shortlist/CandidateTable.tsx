import { useMemo } from 'react'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { type OutcomeFormat } from '../../components/ui/Outcome.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { givenDecimals, type ListColumn } from './listColumns.ts'
import { type ShortlistView } from './shortlistView.ts'
import { triageColumns } from './triageColumns.tsx'
import { type Selection } from './useSelection.ts'

interface CandidateTableProps {
  campaign: string
  list: ShortlistDetail
  rows: readonly ShortlistRow[]
  /** All columns of the list. */
  columns: readonly ListColumn[]
  view: ShortlistView
  twoReaders: boolean
  format: OutcomeFormat
  selection: Selection
  /** Place of the row in hand. */
  at: number
  /** Whether it was chosen, so that it is kept in view. */
  follow: boolean
  onSort: (column: string) => void
  onCurrent: (key: string) => void
}

/** The candidates as a table of any length. */
export function CandidateTable(props: CandidateTableProps) {
  const { campaign, list, rows, columns, view, twoReaders, format, selection, at, follow } = props
  const { onSort, onCurrent } = props
  const { external, rows: all } = list
  const decimals = useMemo(
    () => external.map((_, place) => givenDecimals(all.map((row) => row.external[place] ?? null))),
    [external, all],
  )
  const shown: Column<ShortlistRow>[] = [
    selectColumn(rows, selection),
    ...triageColumns({ campaign, list, columns, format, decimals, view, onSort, twoReaders }),
  ]
  return (
    <VirtualTable
      label="Candidates"
      className="max-h-[62vh]"
      count={rows.length}
      rowAt={(index) => rows[index]}
      rowKey={(item) => item.candidateKey}
      columns={shown}
      current={follow ? at : undefined}
      rowProps={(item, index) => ({
        className:
          index === at ? 'bg-action-wash shadow-[inset_3px_0_0_var(--action)]' : 'hover:bg-action-wash',
        'aria-current': index === at ? true : undefined,
        // A link in the row goes to its own page; taking the row in hand as well would navigate back at once.
        onClick: (event) => {
          if (event.target instanceof Element && event.target.closest('a, button, input')) return
          const inHand = rows[at]
          if (event.shiftKey && inHand) selection.extend(inHand.candidateKey, item.candidateKey)
          onCurrent(item.candidateKey)
        },
      })}
    />
  )
}

function selectColumn(rows: readonly ShortlistRow[], selection: Selection): Column<ShortlistRow> {
  return {
    key: 'select',
    // Clear of the mark on the row in hand.
    className: 'w-8 first:pl-2',
    header: (
      <input
        type="checkbox"
        aria-label="Select all that are shown"
        className="align-middle"
        checked={rows.length > 0 && selection.keys.length === rows.length}
        onChange={selection.toggleAll}
      />
    ),
    cell: (item) => (
      <input
        type="checkbox"
        aria-label={`Select rank ${item.rank}`}
        className="align-middle"
        checked={selection.has(item.candidateKey)}
        onChange={(event) =>
          selection.toggle(
            item.candidateKey,
            event.nativeEvent instanceof MouseEvent && event.nativeEvent.shiftKey,
          )
        }
      />
    ),
  }
}
