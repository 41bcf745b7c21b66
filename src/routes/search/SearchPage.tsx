import { useMemo } from 'react'
import { Link, useParams } from 'react-router-dom'
import { type SearchDetail } from '../../../shared/searches.ts'
import { useSearch } from '../../api/searches.ts'
import { BestCurves } from '../../components/charts/BestCurves.tsx'
import { describeScope } from '../../components/scope/scopeAddress.ts'
import { Caution } from '../../components/ui/Caution.tsx'
import { Facts, PageHead, Section } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Progress } from '../../components/ui/Progress.tsx'
import { ScoredTable } from '../../components/ui/ScoredTable.tsx'
import { SearchStanding } from '../../components/ui/SearchStanding.tsx'
import { SearchStateMark } from '../../components/ui/SearchStateMark.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { nullCurves } from '../../lib/againstNull.ts'
import { counted, formatDuration, formatNumber, formatPercent } from '../../lib/numbers.ts'
import { AgainstNull } from './AgainstNull.tsx'
import { EventLog } from './EventLog.tsx'
import { NullFacts } from './NullFacts.tsx'
import { IslandTable } from './IslandTable.tsx'
import { RunFacts } from './RunFacts.tsx'
import { SearchCommands } from './SearchCommands.tsx'
import { SurrogateFacts } from './SurrogateFacts.tsx'

export function SearchPage() {
  const { campaignId = '', searchId = '' } = useParams()
  const search = useSearch(campaignId, searchId)
  return (
    <QueryView query={search} what="the search" shape="page">
      {(detail) => <Search campaign={campaignId} search={detail} />}
    </QueryView>
  )
}

function Search({ campaign, search }: { campaign: string; search: SearchDetail }) {
  const { progress } = search
  const { curve, evaluations } = progress
  const runs = useMemo(() => [{ label: 'this search', curve, evaluations }], [curve, evaluations])
  const sample = useMemo(() => nullCurves(search.null), [search.null])
  return (
    <>
      <PageHead
        title={search.name}
        above={
          <Link to={`/campaigns/${campaign}/searches`} className="hover:underline">
            Searches
          </Link>
        }
        actions={<SearchCommands campaign={campaign} search={search} />}
      >
        {search.method} over {describeScope(search.scope)} for{' '}
        <Link
          to={`/campaigns/${campaign}/targets/${search.targetId}`}
          className="text-action hover:underline"
        >
          {search.targetName}
        </Link>
        , version {search.targetVersion}
      </PageHead>
      {search.imported && (
        <p className="prose-line mb-4 border-l-2 border-line pl-3">
          <strong className="font-medium">Imported result</strong> from {search.imported.source}: it was run
          elsewhere. {counted(search.imported.checked, 'listed candidate')} placed and scored again here;
          counts, curve and null sample are as the file reports them.
        </p>
      )}
      {search.failure && (
        <div role="alert" className="mb-4 border-l-2 border-rejected pl-3">
          <p className="font-medium">The search failed; what it had found until then is kept.</p>
          <p className="prose-line">{search.failure.message}</p>
          <p className="font-mono text-xs text-soft">{search.failure.code}</p>
        </div>
      )}
      <StateLine search={search} />
      <div className="grid grid-cols-1 gap-x-8 gap-y-4 border-t py-4 lg:grid-cols-[minmax(0,1fr)_300px]">
        {progress.curve.length > 0 ? (
          <BestCurves runs={runs} sample={sample} budget={progress.budget ?? search.budget} />
        ) : (
          <Empty title="No feasible candidate yet.">
            {search.state === 'queued'
              ? queueWords(search.ahead)
              : progress.evaluations > 0
                ? `${counted(progress.evaluations, 'class', 'classes')} evaluated so far, none of which meets every require.`
                : 'The curve appears with the first report of a worker.'}
          </Empty>
        )}
        <Figures search={search} />
      </div>
      <Section title="Best candidates" note="The best distinct classes so far, at most 20.">
        {search.top.length > 0 ? (
          <ScoredTable ranked label="Best candidates" rows={search.top} campaign={campaign} />
        ) : (
          <Empty title="Nothing to show yet." />
        )}
        <Caution className="mt-3" />
      </Section>
      <div className="grid grid-cols-1 gap-x-8 lg:grid-cols-2">
        <Section title="Null sample" note="The same rule on candidates nobody selected.">
          <NullFacts summary={search.null} />
        </Section>
        <div>
          <Section title="Against the null" note="What chance would have found with the same rule.">
            <AgainstNull search={search} />
          </Section>
          <Section title="Islands">
            <IslandTable search={search} />
          </Section>
          <Section title="Surrogate" note="What chose among proposals; it never decides a rank.">
            <SurrogateFacts search={search} />
          </Section>
        </div>
      </div>
      <Section title="Log" note="What happened to the search, and who did it.">
        <EventLog events={search.events} />
      </Section>
      <Section title="How it was run">
        <div className="grid grid-cols-1 gap-x-8 gap-y-4 lg:grid-cols-2">
          <RunFacts campaign={campaign} search={search} />
          <pre
            tabIndex={0}
            aria-label="The rule"
            className="max-h-64 overflow-auto border-l-2 border-line pl-3 font-mono text-xs leading-5"
          >
            {search.rule}
          </pre>
        </div>
      </Section>
    </>
  )
}

