import { useMemo, useState } from 'react'
import { type Exploration } from '../../../shared/explorations.ts'
import { type ExploredRow } from '../../api/explorations.ts'
import { type AxisOf } from '../../components/charts/axisScale.ts'
import { ObservableScatter, type ScatterColumn } from '../../components/charts/ObservableScatter.tsx'
import { ValueHistogram } from '../../components/charts/ValueHistogram.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Empty } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'
import {
  members,
  quantile,
  selectedRows,
  summarise,
  type ColumnSummary,
  type ColumnView,
} from './columnValues.ts'
import { type ExploreView, type Range } from './exploreAddress.ts'
import { RowTable } from './RowTable.tsx'
import { SummaryTable } from './SummaryTable.tsx'

/** Rows of one page of the selection. */
const pageSize = 20

interface FindingsProps {
  campaign: string
  exploration: Exploration
  rows: readonly ExploredRow[]
  view: ExploreView
  onChange: (change: Partial<ExploreView>) => void
}

const axisOf = ({ name, unit, type }: ColumnView, log: boolean): AxisOf => ({
  label: unit && unit !== '1' ? `${name} (${unit})` : name,
  log: log && type !== 'truth',
  truth: type === 'truth',
  whole: type !== 'number',
})

/** An end of a dragged interval is no more exact than the hand. */
const rounded = ({ low, high }: Range): Range => ({
  ...(low === undefined ? {} : { low: Number(low.toPrecision(4)) }),
  ...(high === undefined ? {} : { high: Number(high.toPrecision(4)) }),
})

/** What the columns look like on the rows that are there. */
export function Findings({ campaign, exploration, rows, view, onChange }: FindingsProps) {
  const { columns } = exploration
  const by = Math.min(view.by, columns.length - 1)
  const summaries = useMemo(() => columns.map((_, place) => summarise(rows, place)), [columns, rows])
  const drawn = useMemo(
    (): ScatterColumn[] =>
      columns.slice(0, 3).map((column, place) => ({
        axis: axisOf(column, view.log.includes(place)),
        values: summaries[place]?.values ?? [],
        sorted: summaries[place]?.sorted ?? [],
      })),
    [columns, summaries, view.log],
  )
  const chosen = useMemo(
    () => selectedRows(summaries, view.ranges, rows.length),
    [summaries, view.ranges, rows.length],
  )
  const narrowed = [...view.ranges.values()].some(({ low, high }) => low !== undefined || high !== undefined)
  const selected = useMemo(() => (narrowed ? new Set(chosen) : null), [narrowed, chosen])
  const setRanges = (changes: readonly (readonly [number, Range])[]) => {
    const ranges = new Map(view.ranges)
    for (const [place, range] of changes) ranges.set(place, rounded(range))
    onChange({ ranges })
  }
  if (rows.length === 0) return <Empty title="The first candidates are on their way." />
  const [across, up, colour] = drawn
  const found = exploration.search !== null
  const shared = {
    campaign,
    exploration: exploration.id,
    columns,
    running: exploration.state === 'running',
    ofSearch: found,
  }
  const sampleName = found ? 'evaluations' : 'null sample'

  return (
    <div className="flex flex-col gap-5">
      {across && up && (
        <ObservableScatter
          title={`${columns[1]?.name} against ${columns[0]?.name}`}
          across={across}
          up={up}
          colour={colour}
          selected={selected}
          found={found}
          file="explored"
          rowName={(row) => rows[row]?.candidateKey.slice(0, 8) ?? ''}
          onSelect={(ranges) =>
            setRanges(
              ranges === null
                ? [
                    [0, {}],
                    [1, {}],
                  ]
                : [
                    [0, ranges[0]],
                    [1, ranges[1]],
                  ],
            )
          }
          table={<ValuesTable columns={columns} rows={rows} summaries={summaries} />}
        />
      )}
      <div
        className={`grid grid-cols-1 gap-x-8 gap-y-4 ${['', 'md:grid-cols-2', 'md:grid-cols-2 xl:grid-cols-3'][drawn.length - 1] ?? ''}`}
      >
        {drawn.map(({ axis, sorted }, place) => (
          <ValueHistogram
            key={columns[place]?.name}
            title={`${columns[place]?.name} on the ${sampleName}`}
            axis={axis}
            sorted={sorted}
            found={found}
            height={drawn.length > 1 ? 200 : 300}
            marks={
              axis.truth
                ? []
                : [
                    ['5 %', quantile(sorted, 0.05)],
                    ['median', quantile(sorted, 0.5)],
                    ['95 %', quantile(sorted, 0.95)],
                  ]
            }
            range={view.ranges.get(place)}
            onRange={(range) => setRanges([[place, range]])}
            file={`explored-column-${place + 1}`}
          />
        ))}
      </div>
      <SummaryTable
        columns={columns}
        summaries={summaries}
        view={view}
        onRange={(place, range) => {
          const ranges = new Map(view.ranges)
          ranges.set(place, range)
          onChange({ ranges })
        }}
        onLog={(place, log) =>
          onChange({ log: log ? [...view.log, place] : view.log.filter((one) => one !== place) })
        }
      />
      <Reasons columns={columns} summaries={summaries} />
      <Section
        title="Members"
        note="The largest, middle and smallest values of one column."
        actions={
          <Select
            label="By column"
            className="w-56"
            value={by}
            onChange={(event) => onChange({ by: Number(event.target.value) })}
            options={columns.map(({ name }, place) => [String(place), name])}
          />
        }
      >
        <Members {...shared} rows={rows} summary={summaries[by]} />
        <Caution className="mt-3" />
      </Section>
      <Section
        title={narrowed ? 'Selected candidates' : 'All candidates'}
        note={
          narrowed
            ? `${formatNumber(chosen.length)} of ${counted(rows.length, 'candidate')}`
            : 'Drag over a drawing, or give an interval above, to select.'
        }
        actions={
          narrowed && <Button onClick={() => onChange({ ranges: new Map() })}>Clear the selection</Button>
        }
      >
        <Pages
          key={JSON.stringify([exploration.id, [...view.ranges], by])}
          {...shared}
          rows={ordered(chosen, summaries[by]).map((row) => rows[row]!)}
        />
      </Section>
    </div>
  )
}

