import { enrichment, fewestIslands, isEasy, searchRate } from '../../../scoring/index.ts'
import { type SearchDetail } from '../../../shared/searches.ts'
import { Facts } from '../../components/ui/Layout.tsx'
import { Empty } from '../../components/ui/States.tsx'
import { formatNumber, formatPercent } from '../../lib/numbers.ts'

/** The search's hit rate beside the null's, and how rare its best score is; only what the counts can carry. */
export function AgainstNull({ search }: { search: SearchDetail }) {
  const { null: summary, progress } = search
  if (!summary?.hit) return <Empty title="Compared as soon as the null sample has been evaluated." />
  const counts = progress.islands.flatMap(({ hits, evaluations }) =>
    hits === undefined ? [] : [{ hits, evaluations }],
  )
  const isCounted = search.ownHitLine && counts.length === progress.islands.length
  const found = isCounted ? searchRate(counts) : null
  const compared = found && enrichment(found, summary.hit)
  const isExact = progress.exhausted && search.method === 'exhaustive'
  return (
    <>
      <Facts
        rows={[
          [
            'Hit rate of the search',
            found ? <SearchHits key="v" rate={found} isExact={isExact} /> : search.ownHitLine ? '–' : noLine,
          ],
          ['Over the null’s', compared ? ratioText(compared, isExact) : '–'],
          ['Best score', rarityText(search)],
        ]}
      />
      {search.ownHitLine && isEasy(summary.hit) && (
        <p className="prose-line mt-3 text-soft">
          The null hits often already: most of what this search finds, chance finds as well. A stricter hit
          line would say more.
        </p>
      )}
    </>
  )
}

const noLine = 'not counted: the rule has no hit line'

type Rate = NonNullable<ReturnType<typeof searchRate>>

function SearchHits({ rate, isExact }: { rate: Rate; isExact: boolean }) {
  const { hits, evaluations, interval, islands } = rate
  const error = isExact
    ? 'exact: every class has been scored'
    : interval
      ? `${formatPercent(interval[0])} to ${formatPercent(interval[1])}, 95 %, from ${islands} islands`
      : `no interval: it takes ${fewestIslands} islands`
  return (
    <span data-raw={rate.rate}>
      {formatPercent(rate.rate)}{' '}
      <span className="text-soft">
        ({error}; {formatNumber(hits)} of {formatNumber(evaluations)} distinct classes)
      </span>
    </span>
  )
}

function ratioText({ ratio, interval }: ReturnType<typeof enrichment>, isExact: boolean): string {
  const times = ratio === null ? null : `${formatNumber(ratio, 3)} times`
  if (interval === null || isExact) return times ?? 'the null has no hit'
  const [low, high] = interval
  const range =
    high === null
      ? `at least ${formatNumber(low, 3)} times`
      : `${formatNumber(low, 3)} to ${formatNumber(high, 3)}`
  return times === null ? `${range} (95 %)` : `${times} (${range}, 95 %)`
}

function rarityText({ null: summary, progress }: SearchDetail): string {
  if (!summary || progress.best === null) return '–'
  if (summary.best !== null && progress.best <= summary.best) return 'reached by the null sample, too'
  return `none of ${formatNumber(summary.evaluated)} is as good: below ${formatPercent(Math.min(1, 3 / summary.evaluated))} (95 %)`
}
