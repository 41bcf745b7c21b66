import { useCallback, useEffect, useMemo } from 'react'
import { useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { Download, Square } from 'lucide-react'
import { explorationMinutes } from '../../../shared/explorations.ts'
import { explorationTableUrl } from '../../api/explorations.ts'
import { ApiError } from '../../api/request.ts'
import { LibraryLoading, useLibraryLoading } from '../../components/library/LibraryLoading.tsx'
import { describeScope } from '../../components/scope/scopeAddress.ts'
import { isEmptyScope } from '../../components/scope/ScopeFields.tsx'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Progress } from '../../components/ui/Progress.tsx'
import { Empty, Failure, Loading } from '../../components/ui/States.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { remember } from '../../lib/remembered.ts'
import { ColumnFields, draftFaults } from './ColumnFields.tsx'
import { changedExplore, readExplore, requestOf, type ExploreView } from './exploreAddress.ts'
import { Findings } from './Findings.tsx'
import { NullSourceFields, PlaceFields, SearchSource } from './SourceFields.tsx'
import { targetDraft } from './targetDraft.ts'
import { useExploration, type ExplorationState } from './useExploration.ts'

/** Observables over a null sample before any rule is written, or over the evaluations of a search. */
export function ExplorePage() {
  const { campaignId = '' } = useParams()
  const [address, setAddress] = useSearchParams()
  const view = useMemo(() => readExplore(address), [address])
  const change = useCallback(
    (parts: Partial<ExploreView>) => setAddress((old) => changedExplore(old, parts), { replace: true }),
    [setAddress],
  )
  // Other columns: selection and axes belong to the old ones.
  const onColumns = useCallback(
    (columns: string[]) => change({ columns, ranges: new Map(), log: [], by: 0 }),
    [change],
  )
  const sound = useMemo(
    () =>
      draftFaults(view.columns).every((fault) => fault === null) &&
      !(view.search === null && isEmptyScope(view.scope)),
    [view],
  )
  const state = useExploration(campaignId, requestOf(view), sound)
  const { exploration } = state

  return (
    <>
      <PageHead title="Explore" actions={<Commands campaign={campaignId} view={view} state={state} />}>
        {view.search === null
          ? 'How observables lie on candidates nobody selected, before a rule is written.'
          : 'How observables lie on the candidates a search looked at.'}
      </PageHead>
      <div className="grid grid-cols-1 gap-x-8 gap-y-6 border-t pt-4 lg:grid-cols-[340px_minmax(0,1fr)]">
        <div className="flex min-w-0 flex-col gap-5">
          <section aria-labelledby="explore-candidates">
            <h2 id="explore-candidates" className="mb-2 text-base">
              Candidates
            </h2>
            {view.search === null ? (
              <NullSourceFields campaign={campaignId} view={view} onChange={change} />
            ) : (
              <SearchSource
                campaign={campaignId}
                search={view.search}
                name={exploration?.search?.name ?? null}
              />
            )}
          </section>
          <section aria-labelledby="explore-columns">
            <h2 id="explore-columns" className="mb-2 text-base">
              Columns
            </h2>
            <ColumnFields columns={view.columns} onColumns={onColumns} />
          </section>
          <PlaceFields at={view.at} onChange={(at) => change({ at })} />
        </div>
        <div className="min-w-0">
          <Answer campaign={campaignId} view={view} onChange={change} state={state} />
        </div>
      </div>
    </>
  )
}

