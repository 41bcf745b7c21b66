import { memo, type ReactNode } from 'react'
import { type Places } from '../../../scoring/index.ts'
import { type Preview } from '../../../shared/targets.ts'
import { Histogram } from '../../components/charts/Histogram.tsx'
import { NothingMatches } from '../../components/scope/NothingMatches.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Progress } from '../../components/ui/Progress.tsx'
import { Rate } from '../../components/ui/Rate.tsx'
import { ScoredTable } from '../../components/ui/ScoredTable.tsx'
import { Empty, Failure, Loading } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatNumber, formatPercent } from '../../lib/numbers.ts'
import { type PreviewState } from './usePreview.ts'

interface PreviewPanelProps {
  campaign: string
  state: PreviewState
  sound: boolean
  /** The rule does not say what a hit is. */
  hitOpen: boolean
  /** Where the places that reasons name stand in the text of the editor; null while they are not known. */
  places: Places | null
  /** Shows a place, `line:column`, in the editor. */
  onPlace: (place: string) => void
}

/** The live answer: what the rule says of candidates nobody selected. Drawn anew only when the answer changes. */
export const PreviewPanel = memo(function PreviewPanel({
  campaign,
  state,
  sound,
  hitOpen,
  places,
  onPlace,
}: PreviewPanelProps) {
  const { preview, outdated, countAgain, error, retry, starting } = state
  if (countAgain) return <NothingMatches campaign={campaign} again={countAgain} />
  if (error) return <Failure title="The preview did not start." error={error} retry={retry} />
  if (!preview) {
    if (!sound) return <Empty title="The preview waits for a rule without errors." />
    return starting ? (
      <Loading what="the preview" />
    ) : (
      <Empty title="The preview starts after a pause in typing." />
    )
  }
  if (preview.state === 'failed') {
    return (
      <Failure
        title="The preview failed."
        error={new Error(preview.message ?? 'The server gave no reason.')}
        retry={retry}
      />
    )
  }
  if (preview.state === 'replaced' && !outdated) {
    return (
      <Empty title="Another preview of yours took the place of this one.">
        <Button onClick={retry}>Preview this rule again</Button>
      </Empty>
    )
  }
  return (
    <div>
      <div role="status" className="mb-2 flex min-h-5 items-center gap-3 text-xs text-soft">
        {outdated ? (
          sound ? (
            'Changed since; a new answer is on its way.'
          ) : (
            'Of the last rule without errors.'
          )
        ) : preview.state === 'running' ? (
          <>
            <span className="whitespace-nowrap">
              {formatNumber(preview.evaluated)} of {formatNumber(preview.size)}
            </span>
            <Progress
              value={preview.evaluated}
              most={preview.size}
              label="Candidates evaluated for the preview"
            />
          </>
        ) : (
          `${formatNumber(preview.evaluated)} candidates. ${preview.law}`
        )}
      </div>
      <div className={outdated ? 'border-l-2 border-dashed border-null pl-3' : ''}>
        <Answer campaign={campaign} preview={preview} hitOpen={hitOpen} places={places} onPlace={onPlace} />
      </div>
      <Caution className="mt-4" />
    </div>
  )
})

