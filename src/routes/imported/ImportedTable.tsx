import { useCallback, useState } from 'react'
import { Link } from 'react-router-dom'
import { useQueries } from '@tanstack/react-query'
import { Trash2 } from 'lucide-react'
import { toast } from 'sonner'
import { type ImportedCandidate } from '../../../shared/importedCandidates.ts'
import { importedCandidatesQuery, importedPageSize, useForgetImported } from '../../api/importedCandidates.ts'
import { explain } from '../../api/request.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { IconButton } from '../../components/ui/Button.tsx'
import { ConfirmDialog } from '../../components/ui/ConfirmDialog.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { VerdictMark } from '../../components/ui/VerdictMark.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { formatTime } from '../../lib/numbers.ts'

interface ImportedTableProps {
  campaign: string
  text: string
  total: number
  selected: ReadonlySet<string>
  onSelect: (key: string, on: boolean) => void
}

/** Imports of any number: rows are fetched by the hundred as they come into view. */
export function ImportedTable({ campaign, text, total, selected, onSelect }: ImportedTableProps) {
  const barred = useBarred('polytopes.import')
  const forget = useForgetImported(campaign)
  const [leaving, setLeaving] = useState<ImportedCandidate | null>(null)
  const [range, setRange] = useState({ first: 0, last: 0 })
  const onVisible = useCallback((first: number, last: number) => setRange({ first, last }), [])
  const firstPage = Math.floor(range.first / importedPageSize)
  const pageCount = Math.floor(range.last / importedPageSize) - firstPage + 1
  const pages = useQueries({
    queries: Array.from({ length: pageCount }, (_, offset) =>
      importedCandidatesQuery(campaign, text, firstPage + offset),
    ),
  })
  const failed = pages.find((page) => page.isError)
  if (failed) {
    return (
      <Failure title="Could not load these rows." error={failed.error} retry={() => void failed.refetch()} />
    )
  }
  const rowAt = (index: number): ImportedCandidate | undefined =>
    pages[Math.floor(index / importedPageSize) - firstPage]?.data?.rows[index % importedPageSize]

  const columns: Column<ImportedCandidate>[] = [
    {
      key: 'selected',
      header: <span className="sr-only">Selected</span>,
      className: 'w-8',
      cell: (row) => (
        <input
          type="checkbox"
          aria-label={`Select ${row.name}`}
          checked={selected.has(row.key)}
          onChange={(event) => onSelect(row.key, event.target.checked)}
        />
      ),
    },
    {
      key: 'name',
      header: 'Candidate',
      cellClass: 'max-w-64 truncate',
      cell: (row) => (
        <Link className="text-action hover:underline" to={`/candidates/${row.key}?campaign=${campaign}`}>
          {row.name}
        </Link>
      ),
    },
    {
      key: 'polytope',
      header: 'Polytope',
      cellClass: 'max-w-56 truncate',
      cell: (row) => (
        <Link className="hover:underline" to={`/library/${row.polytopeKey}?campaign=${campaign}`}>
          {row.polytopeName}
        </Link>
      ),
    },
    {
      key: 'h11',
      header: 'h11, h21',
      numeric: true,
      cell: (row) => (
        <>
          {row.h11}, {row.h21}
        </>
      ),
    },
    {
      key: 'verdicts',
      header: 'Verdicts',
      cell: (row) =>
        row.verdicts.length === 0 ? (
          <span className="text-soft">none</span>
        ) : (
          row.verdicts.map((verdict) => (
            <span key={verdict.targetId} className="mr-3 inline-flex gap-1">
              <VerdictMark verdict={verdict} />
              <span className="text-soft">
                {verdict.targetName} v{verdict.targetVersion}
              </span>
            </span>
          ))
        ),
    },
    {
      key: 'source',
      header: 'Source',
      cellClass: 'max-w-56 truncate',
      cell: (row) => (
        <>
          {row.source}, <span className="text-soft">line {row.line}</span>
        </>
      ),
    },
    {
      key: 'when',
      header: 'Imported',
      className: 'text-soft',
      cell: (row) => `${formatTime(row.createdAt)}, ${row.author}`,
    },
    {
      key: 'forget',
      header: <span className="sr-only">Take off the list</span>,
      className: 'w-10',
      cell: (row) => (
        <IconButton
          label={`Take ${row.name} off the list`}
          unavailable={barred}
          onClick={() => setLeaving(row)}
        >
          <Trash2 size={14} aria-hidden />
        </IconButton>
      ),
    },
  ]

  return (
    <>
      <VirtualTable
        label="Imported candidates"
        count={total}
        rowAt={rowAt}
        rowKey={(row) => row.key}
        columns={columns}
        onVisible={onVisible}
        rowProps={(row) => ({
          className: selected.has(row.key) ? 'bg-action-wash' : 'hover:bg-action-wash',
        })}
      />
      <ConfirmDialog
        open={leaving !== null}
        title="Take it off the list?"
        word="Take it off the list"
        onOpenChange={(open) => !open && setLeaving(null)}
        onConfirm={() =>
          leaving &&
          forget.mutate(leaving.key, {
            onSuccess: () => onSelect(leaving.key, false),
            onError: (error) => toast.error(explain(error)),
          })
        }
      >
        “{leaving?.name}” leaves the imported candidates. Its dossier, verdicts and places in shortlists stay.
      </ConfirmDialog>
    </>
  )
}
