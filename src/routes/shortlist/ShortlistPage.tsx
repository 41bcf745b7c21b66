import { useMemo, useState } from 'react'
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { Download } from 'lucide-react'
import { toast } from 'sonner'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { exportUrl, useShortlist } from '../../api/shortlists.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { RescoringProgress } from '../../components/shortlist/RescoringProgress.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { certificateWord } from '../../components/ui/CertificateMark.tsx'
import { ConditionChips, ConditionFields } from './ColumnConditions.tsx'
import { ExternalDialog } from './ExternalDialog.tsx'
import { conditionParts, listColumns, type ListColumn } from './listColumns.ts'
import { ProvenanceSection } from './Provenance.tsx'
import { RescoreDialog } from './RescoreDialog.tsx'
import { certificateStates, isForOther, readView, visibleRows, type ShortlistView } from './shortlistView.ts'
import { Triage } from './Triage.tsx'

export function ShortlistPage() {
  const { campaignId = '', shortlistId = '' } = useParams()
  const shortlist = useShortlist(campaignId, shortlistId)
  return (
    <QueryView query={shortlist} what="the shortlist" shape="page">
      {(detail) => <Shortlist campaign={campaignId} shortlist={detail} />}
    </QueryView>
  )
}

function Shortlist({ campaign, shortlist }: { campaign: string; shortlist: ShortlistDetail }) {
  const [search, setSearch] = useSearchParams()
  const view = useMemo(() => readView(search), [search])
  const columns = useMemo(() => listColumns(shortlist), [shortlist])
  const rows = useMemo(() => visibleRows(shortlist, columns, view), [shortlist, columns, view])
  /** A list writes a part of the address as often as it has entries. */
  const change = (changes: Record<string, string | readonly string[]>) =>
    setSearch(
      (before) => {
        const next = new URLSearchParams(before)
        for (const [name, value] of Object.entries(changes)) {
          next.delete(name)
          for (const one of typeof value === 'string' ? [value] : value) {
            if (one !== '') next.append(name, one)
          }
        }
        return next
      },
      // At once: the next key must already mean the row that was just taken in hand.
      { replace: true, flushSync: true },
    )
  const clear = () =>
    change({
      verdict: '',
      certificate: '',
      hits: '',
      text: '',
      ...Object.fromEntries(
        view.conditions.flatMap(({ column }) => conditionParts(column)).map((part) => [part, '']),
      ),
    })
  return (
    <>
      <PageHead
        title={shortlist.name}
        above={
          <Link to={`/campaigns/${campaign}/shortlists`} className="hover:underline">
            Shortlists
          </Link>
        }
        actions={
          <>
            <ListActions campaign={campaign} shortlist={shortlist} />
            <ExportLink campaign={campaign} shortlist={shortlist.id} format="csv" />
            <ExportLink campaign={campaign} shortlist={shortlist.id} format="json" />
          </>
        }
      >
        <Link
          to={`/campaigns/${campaign}/targets/${shortlist.targetId}`}
          className="text-action hover:underline"
        >
          {shortlist.targetName}
        </Link>
        , version {shortlist.targetVersion}; {formatNumber(shortlist.size)} candidates{' '}
        {shortlist.searches.length === 0 ? (
          <Link to={`/campaigns/${campaign}/imported`} className="text-action hover:underline">
            imported
          </Link>
        ) : (
          'from '
        )}
        {shortlist.searches.map(({ id, name }, index) => (
          <span key={id}>
            {index > 0 && ', '}
            <Link to={`/campaigns/${campaign}/searches/${id}`} className="text-action hover:underline">
              {name}
            </Link>
          </span>
        ))}
        .
      </PageHead>
      <div className="mb-3 flex flex-wrap items-end justify-between gap-x-8 gap-y-3">
        <Filters view={view} shortlist={shortlist} columns={columns} onChange={change} />
        <Caution />
      </div>
      <ConditionChips columns={columns} conditions={view.conditions} onChange={change} />
      <Rescorings campaign={campaign} shortlist={shortlist.id} />
      {rows.length === 0 ? (
        <Empty
          title={shortlist.rows.length === 0 ? 'The shortlist is empty.' : 'No candidate matches the filter.'}
        >
          {shortlist.rows.length === 0 ? (
            'Nothing feasible had been found when it was made.'
          ) : (
            <Button onClick={clear}>Show all candidates</Button>
          )}
        </Empty>
      ) : (
        <Triage
          campaign={campaign}
          shortlist={shortlist}
          rows={rows}
          columns={columns}
          view={view}
          onHidden={(hide) => change({ hide })}
          onSort={(sort) =>
            change({
              sort: sort === 'rank' ? '' : sort,
              order: sort === view.sort && !view.descending ? 'desc' : '',
            })
          }
          current={search.get('row')}
          onCurrent={(key) => change({ row: key ?? '' })}
        />
      )}
      <ProvenanceSection campaign={campaign} shortlist={shortlist} />
    </>
  )
}