function Answer({
  campaign,
  preview,
  hitOpen,
  places,
  onPlace,
}: Pick<PreviewPanelProps, 'campaign' | 'hitOpen' | 'places' | 'onPlace'> & { preview: Preview }) {
  const { feasible, infeasible, evaluated } = preview
  return (
    <div className="flex flex-col gap-5">
      <dl className="grid grid-cols-[max-content_minmax(0,1fr)] gap-x-4 gap-y-0.5">
        <Line name="Hit rate">
          {hitOpen ? (
            <span className="text-soft">
              The rule has no hit line; in a search a score above the null’s 99 % quantile will count.
            </span>
          ) : preview.hit ? (
            <Rate rate={preview.hit} />
          ) : (
            <span className="text-soft">not known yet</span>
          )}
        </Line>
        <Line name="Feasible">
          {formatNumber(feasible)}
          {evaluated > 0 && (
            <span className="text-soft">
              {' '}
              of {formatNumber(evaluated)} ({formatPercent(feasible / evaluated)})
            </span>
          )}
        </Line>
        <Line name="Infeasible, undefined">
          {formatNumber(infeasible)}, {formatNumber(preview.undefined)}
        </Line>
        <Line name="Cost">
          {preview.cost.median === null ? (
            <span className="text-soft">not measured yet</span>
          ) : (
            <>
              <Num value={preview.cost.median} digits={3} /> ms per candidate, median
              {preview.cost.stages.length > 0 && (
                <span className="text-soft">
                  {' '}
                  (
                  {preview.cost.stages
                    .map(({ stage, mean }) => `${stage} ${formatNumber(mean, 2)}`)
                    .join(', ')}
                  )
                </span>
              )}
            </>
          )}
        </Line>
      </dl>
      {preview.histogram ? (
        <Histogram title="Score on the null sample" histogram={preview.histogram} file="preview-scores" />
      ) : (
        evaluated > 0 && feasible === 0 && <Empty title="No candidate meets every require yet." />
      )}
      {preview.requires.length > 0 && <Requires requires={preview.requires} />}
      {preview.undefinedReasons.length > 0 && (
        <section aria-label="Undefined, and why">
          <h2 className="text-sm">Undefined, and why</h2>
          <ul>
            {preview.undefinedReasons.map(({ reason, count }) => (
              <li key={reason} className="flex gap-3 border-b py-1">
                <span className="w-12 text-right tabular-nums">{formatNumber(count)}</span>
                <span className="min-w-0 flex-1">
                  <Reason reason={reason} places={places} onPlace={onPlace} />
                </span>
              </li>
            ))}
          </ul>
        </section>
      )}
      {(
        [
          ['Best', preview.best],
          ['Around the median', preview.typical],
          ['Worst', preview.worst],
        ] as const
      ).map(
        ([title, rows]) =>
          rows.length > 0 && (
            <section key={title} aria-label={title}>
              <h2 className="text-sm">{title}</h2>
              <ScoredTable label={`${title} of the null sample`} rows={rows} campaign={campaign} />
            </section>
          ),
      )}
    </div>
  )
}

/** A reason names a place of the rule's canonical text; people want it where they wrote it. */
function Reason({
  reason,
  places,
  onPlace,
}: { reason: string } & Pick<PreviewPanelProps, 'places' | 'onPlace'>) {
  const [, words = reason, line, column] = /^(.*) \(line (\d+), column (\d+)\)$/.exec(reason) ?? []
  const place = places?.[`${line}:${column}`]
  return (
    <>
      {words}
      {place && (
        <button
          type="button"
          className="ml-2 font-mono text-xs text-action hover:underline"
          aria-label={`Go to line ${place.replace(':', ', column ')}`}
          onClick={() => onPlace(place)}
        >
          {place}
        </button>
      )}
    </>
  )
}

function Line({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt className="text-soft">{name}</dt>
      <dd>{children}</dd>
    </>
  )
}

function Requires({ requires }: { requires: Preview['requires'] }) {
  return (
    <Table label="Pass rate of each require">
      <thead>
        <tr>
          <Th>Require</Th>
          <Th>Stage</Th>
          <Th numeric>Reached</Th>
          <Th numeric>Passed</Th>
          <Th numeric>Rate</Th>
        </tr>
      </thead>
      <tbody>
        {requires.map(({ label, stage, reached, passed }, index) => (
          <tr key={index}>
            <Td className="max-w-60 truncate" title={label}>
              {label}
            </Td>
            <Td className="text-soft">{stage}</Td>
            <Td numeric>{formatNumber(reached)}</Td>
            <Td numeric>{formatNumber(passed)}</Td>
            <Td numeric>{reached > 0 ? formatPercent(passed / reached) : '–'}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
