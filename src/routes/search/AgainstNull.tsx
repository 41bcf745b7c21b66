import { easyRate, fewestIslands } from '../../../scoring/index.ts'
import { type NullSummary } from '../../../shared/nullSamples.ts'
import { type SearchDetail } from '../../../shared/searches.ts'
import { Facts } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Rate } from '../../components/ui/Rate.tsx'
import { Empty } from '../../components/ui/States.tsx'
import {
  againstNull,
  enrichmentText,
  expectedBestOf,
  levelsReached,
  type AgainstNull as Compared,
} from '../../lib/againstNull.ts'
import { formatNumber, formatPercent } from '../../lib/numbers.ts'
import { HowRare } from './HowRare.tsx'

/** What the search found beside what chance finds with the same rule. */
export function AgainstNull({ search }: { search: SearchDetail }) {
  const { null: sample } = search
  if (!sample?.hit) return <Empty title="Compared as soon as the null sample has been evaluated." />
  const compared = againstNull(search)
  return (
    <div className="flex flex-col gap-4">
      <div>
        <Facts
          rows={[
            ['A hit is', <HitLine key="v" search={search} sample={sample} />],
            [
              'Hits of the search',
              <SearchHits key="v" compared={compared} waits={!search.ownHitLine && !sample.complete} />,
            ],
            ['Hits of the null', <Rate key="v" rate={sample.hit} />],
            [
              'Search over null',
              compared.enrichment ? enrichmentText(compared.enrichment, compared.isExact) : '–',
            ],
          ]}
        />
        <p className="prose-line mt-1 text-xs text-soft">
          Distinct hits per distinct evaluation, counted within each island. Null: {lawName(sample)}, seed{' '}
          {sample.seed}, {formatNumber(sample.evaluated)} candidates
          {sample.complete ? '' : ', still being drawn'}.
        </p>
        {(search.progress.given ?? 0) > 0 && (
          <p className="prose-line mt-1 text-xs text-soft">
            Begun from chosen candidates: {formatNumber(search.progress.given ?? 0)} of the evaluations were
            given to it, not found, and are left out of these counts. Its curve holds them.
          </p>
        )}
        {compared.easy && (
          <p role="note" className="prose-line mt-2 border-l-2 border-null pl-3">
            More than {formatPercent(easyRate)} of the null hits already: most of what this search finds,
            chance finds as well. A stricter hit line would say more.
          </p>
        )}
      </div>
      <Progress search={search} sample={sample} />
      <HowRare sample={sample} best={search.progress.best} />
    </div>
  )
}

/** "quadratic-noise/1" of "quadratic-noise/1: Polytope uniform over ...". */
const lawName = ({ law }: NullSummary) => law.split(':')[0]

function HitLine({ search, sample }: { search: SearchDetail; sample: NullSummary }) {
  if (search.ownHitLine) return 'what the rule’s hit line says'
  return (
    <>
      a score above <Num value={sample.quantile99} digits={5} />, the null’s 99 % quantile
      {!sample.complete && ' so far'}
    </>
  )
}

function SearchHits({ compared: { rate, unsure, isExact }, waits }: { compared: Compared; waits: boolean }) {
  if (rate === null) return waits ? 'counted when the null sample is complete' : 'not known yet'
  const { hits, evaluations, interval, islands } = rate
  const bins =
    unsure > 0 ? `; ±\u2009${formatNumber(Math.ceil(unsure / 2))} hits by the histogram’s bins` : ''
  const count = `${formatNumber(hits)} of ${formatNumber(evaluations)}`
  if (hits === 0 && !isExact) {
    return (
      <span data-raw={0}>
        none in {formatNumber(evaluations)}: below {formatPercent(Math.min(1, 3 / evaluations))}{' '}
        <span className="text-soft">(95 %, if evaluations were independent{bins})</span>
      </span>
    )
  }
  const error = isExact
    ? 'exact: every class has been scored'
    : interval
      ? `${formatPercent(interval[0])} to ${formatPercent(interval[1])}, 95 %, resampling ${islands} islands`
      : `no interval: that takes ${fewestIslands} islands, here ${islands === 1 ? 'is 1' : `are ${islands}`}`
  return (
    <span data-raw={rate.rate}>
      {formatPercent(rate.rate)}{' '}
      <span className="text-soft">
        ({error}; {count}
        {bins})
      </span>
    </span>
  )
}

/** How far the search got with how many evaluations, beside the null. */
function Progress({ search, sample }: { search: SearchDetail; sample: NullSummary }) {
  const { evaluations, best } = search.progress
  const expected = expectedBestOf(sample, evaluations)
  return (
    <Facts
      rows={[
        [
          'Best score',
          <span key="v">
            <Num value={best} digits={6} className="font-medium text-found" />{' '}
            <span className="text-soft">after {formatNumber(evaluations)} evaluations</span>
          </span>,
        ],
        [
          'Expected of the null',
          expected ? (
            <span key="v">
              {expected.isBound && 'at least '}
              <Num value={expected.score} digits={6} />{' '}
              <span className="text-soft">
                {expected.isBound
                  ? `for as many: its best of ${formatNumber(sample.evaluated)}, nothing is extrapolated`
                  : 'best of as many'}
              </span>
            </span>
          ) : (
            '–'
          ),
        ],
        ...levelsReached(search, sample).map(
          ({ name, level, evaluations: at }) =>
            [
              `Null’s ${name}`,
              <span key="v">
                <Num value={level} digits={6} />{' '}
                <span className="text-soft">
                  {at === null ? 'not reached' : `reached after ${formatNumber(at)}`}
                </span>
              </span>,
            ] as const,
        ),
      ]}
    />
  )
}
