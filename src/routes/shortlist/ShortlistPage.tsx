import { useMemo } from 'react'
import { useParams } from 'react-router-dom'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { useSession } from '../../api/session.ts'
import { useShortlist } from '../../api/shortlists.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { ConditionChips } from './ColumnConditions.tsx'
import { Issues } from './Issues.tsx'
import { listColumns } from './listColumns.ts'
import { ListFilters } from './ListFilters.tsx'
import { ListHead, Rescorings } from './ListHead.tsx'
import { ProvenanceSection } from './Provenance.tsx'
import { unknownColumns, visibleRows } from './shortlistView.ts'
import { Triage } from './Triage.tsx'
import { useListAddress } from './useListAddress.ts'

export function ShortlistPage() {
  const { campaignId = '', shortlistId = '' } = useParams()
  const shortlist = useShortlist(campaignId, shortlistId)
  return (
    <QueryView query={shortlist} what="the shortlist" shape="page">
      {(detail) => <Shortlist key={detail.id} campaign={campaignId} shortlist={detail} />}
    </QueryView>
  )
}

function Shortlist({ campaign, shortlist }: { campaign: string; shortlist: ShortlistDetail }) {
  const me = useSession().data?.account?.id ?? null
  const address = useListAddress()
  const { view, change } = address
  const columns = useMemo(() => listColumns(shortlist), [shortlist])
  const rows = useMemo(() => visibleRows(shortlist, columns, view, me), [shortlist, columns, view, me])
  const unknown = unknownColumns(view, columns)
  return (
    <>
      <ListHead campaign={campaign} shortlist={shortlist} />
      <Issues campaign={campaign} list={shortlist} />
      <div className="mb-3 flex flex-wrap items-end justify-between gap-x-8 gap-y-3">
        <ListFilters view={view} list={shortlist} columns={columns} me={me} onChange={change} />
        <Caution />
      </div>
      <ConditionChips columns={columns} conditions={view.conditions} onChange={change} />
      {unknown.length > 0 && (
        <p role="status" className="mb-2 text-soft">
          The address names {unknown.length === 1 ? 'a column' : 'columns'} that this list does not have,
          without effect: {unknown.join(', ')}.
        </p>
      )}
      <Rescorings campaign={campaign} shortlist={shortlist.id} />
      {rows.length === 0 ? (
        <Empty
          title={shortlist.rows.length === 0 ? 'The shortlist is empty.' : 'No candidate matches the filter.'}
        >
          {shortlist.rows.length === 0 ? (
            'Nothing feasible had been found when it was made.'
          ) : (
            <Button onClick={address.showAll}>Show all candidates</Button>
          )}
        </Empty>
      ) : (
        <Triage
          campaign={campaign}
          list={shortlist}
          rows={rows}
          columns={columns}
          address={address}
          me={me}
        />
      )}
      <ProvenanceSection campaign={campaign} shortlist={shortlist} />
    </>
  )
}