const queueWords = (ahead: number | null) =>
  ahead
    ? `The search waits for a free worker, behind ${counted(ahead, 'search', 'searches')} queued before it.`
    : 'The search waits for a free worker.'

function StateLine({ search }: { search: SearchDetail }) {
  const { progress } = search
  const budget = progress.budget ?? search.budget
  return (
    <div className="mb-4 flex flex-wrap items-center gap-x-6 gap-y-2">
      <SearchStateMark state={search.state} />
      <SearchStanding standing={search.standing} />
      <div className="flex min-w-60 flex-1 items-center gap-3">
        <Progress value={progress.evaluations} most={budget} label="Evaluations" />
        <span className="whitespace-nowrap">
          {formatNumber(progress.evaluations)} of {formatNumber(budget)}
        </span>
      </div>
      {search.state === 'running' && progress.secondsLeft !== null && (
        <span className="text-soft">about {formatDuration(progress.secondsLeft)} left</span>
      )}
      {search.state === 'queued' && (
        <span className="text-soft">
          {search.ahead ? `${formatNumber(search.ahead)} before it` : 'next in the queue'}
        </span>
      )}
      {search.extensions.length > 0 && (
        <span className="text-soft">
          extended by {search.extensions.map((more) => formatNumber(more)).join(', ')}
        </span>
      )}
      {progress.exhausted && (
        <span className="text-soft">The space is exhausted: no new class turns up any more.</span>
      )}
    </div>
  )
}

function Figures({ search }: { search: SearchDetail }) {
  const { progress } = search
  const nullBest = search.null?.best ?? null
  return (
    <Facts
      className="content-start"
      rows={[
        ['Best score', <Num key="v" value={progress.best} digits={6} className="font-medium text-found" />],
        [
          'Best of the null',
          <span key="v" className="text-null">
            <Num value={nullBest} digits={6} />
            {search.null && nullBest !== null && ` of ${formatNumber(search.null.evaluated)}`}
          </span>,
        ],
        ['Distinct classes', <Num key="v" value={progress.evaluations} />],
        ['Feasible', <Num key="v" value={progress.feasible} />],
        ['Infeasible', <Num key="v" value={progress.infeasible} />],
        ['Undefined', <Num key="v" value={progress.undefined} />],
        ['Proposals', <Num key="v" value={progress.proposals} />],
        ['Acceptance', progress.proposals > 0 ? formatPercent(progress.accepted / progress.proposals) : '–'],
        ['Restarts', <Num key="v" value={progress.restarts} />],
        ['Evaluations per second', <Num key="v" value={progress.evaluationsPerSecond} digits={3} />],
      ]}
    />
  )
}
