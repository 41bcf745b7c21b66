import { useMemo } from 'react'
import { Link, useParams, useSearchParams } from 'react-router-dom'
import { Download } from 'lucide-react'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { exportUrl, useShortlist } from '../../api/shortlists.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { PageHead, Section } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { formatNumber, formatTime } from '../../lib/numbers.ts'
import { certificateWord } from '../../components/ui/CertificateMark.tsx'
import { certificateStates, readView, visibleRows, type ShortlistView } from './shortlistView.ts'
import { Triage } from './Triage.tsx'

export function ShortlistPage() {
  const { campaignId = '', shortlistId = '' } = useParams()
  const shortlist = useShortlist(campaignId, shortlistId)
  return (
    <QueryView query={shortlist} what="the shortlist">
      {(detail) => <Shortlist campaign={campaignId} shortlist={detail} />}
    </QueryView>
  )
}

function Shortlist({ campaign, shortlist }: { campaign: string; shortlist: ShortlistDetail }) {
  const [search, setSearch] = useSearchParams()
  const view = useMemo(() => readView(search), [search])
  const rows = useMemo(() => visibleRows(shortlist.rows, view), [shortlist.rows, view])
  const change = (changes: Record<string, string>) =>
    setSearch(
      (before) => {
        const next = new URLSearchParams(before)
        for (const [name, value] of Object.entries(changes)) {
          if (value === '') next.delete(name)
          else next.set(name, value)
        }
        return next
      },
      { replace: true },
    )
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
        <Filters view={view} shortlist={shortlist} onChange={change} />
        <Caution />
      </div>
      {rows.length === 0 ? (
        <Empty
          title={shortlist.rows.length === 0 ? 'The shortlist is empty.' : 'No candidate matches the filter.'}
        >
          {shortlist.rows.length === 0 ? (
            'Nothing feasible had been found when it was made.'
          ) : (
            <Button onClick={() => change({ verdict: '', certificate: '', hits: '', text: '' })}>
              Show all candidates
            </Button>
          )}
        </Empty>
      ) : (
        <Triage
          campaign={campaign}
          shortlist={shortlist}
          rows={rows}
          sort={view.sort}
          descending={view.descending}
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
      <Section
        title="The rule it was ranked by"
        note={`Engine ${shortlist.engineVersion}; made ${formatTime(shortlist.createdAt)} by ${shortlist.author}.`}
      >
        <pre
          tabIndex={0}
          aria-label="The rule"
          className="max-h-64 overflow-auto font-mono text-xs leading-5"
        >
          {shortlist.rule}
        </pre>
        <p className="mt-2 font-mono text-xs break-all text-soft">{shortlist.scoringHash}</p>
      </Section>
    </>
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
  if (barred) return <Button unavailable={barred}>Export {format.toUpperCase()}</Button>
  return (
    <a
      href={exportUrl(campaign, shortlist, format)}
      download
      className="inline-flex min-h-8 items-center gap-1.5 rounded border border-edge bg-sheet px-3 font-medium hover:bg-action-wash"
    >
      <Download size={14} aria-hidden />
      Export {format.toUpperCase()}
    </a>
  )
}

function Filters({
  view,
  shortlist,
  onChange,
}: {
  view: ShortlistView
  shortlist: ShortlistDetail
  onChange: (changes: Record<string, string>) => void
}) {
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
