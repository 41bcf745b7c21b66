import { type ReactNode } from 'react'
import { formatNumber } from '../../lib/numbers.ts'
import { lastKnownEnd, type NullCurves, type RunCurve } from './runCurves.ts'
import { RunSwatch } from './RunSwatch.tsx'

/** What the lines of `BestCurves` are. */
export function CurveKey({
  runs,
  sample,
  reach,
}: {
  runs: readonly RunCurve[]
  sample: NullCurves | null
  reach: number
}) {
  const known = sample ? lastKnownEnd(sample.range) : null
  const isOpen = known !== null && known < Math.min(reach, sample?.size ?? 0)
  return (
    <ul className="mb-1 flex flex-wrap gap-x-4 gap-y-0.5 text-xs">
      {runs.map(({ label }, n) => (
        <Entry key={n} mark={<RunSwatch place={n} />}>
          {label}
        </Entry>
      ))}
      {sample && sample.expected.length > 0 && (
        <Entry mark={<span className="w-5 border-t-2 border-dashed border-null" />}>
          expected best of as many null candidates
        </Entry>
      )}
      {sample && sample.range.length > 0 && (
        <Entry mark={<span className="h-3 w-5 bg-null-wash" />}>
          where 90 % of such bests lie
          {isOpen && `; open above beyond ${formatNumber(known)}`}
        </Entry>
      )}
      {sample && sample.best !== null && reach > sample.size && (
        <Entry mark={<span className="w-5 border-t-2 border-dotted border-null" />}>
          beyond the {formatNumber(sample.size)} of the null: at least this
        </Entry>
      )}
    </ul>
  )
}

function Entry({ mark, children }: { mark: ReactNode; children: ReactNode }) {
  return (
    <li className="inline-flex items-center gap-1.5">
      <span aria-hidden className="inline-flex shrink-0">
        {mark}
      </span>
      <span className="min-w-0">{children}</span>
    </li>
  )
}
