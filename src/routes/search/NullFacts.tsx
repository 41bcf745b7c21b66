import { type NullSummary } from '../../../shared/nullSamples.ts'
import { Histogram } from '../../components/charts/Histogram.tsx'
import { Facts } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Rate } from '../../components/ui/Rate.tsx'
import { Empty } from '../../components/ui/States.tsx'
import { formatNumber } from '../../lib/numbers.ts'

export function NullFacts({ summary }: { summary: NullSummary | null }) {
  if (!summary) return <Empty title="Not drawn yet.">It is drawn and evaluated beside the search.</Empty>
  return (
    <div className="flex flex-col gap-4">
      <p className="prose-line text-soft">
        {summary.law} Seed {summary.seed}; {formatNumber(summary.evaluated)} of {formatNumber(summary.size)}{' '}
        evaluated
        {summary.complete ? '' : ', still going on'}.
      </p>
      {summary.histogram && (
        <Histogram title="Score on the null sample" histogram={summary.histogram} file="null-scores" />
      )}
      <Facts
        rows={[
          [
            'Feasible, infeasible, undefined',
            `${formatNumber(summary.feasible)}, ${formatNumber(summary.infeasible)}, ${formatNumber(summary.undefined)}`,
          ],
          ['Median', <Num key="v" value={summary.median} digits={5} />],
          ['99 % quantile', <Num key="v" value={summary.quantile99} digits={5} />],
          ['Best', <Num key="v" value={summary.best} digits={5} />],
          ['Hit rate', summary.hit ? <Rate key="v" rate={summary.hit} /> : '–'],
        ]}
      />
    </div>
  )
}
