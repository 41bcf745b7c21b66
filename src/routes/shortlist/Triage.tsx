import { useMemo, useState } from 'react'
import { ChartScatter, Grid3x3, Table2 } from 'lucide-react'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { type VerdictValue } from '../../../shared/verdicts.ts'
import { explain } from '../../api/request.ts'
import { useRequestCertification } from '../../api/certificates.ts'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { outcomeFormat } from '../../components/ui/Outcome.tsx'
import { VerdictDialog } from '../../components/verdict/VerdictDialog.tsx'
import { AssignSelect } from './AssignSelect.tsx'
import { CandidateTable } from './CandidateTable.tsx'
import { ColumnChooser } from './ColumnConditions.tsx'
import { DecisionBar } from './DecisionBar.tsx'
import { type ListColumn } from './listColumns.ts'
import { ListScatter, scatterColumns } from './ListScatter.tsx'
import { PictureGrid } from './PictureGrid.tsx'
import { SelectionBar } from './SelectionBar.tsx'
import { nextKey } from './shortlistView.ts'
import { useDecisions } from './useDecisions.ts'
import { type ListAddress } from './useListAddress.ts'
import { useSelection } from './useSelection.ts'
import { useTriageActions } from './useTriageActions.ts'
import { ViewMenu } from './ViewMenu.tsx'

interface TriageProps {
  campaign: string
  list: ShortlistDetail
  rows: readonly ShortlistRow[]
  /** All columns of the list. */
  columns: readonly ListColumn[]
  address: ListAddress
  /** Identifier of the account that looks. */
  me: string | null
}

/** The rows that are shown, as a table or as pictures, and everything that is decided about them. */
export function Triage({ campaign, list, rows, columns, address, me }: TriageProps) {
  const { view, current, change, step } = address
  const barred = useBarred('verdicts.give')
  const twoReaders = useCurrentCampaign()?.secondReader ?? false
  const shown = useMemo(() => rows.map(({ candidateKey }) => candidateKey), [rows])
  const selection = useSelection(shown)
  const [asked, setAsked] = useState<string | null>(null)
  const [abreast, setAbreast] = useState(1)
  const format = useMemo(() => outcomeFormat(list.rows.map(({ outcome }) => outcome)), [list.rows])
  const onCurrent = (key: string | null) => change({ row: key ?? '' })
  const decisions = useDecisions(campaign, list, onCurrent)

  const found = current === null ? -1 : shown.indexOf(current)
  const at = found >= 0 ? found : 0
  const row = rows[at]
  const dossier = (key: string) => `/candidates/${key}?campaign=${campaign}&shortlist=${list.id}`

  const decide = (chosen: ShortlistRow, value: VerdictValue, reason = '') => {
    setAsked(null)
    const following = nextKey(rows, chosen.candidateKey)
    decisions.decide([chosen], value, reason)
    onCurrent(following)
  }
  const ask = (value: VerdictValue) => {
    if (!row) return
    // On a passing certificate one key decides; without one a reason is asked for.
    if (value === 'verified' && row.certificate.state !== 'passed') setAsked(row.candidateKey)
    else decide(row, value)
  }
  const pictures = view.show === 'pictures'
  const { move } = useTriageActions({
    ...{ rows, at, me, barred, selection, dossier, onCurrent },
    abreast: pictures ? abreast : 1,
    onDecide: ask,
    onUndo: decisions.undo,
  })
  const [first, second] = scatterColumns(columns).filter(({ name }) => name !== 'rank')
  const common = { rows, at, follow: current !== null, selection, twoReaders, format, onCurrent }

  return (
    <div>
      <SelectionBar campaign={campaign} shortlist={list} selection={selection} decisions={decisions}>
        <ViewMenu campaign={campaign} shortlist={list.id} shown={address.saved} onOpen={address.open} />
        {first && (
          <Button
            kind="quiet"
            aria-pressed={view.scatter !== null}
            onClick={() =>
              step(view.scatter ? { across: '', up: '' } : { across: (second ?? first).name, up: first.name })
            }
          >
            <ChartScatter size={15} aria-hidden />
            Scatter
          </Button>
        )}
        <Button
          kind="quiet"
          aria-pressed={pictures}
          onClick={() => step({ show: pictures ? '' : 'pictures' })}
        >
          {pictures ? <Table2 size={15} aria-hidden /> : <Grid3x3 size={15} aria-hidden />}
          {pictures ? 'Table' : 'Pictures'}
        </Button>
        {!pictures && (
          <ColumnChooser columns={columns} hidden={view.hidden} onHidden={(hide) => change({ hide })} />
        )}
      </SelectionBar>
      {view.scatter && (
        <ListScatter
          rows={rows}
          columns={columns}
          {...view.scatter}
          selection={selection}
          onChange={(axis, column) => change({ [axis]: column })}
          onClose={() => step({ across: '', up: '' })}
        />
      )}
      {pictures ? (
        <PictureGrid {...common} version={list.targetVersion} onAbreast={setAbreast} />
      ) : (
        <CandidateTable
          {...common}
          {...{ campaign, list, columns, view }}
          onSort={(sort) =>
            change({
              sort: sort === 'rank' ? '' : sort,
              order: sort === view.sort && !view.descending ? 'desc' : '',
            })
          }
        />
      )}
      {row && (
        <DecisionBar
          row={row}
          version={list.targetVersion}
          place={`${at + 1} of ${rows.length} shown`}
          barred={barred}
          twoReaders={twoReaders}
          dossier={dossier(row.candidateKey)}
          assign={
            <AssignSelect
              campaign={campaign}
              targetId={list.targetId}
              candidateKeys={[row.candidateKey]}
              label={`Assign rank ${row.rank} to`}
            />
          }
          onDecide={ask}
          onStep={move}
        />
      )}
      <OverrideDialog
        campaign={campaign}
        list={list}
        asked={asked}
        onGive={(chosen, reason) => decide(chosen, 'verified', reason)}
        onClose={() => setAsked(null)}
      />
    </div>
  )
}

/** Asks for the reason of "verified" without a passing certificate, and offers to make one. */
function OverrideDialog({
  campaign,
  list,
  asked,
  onGive,
  onClose,
}: {
  campaign: string
  list: ShortlistDetail
  asked: string | null
  onGive: (row: ShortlistRow, reason: string) => void
  onClose: () => void
}) {
  const certify = useRequestCertification(campaign)
  // Looked up anew at each drawing: its certificate may have come meanwhile.
  const row = asked === null ? undefined : list.rows.find(({ candidateKey }) => candidateKey === asked)
  return (
    <VerdictDialog
      asked={
        row
          ? { value: 'verified', what: `The candidate of rank ${row.rank}`, certificate: row.certificate }
          : null
      }
      busy={false}
      fault={certify.isError ? explain(certify.error) : null}
      onGive={(reason) => row && onGive(row, reason)}
      certifying={certify.isPending}
      onCertify={() =>
        row &&
        certify.mutate({
          targetVersionId: list.targetVersionId,
          candidateKeys: [row.candidateKey],
          again: row.certificate.id !== null,
        })
      }
      onClose={() => {
        certify.reset()
        onClose()
      }}
    />
  )
}
