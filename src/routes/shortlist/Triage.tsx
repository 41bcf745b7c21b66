import { useMemo, useRef, useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { toast } from 'sonner'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { type VerdictValue } from '../../../shared/verdicts.ts'
import { useActions } from '../../actions/useActions.ts'
import { explain } from '../../api/request.ts'
import { useRequestCertification } from '../../api/certificates.ts'
import { useGiveVerdict } from '../../api/verdicts.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { outcomeFormat } from '../../components/ui/Outcome.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { VerdictDialog } from '../../components/verdict/VerdictDialog.tsx'
import { ColumnChooser } from './ColumnConditions.tsx'
import { CertifyBar } from './CertifyBar.tsx'
import { DecisionBar } from './DecisionBar.tsx'
import { useSelection } from './useSelection.ts'
import { givenDecimals, type ListColumn } from './listColumns.ts'
import { nextKey, nextUndecided, type ShortlistView } from './shortlistView.ts'
import { triageColumns } from './triageColumns.tsx'

interface TriageProps {
  campaign: string
  shortlist: ShortlistDetail
  rows: readonly ShortlistRow[]
  /** All columns of the list. */
  columns: readonly ListColumn[]
  view: ShortlistView
  onSort: (sort: string) => void
  onHidden: (hidden: string[]) => void
  /** Key of the row in hand. */
  current: string | null
  onCurrent: (key: string | null) => void
}

export function Triage({
  campaign,
  shortlist,
  rows,
  columns: listed,
  view,
  onSort,
  onHidden,
  current,
  onCurrent,
}: TriageProps) {
  const navigate = useNavigate()
  const barred = useBarred('verdicts.give')
  const give = useGiveVerdict(campaign)
  const certify = useRequestCertification(campaign)
  const shown = useMemo(() => rows.map(({ candidateKey }) => candidateKey), [rows])
  const selection = useSelection(shown)
  const [askedKey, setAsked] = useState<string | null>(null)
  // Looked up anew at each drawing: its certificate may have come meanwhile.
  const asked = shortlist.rows.find(({ candidateKey }) => candidateKey === askedKey) ?? null
  const [fault, setFault] = useState<string | null>(null)
  const table = useRef<HTMLDivElement>(null)

  const format = useMemo(() => outcomeFormat(shortlist.rows.map(({ outcome }) => outcome)), [shortlist.rows])
  const decimals = useMemo(
    () =>
      shortlist.external.map((_, at) =>
        givenDecimals(shortlist.rows.map(({ external }) => external[at] ?? null)),
      ),
    [shortlist],
  )
  const found = rows.findIndex((row) => row.candidateKey === current)
  const at = found >= 0 ? found : 0
  const row = rows[at]
  const dossier = (key: string) => `/candidates/${key}?campaign=${campaign}&shortlist=${shortlist.id}`

  const decide = (chosen: ShortlistRow, value: VerdictValue, reason = '') => {
    const following = nextKey(rows, chosen.candidateKey)
    const before = chosen.verdict
    give.mutate(
      { key: chosen.candidateKey, targetVersionId: shortlist.targetVersionId, value, reason },
      {
        onSuccess: () => {
          setAsked(null)
          onCurrent(following)
          toast(`Rank ${chosen.rank}: ${value}`, {
            action: {
              label: 'Undo',
              onClick: () =>
                give.mutate({
                  key: chosen.candidateKey,
                  targetVersionId: shortlist.targetVersionId,
                  value: before?.value ?? 'undecided',
                  reason: before?.reason ?? '',
                }),
            },
          })
        },
        onError: (error) => {
          setFault(explain(error))
          if (value !== 'verified') toast.error(explain(error))
        },
      },
    )
  }
  const ask = (value: VerdictValue) => {
    if (!row) return
    setFault(null)
    // On a passing certificate one key decides; without one a reason is asked for.
    if (value === 'verified' && row.certificate.state !== 'passed') setAsked(row.candidateKey)
    else decide(row, value)
  }
  const move = (step: number) => {
    const next = rows[Math.min(rows.length - 1, Math.max(0, at + step))]
    if (next) onCurrent(next.candidateKey)
  }

  const act = (id: string, shortcut: string | string[], label: string, run: () => void) => ({
    ...{ id: `triage.${id}`, section: 'Triage', shortcut, label, run },
  })
  useActions([
    {
      ...act('verify', 'v', 'Verify (asks for a reason when there is no certificate)', () => ask('verified')),
      unavailable: barred,
    },
    { ...act('reject', 'r', 'Reject and go on', () => ask('rejected')), unavailable: barred },
    {
      ...act('undecided', 'u', 'Put back to undecided and go on', () => ask('undecided')),
      unavailable: barred,
    },
    act('next', ['j', 'ArrowDown'], 'Next candidate', () => move(1)),
    act('previous', ['k', 'ArrowUp'], 'Previous candidate', () => move(-1)),
    act('select', 'x', 'Select or let go', () => row && selection.toggle(row.candidateKey)),
    act('next-undecided', 'n', 'Next undecided', () => {
      const next = nextUndecided(rows, row?.candidateKey ?? null)
      if (next) onCurrent(next)
      else toast('No undecided candidate is left among those shown.')
    }),
    act('dossier', 'o', 'Open the dossier', () => row && void navigate(dossier(row.candidateKey))),
  ])

  const columns: Column<ShortlistRow>[] = [
    {
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
    },
    ...triageColumns({ campaign, list: shortlist, columns: listed, format, decimals, view, onSort }),
  ]

  return (
    <div ref={table}>
      <CertifyBar campaign={campaign} shortlist={shortlist} selection={selection}>
        <ColumnChooser columns={listed} hidden={view.hidden} onHidden={onHidden} />
      </CertifyBar>
      <VirtualTable
        label="Candidates"
        className="max-h-[62vh]"
        count={rows.length}
        rowAt={(index) => rows[index]}
        rowKey={(item) => item.candidateKey}
        columns={columns}
        current={current === null ? undefined : at}
        rowProps={(item, index) => ({
          className:
            index === at ? 'bg-action-wash shadow-[inset_3px_0_0_var(--action)]' : 'hover:bg-action-wash',
          'aria-current': index === at ? true : undefined,
          // A link in the row goes to its own page; taking the row in hand as well would navigate back at once.
          onClick: (event) => {
            if (!(event.target instanceof Element && event.target.closest('a, button, input')))
              onCurrent(item.candidateKey)
          },
        })}
      />
      {row && (
        <DecisionBar
          row={row}
          version={shortlist.targetVersion}
          place={`${at + 1} of ${rows.length} shown`}
          barred={barred}
          busy={give.isPending}
          dossier={dossier(row.candidateKey)}
          onDecide={ask}
          onStep={move}
        />
      )}
      <VerdictDialog
        asked={
          asked && {
            value: 'verified',
            what: `The candidate of rank ${asked.rank}`,
            certificate: asked.certificate,
          }
        }
        busy={give.isPending}
        fault={fault}
        onGive={(reason) => asked && decide(asked, 'verified', reason)}
        certifying={certify.isPending}
        onCertify={() =>
          asked &&
          certify.mutate(
            {
              targetVersionId: shortlist.targetVersionId,
              candidateKeys: [asked.candidateKey],
              again: asked.certificate.id !== null,
            },
            { onError: (error) => setFault(explain(error)) },
          )
        }
        onClose={() => setAsked(null)}
      />
    </div>
  )
}