function Commands({
  campaign,
  view,
  state: { exploration, rows, outdated },
}: {
  campaign: string
  view: ExploreView
  state: ExplorationState
}) {
  const navigate = useNavigate()
  const barred = useBarred('targets.edit')
  const scored = exploration?.columns[view.by]
  const write = () => {
    if (!exploration) return
    const about = exploration.search
      ? `${counted(rows.length, 'evaluation')} of ${exploration.search.name}`
      : `${counted(rows.length, 'null candidate')} from ${describeScope(view.scope)}`
    if (!exploration.search) remember(`scope.${campaign}`, JSON.stringify(view.scope))
    void navigate(`/campaigns/${campaign}/targets/new`, {
      state: { draft: targetDraft(exploration.columns, view.by, exploration.at, about) },
    })
  }
  const empty = rows.length === 0 || outdated
  return (
    <>
      {(['csv', 'json'] as const).map((format) => (
        <ActionButton
          key={format}
          action={{
            ...{
              id: `explore.${format}`,
              label: `Export table, ${format.toUpperCase()}`,
              section: 'Explore',
            },
            file: explorationTableUrl(campaign, exploration?.id ?? '', format),
            unavailable: empty && 'There are no rows to export yet.',
          }}
        >
          <Download size={14} aria-hidden />
          Export table, {format.toUpperCase()}
        </ActionButton>
      ))}
      <ActionButton
        kind="primary"
        action={{
          ...{ id: 'explore.target', label: 'Write a target from this', section: 'Explore', run: write },
          unavailable:
            barred ||
            (empty && 'There is nothing to write a target from yet.') ||
            (scored?.type === 'truth' && 'A score is a number; order by a column that is no truth value.'),
        }}
      />
    </>
  )
}

function Answer({
  campaign,
  view,
  onChange,
  state,
}: {
  campaign: string
  view: ExploreView
  onChange: (change: Partial<ExploreView>) => void
  state: ExplorationState
}) {
  const { exploration, rows, outdated, error, again, stop } = state
  const nothingYet = error instanceof ApiError && error.code === 'scope-empty'
  const loading = useLibraryLoading(campaign, nothingYet)
  const loaded = loading?.loaded
  useEffect(() => {
    if (loaded !== undefined) again()
  }, [loaded, again])
  if (nothingYet && loading)
    return (
      <Empty title="None of the polytopes loaded so far matches.">
        <LibraryLoading loading={loading} />
        <p className="mt-2">The columns are computed by themselves when one arrives.</p>
      </Empty>
    )
  if (error !== null && error !== undefined)
    return <Failure title="The columns could not be computed." error={error} retry={again} />
  if (!exploration) {
    if (isEmptyScope(view.scope) && view.search === null)
      return <Empty title="Choose what to draw candidates from." />
    return <Loading what="the sample" />
  }
  const { state: at, message, evaluated, size, law } = exploration
  return (
    <>
      <div
        role="status"
        className="mb-3 flex min-h-8 flex-wrap items-center gap-x-3 gap-y-1 text-xs text-soft"
      >
        {outdated ? (
          'Changed since; a new answer is on its way.'
        ) : at === 'running' ? (
          <>
            <span className="whitespace-nowrap">
              {formatNumber(evaluated)} of {formatNumber(size)}
            </span>
            <div className="min-w-24 flex-1">
              <Progress value={evaluated} most={size} label="Candidates evaluated" />
            </div>
            <Button
              kind="quiet"
              onClick={stop}
              title={`It ends by itself after ${explorationMinutes} minutes.`}
            >
              <Square size={12} aria-hidden />
              Stop
            </Button>
          </>
        ) : (
          <span className="prose-line">
            {counted(evaluated, 'candidate')}
            {evaluated < size && ` of ${formatNumber(size)}`} on {counted(exploration.polytopes, 'polytope')}.{' '}
            {law}
          </span>
        )}
        {!outdated && at !== 'running' && at !== 'done' && (
          <span className="flex items-center gap-2">
            {message ?? 'Stopped.'}
            <Button kind="quiet" onClick={again}>
              Go on
            </Button>
          </span>
        )}
      </div>
      <div className={outdated ? 'border-l-2 border-dashed border-null pl-3' : ''}>
        <Findings campaign={campaign} exploration={exploration} rows={rows} view={view} onChange={onChange} />
      </div>
    </>
  )
}
