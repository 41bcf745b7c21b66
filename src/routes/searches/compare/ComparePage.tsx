import { useMemo } from 'react'
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { fewestCompared, type Comparison } from '../../../../shared/comparisons.ts'
import { useComparison } from '../../../api/comparisons.ts'
import { BestCurves } from '../../../components/charts/BestCurves.tsx'
import { runLooks } from '../../../components/charts/runLooks.ts'
import { ButtonLink } from '../../../components/ui/Button.tsx'
import { Caution } from '../../../components/ui/Caution.tsx'
import { PageHead, Section } from '../../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../../components/ui/States.tsx'
import { nullCurves } from '../../../lib/againstNull.ts'
import { compareAddress, readCompareView, type CompareView } from './compareAddress.ts'
import { ComparedList } from './ComparedList.tsx'
import { FigureTable } from './FigureTable.tsx'
import { SettingTable } from './SettingTable.tsx'
import { SharedCandidates } from './SharedCandidates.tsx'

/** Two to four searches of a campaign side by side. */
export function ComparePage() {
  const { campaignId = '' } = useParams()
  const [address] = useSearchParams()
  const view = readCompareView(address)
  return (
    <>
      <PageHead
        title="Searches side by side"
        above={
          <Link to={`/campaigns/${campaignId}/searches`} className="hover:underline">
            Searches
          </Link>
        }
      />
      {view.ids.length < fewestCompared ? (
        <Empty title="Nothing to compare yet.">
          <p className="mb-3">Tick two to four searches in the list, then “Compare”.</p>
          <ButtonLink to={`/campaigns/${campaignId}/searches`}>To the searches</ButtonLink>
        </Empty>
      ) : (
        <Compared campaign={campaignId} view={view} />
      )}
    </>
  )
}

function Compared({ campaign, view }: { campaign: string; view: CompareView }) {
  const comparison = useComparison(campaign, view.ids)
  return (
    <QueryView query={comparison} what="the searches">
      {(data) => <SideBySide campaign={campaign} view={view} comparison={data} />}
    </QueryView>
  )
}

function SideBySide({
  campaign,
  view,
  comparison,
}: {
  campaign: string
  view: CompareView
  comparison: Comparison
}) {
  const navigate = useNavigate()
  const change = (next: Partial<CompareView>) =>
    void navigate(compareAddress(campaign, { ...view, ...next }), {
      replace: true,
      preventScrollReset: true,
      flushSync: true,
    })
  const { sameScoring } = comparison
  return (
    <>
      <ComparedList campaign={campaign} searches={comparison.searches} onIds={(ids) => change({ ids })} />
      {!sameScoring && (
        <p role="note" className="prose-line mb-4 border-l-2 border-edge pl-3">
          These searches score by different rules or engine versions: their scores, and what counts as a hit,
          cannot be compared, and are left out. How they ran and which candidates they share can.
        </p>
      )}
      {sameScoring && <Curves comparison={comparison} />}
      <Section
        title="Figures"
        note={sameScoring && !comparison.sameNull && 'Each search beside the null sample of its own scope.'}
      >
        <FigureTable searches={comparison.searches} sameScoring={sameScoring} />
        {sameScoring && <Caution className="mt-3" />}
      </Section>
      <Section title="Settings">
        <SettingTable
          campaign={campaign}
          searches={comparison.searches}
          all={view.allSettings}
          onAll={(allSettings) => change({ allSettings })}
        />
      </Section>
      <Section
        title="Shared candidates"
        note="Which of the best candidates, by permanent address, more than one of the searches found."
      >
        <SharedCandidates
          campaign={campaign}
          comparison={comparison}
          best={view.best}
          onBest={(best) => change({ best })}
        />
      </Section>
    </>
  )
}

function Curves({ comparison: { searches, sameNull } }: { comparison: Comparison }) {
  const runs = useMemo(
    () =>
      searches.map(({ name, progress: { curve, evaluations } }, n) => ({
        label: `${runLooks[n]?.letter ?? ''} ${name}`,
        curve,
        evaluations,
      })),
    [searches],
  )
  const first = searches[0]?.null ?? null
  const sample = useMemo(() => (sameNull ? nullCurves(first) : null), [sameNull, first])
  const budget = Math.max(...searches.map((search) => search.progress.budget ?? search.budget))
  if (runs.every(({ curve }) => curve.length === 0))
    return <Empty title="No feasible candidate yet in any of these searches." />
  return (
    <div className="border-t py-4">
      <BestCurves runs={runs} sample={sample} budget={budget} />
      {!sameNull && (
        <p className="prose-line mt-1 text-xs text-soft">
          The scopes differ, so there is no one null sample to draw beside all of them.
        </p>
      )}
    </div>
  )
}