/** Places of rows by falling value; those without one last. */
function ordered(places: readonly number[], summary: ColumnSummary | undefined): number[] {
  const value = (row: number) => summary?.values[row] ?? -Infinity
  return [...places].sort((a, b) => value(b) - value(a) || a - b)
}

type Shared = Pick<
  Parameters<typeof RowTable>[0],
  'campaign' | 'exploration' | 'columns' | 'running' | 'ofSearch'
>

function Members({
  rows,
  summary,
  ...shared
}: Shared & { rows: readonly ExploredRow[]; summary: ColumnSummary | undefined }) {
  if (!summary || summary.sorted.length === 0)
    return <Empty title="The column is undefined on every candidate." />
  const { largest, median, smallest } = members(summary, 3)
  const places = [...largest, ...median, ...smallest]
  const words = [
    ...largest.map(() => 'largest'),
    ...median.map(() => 'median'),
    ...smallest.map(() => 'smallest'),
  ]
  return (
    <RowTable
      {...shared}
      label="Largest, median and smallest members"
      rows={places.map((row) => rows[row]!)}
      words={words}
    />
  )
}

function Pages({ rows, ...shared }: Shared & { rows: readonly ExploredRow[] }) {
  const [page, setPage] = useState(0)
  const last = Math.max(0, Math.ceil(rows.length / pageSize) - 1)
  const here = Math.min(page, last)
  if (rows.length === 0)
    return <Empty title="No candidate lies in the selection.">Widen it, or clear it.</Empty>
  return (
    <>
      <RowTable
        {...shared}
        label="Candidates of the sample"
        rows={rows.slice(here * pageSize, (here + 1) * pageSize)}
      />
      {last > 0 && (
        <nav aria-label="Pages of the candidates" className="mt-2 flex items-center gap-3">
          <Button unavailable={here === 0 && 'This is the first page.'} onClick={() => setPage(here - 1)}>
            Previous
          </Button>
          <span className="text-soft">
            {formatNumber(here * pageSize + 1)} to{' '}
            {formatNumber(Math.min(rows.length, (here + 1) * pageSize))} of {formatNumber(rows.length)}
          </span>
          <Button unavailable={here === last && 'This is the last page.'} onClick={() => setPage(here + 1)}>
            Next
          </Button>
        </nav>
      )}
    </>
  )
}

function Reasons({
  columns,
  summaries,
}: {
  columns: readonly ColumnView[]
  summaries: readonly ColumnSummary[]
}) {
  const lines = columns.flatMap(({ name }, place) =>
    (summaries[place]?.reasons ?? []).slice(0, 5).map(([reason, count]) => ({ name, reason, count })),
  )
  if (lines.length === 0) return null
  return (
    <section aria-label="Undefined, and why">
      <h2 className="text-sm">Undefined, and why</h2>
      <ul>
        {lines.map(({ name, reason, count }) => (
          <li key={`${name} ${reason}`} className="flex flex-wrap gap-x-3 border-b py-1">
            <span className="w-12 text-right tabular-nums">{formatNumber(count)}</span>
            <span className="min-w-40 flex-1">{reason}</span>
            <span className="max-w-full truncate font-mono text-xs text-soft">{name}</span>
          </li>
        ))}
      </ul>
    </section>
  )
}

/** The numbers behind the scatter. */
function ValuesTable({
  columns,
  rows,
  summaries,
}: {
  columns: readonly ColumnView[]
  rows: readonly ExploredRow[]
  summaries: readonly ColumnSummary[]
}) {
  const most = 300
  return (
    <>
      <Table label="Values of the drawn columns">
        <thead>
          <tr>
            <Th>Candidate</Th>
            {columns.slice(0, 3).map(({ name }) => (
              <Th key={name} numeric>
                {name}
              </Th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.slice(0, most).map(({ candidateKey }, row) => (
            <tr key={`${row} ${candidateKey}`}>
              <Td className="font-mono text-xs">{candidateKey.slice(0, 8)}</Td>
              {summaries.slice(0, 3).map(({ values }, place) => (
                <Td key={place} numeric>
                  <Num value={values[row] ?? null} digits={5} />
                </Td>
              ))}
            </tr>
          ))}
        </tbody>
      </Table>
      {rows.length > most && (
        <p className="py-2 text-xs text-soft">
          The first {most} of {formatNumber(rows.length)}; the export has all.
        </p>
      )}
    </>
  )
}