function ListActions({ campaign, shortlist }: { campaign: string; shortlist: ShortlistDetail }) {
  const barred = useBarred('shortlists.edit')
  const [open, setOpen] = useState<'rescore' | 'external' | null>(null)
  const follow = (dialog: 'rescore' | 'external') => (on: boolean) => setOpen(on ? dialog : null)
  return (
    <>
      <ActionButton
        action={{
          ...{ id: 'shortlist.rescore', label: 'Score anew', section: 'Shortlist' },
          ...{ unavailable: barred, run: () => setOpen('rescore') },
        }}
      />
      <ActionButton
        action={{
          ...{ id: 'shortlist.external', label: 'External columns', section: 'Shortlist' },
          run: () => setOpen('external'),
        }}
      />
      <RescoreDialog
        campaign={campaign}
        shortlist={shortlist}
        open={open === 'rescore'}
        onOpenChange={follow('rescore')}
      />
      <ExternalDialog
        campaign={campaign}
        shortlist={shortlist.id}
        open={open === 'external'}
        onOpenChange={follow('external')}
      />
    </>
  )
}

/** Re-scorings of this list that are under way; the list that comes of one is offered. */
function Rescorings({ campaign, shortlist }: { campaign: string; shortlist: string }) {
  const navigate = useNavigate()
  return (
    <RescoringProgress
      campaign={campaign}
      fits={({ fromId }) => fromId === shortlist}
      onFinished={(id) =>
        toast('The list has been scored anew.', {
          duration: 20_000,
          action: {
            label: 'Open the new list',
            onClick: () => void navigate(`/campaigns/${campaign}/shortlists/${id}`),
          },
        })
      }
    />
  )
}

function ExportLink({
  campaign,
  shortlist,
  format,
}: {
  campaign: string
  shortlist: string
  format: 'csv' | 'json'
}) {
  const barred = useBarred('exports.read')
  const label = `Export ${format.toUpperCase()}`
  return (
    <ActionButton
      action={{
        ...{ id: `shortlist.${format}`, label, section: 'Shortlist', unavailable: barred },
        file: exportUrl(campaign, shortlist, format),
      }}
    >
      <Download size={14} aria-hidden />
      {label}
    </ActionButton>
  )
}

function Filters({
  view,
  shortlist,
  columns,
  onChange,
}: {
  view: ShortlistView
  shortlist: ShortlistDetail
  columns: readonly ListColumn[]
  onChange: (changes: Record<string, string>) => void
}) {
  const others = shortlist.rows.filter((row) => isForOther(row, shortlist)).length
  const { size, undecided, verified, rejected } = shortlist
  return (
    <form
      role="search"
      aria-label="Filter the shortlist"
      className="flex flex-wrap items-end gap-3"
      onSubmit={(event) => event.preventDefault()}
    >
      <Select
        label="Verdict"
        value={view.verdict}
        onChange={(event) => onChange({ verdict: event.target.value === 'all' ? '' : event.target.value })}
        options={[
          ['all', `all (${size})`],
          ['undecided', `undecided (${undecided})`],
          ['verified', `verified (${verified})`],
          ['rejected', `rejected (${rejected})`],
          ...(others > 0 || view.verdict === 'other-version'
            ? [['other-version', `given for another version (${others})`] as const]
            : []),
        ]}
      />
      <Select
        label="Certificate"
        value={view.certificate}
        onChange={(event) =>
          onChange({ certificate: event.target.value === 'all' ? '' : event.target.value })
        }
        options={[
          ['all', `all (${size})`],
          ...certificateStates.map((state) => {
            const count = shortlist.rows.filter(({ certificate }) => certificate.state === state).length
            return [state, `${certificateWord(state)} (${count})`] as const
          }),
        ]}
      />
      <TextField
        label="Polytope or key"
        value={view.text}
        onChange={(event) => onChange({ text: event.target.value })}
      />
      <ConditionFields columns={columns} conditions={view.conditions} onChange={onChange} />
      <label className="flex min-h-8 items-center gap-2">
        <input
          type="checkbox"
          checked={view.hits}
          onChange={(event) => onChange({ hits: event.target.checked ? 'yes' : '' })}
        />
        hits only
      </label>
    </form>
  )
}
