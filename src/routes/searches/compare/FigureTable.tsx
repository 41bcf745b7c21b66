import { type ReactNode } from 'react'
import { type ComparedSearch } from '../../../../shared/comparisons.ts'
import { Num } from '../../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../../components/ui/Table.tsx'
import {
  againstNull,
  enrichmentText,
  expectedBestOf,
  levelsReached,
  rarenessIn,
  rarenessText,
} from '../../../lib/againstNull.ts'
import { columnDecimals, formatNumber, formatPercent } from '../../../lib/numbers.ts'
import { RowName, SearchHead } from './SearchHead.tsx'

type Row = readonly [name: string, cell: (search: ComparedSearch) => ReactNode]

/** What each search found and how it ran, a search a column. */
export function FigureTable({
  searches,
  sameScoring,
}: {
  searches: readonly ComparedSearch[]
  sameScoring: boolean
}) {
  const rows = [...(sameScoring ? scoreRows(searches) : []), ...runRows]
  return (
    <Table label="Figures of the searches">
      <thead>
        <tr>
          <Th>
            <span className="sr-only">Figure</span>
          </Th>
          {searches.map(({ id, name }, place) => (
            <Th key={id}>
              <SearchHead place={place} name={name} />
            </Th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map(([name, cell]) => (
          <tr key={name}>
            <th scope="row" className="h-8 border-b pr-4 text-left align-top font-normal text-soft">
              <RowName>{name}</RowName>
            </th>
            {searches.map((search) => (
              <Td key={search.id} className="min-w-40 py-1.5 align-top whitespace-normal! tabular-nums">
                {cell(search)}
              </Td>
            ))}
          </tr>
        ))}
      </tbody>
    </Table>
  )
}

const none = <span className="text-soft">–</span>

function scoreRows(searches: readonly ComparedSearch[]): Row[] {
  const bests = searches.flatMap(({ progress: { best } }) => (best === null ? [] : [best]))
  const decimals = columnDecimals(bests, 6)
  const reached = (name: string): Row => [
    `Evaluations to the null’s ${name}`,
    (search) => {
      const level = search.null && levelsReached(search, search.null).find((other) => other.name === name)
      if (!level) return none
      if (level.evaluations !== null) return <Num value={level.evaluations} />
      return <span className="text-soft">not within {formatNumber(search.progress.evaluations)}</span>
    },
  ]
  return [
    [
      'Best score',
      ({ progress }) => (
        <Num value={progress.best} digits={6} decimals={decimals} className="font-medium text-found" />
      ),
    ],
    [
      'Null’s best of as many',
      ({ null: sample, progress }) => {
        const expected = sample && expectedBestOf(sample, progress.evaluations)
        if (!expected) return none
        return (
          <span className="text-null">
            {expected.isBound && 'at least '}
            <Num value={expected.score} digits={6} decimals={decimals} />
          </span>
        )
      },
    ],
    reached('99 % quantile'),
    reached('99.9 % quantile'),
    reached('best'),
    ['Hits', hitsCell],
    [
      'Search over null',
      (search) => {
        const { enrichment, isExact } = againstNull(search)
        return enrichment ? enrichmentText(enrichment, isExact) : none
      },
    ],
    [
      'How rare the best is',
      ({ null: sample, progress }) => {
        const rare = sample && progress.best !== null ? rarenessIn(sample, progress.best) : null
        return rare ? rarenessText(rare) : none
      },
    ],
    [
      'Null sample',
      ({ null: sample }) =>
        sample
          ? `${formatNumber(sample.evaluated)} candidates, seed ${sample.seed}, ${sample.law.split(':')[0] ?? ''}${sample.complete ? '' : ', still being drawn'}`
          : none,
    ],
  ]
}

function hitsCell(search: ComparedSearch): ReactNode {
  const { rate, unsure, isExact } = againstNull(search)
  if (rate === null) return none
  const { hits, evaluations, interval } = rate
  if (hits === 0 && !isExact)
    return (
      <>
        none in {formatNumber(evaluations)}: below {formatPercent(Math.min(1, 3 / evaluations))}{' '}
        <span className="text-soft">(95 %, if evaluations were independent)</span>
      </>
    )
  const error = isExact
    ? 'exact'
    : interval
      ? `${formatPercent(interval[0])} to ${formatPercent(interval[1])}, 95 %`
      : 'no interval under five islands'
  return (
    <>
      {formatPercent(rate.rate)}{' '}
      <span className="text-soft">
        ({error}; {unsure > 0 && 'about '}
        {formatNumber(hits)} of {formatNumber(evaluations)})
      </span>
    </>
  )
}

const runRows: readonly Row[] = [
  [
    'Distinct evaluations',
    ({ progress, budget }) => (
      <>
        <Num value={progress.evaluations} />{' '}
        <span className="text-soft">of {formatNumber(progress.budget ?? budget)}</span>
      </>
    ),
  ],
  ['Evaluations per second', ({ progress }) => <Num value={progress.evaluationsPerSecond} digits={3} />],
  [
    'Acceptance',
    ({ progress }) =>
      progress.proposals > 0 ? (
        <>
          {formatPercent(progress.accepted / progress.proposals)}{' '}
          <span className="text-soft">of {formatNumber(progress.proposals)} proposals</span>
        </>
      ) : (
        none
      ),
  ],
  [
    'Feasible',
    ({ progress }) =>
      progress.evaluations > 0 ? formatPercent(progress.feasible / progress.evaluations) : none,
  ],
  ['Restarts', ({ progress }) => <Num value={progress.restarts} />],
]
