import { scaleColour } from '../../lib/colours.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { type AxisOf } from './axisScale.ts'

/** What the colours of a scatter mean: equal steps of the axis, from light to dark or, on dark, the other way. */
export function ColourKey({
  axis,
  sorted,
  steps,
}: {
  axis: AxisOf
  sorted: readonly number[]
  steps: number
}) {
  const shown = axis.log ? sorted.filter((value) => value > 0) : sorted
  const low = shown[0]
  const high = shown.at(-1)
  if (low === undefined || high === undefined) return null
  const name = (value: number) => (axis.truth ? (value === 1 ? 'yes' : 'no') : formatNumber(value, 4))
  return (
    <p className="flex flex-wrap items-center gap-x-2 gap-y-1 pt-1 pl-[62px] text-xs">
      <span className="min-w-0 break-words">{axis.label}:</span>
      <span className="inline-flex items-center gap-2 whitespace-nowrap">
        {name(low)}
        <span className="inline-flex" aria-hidden>
          {Array.from({ length: steps }, (_, shade) => (
            <span
              key={shade}
              className="inline-block h-3 w-4"
              style={{ background: scaleColour(0.12 + (0.88 * shade) / (steps - 1)) }}
            />
          ))}
        </span>
        {name(high)}
        {axis.log && <span className="text-soft">logarithmic</span>}
      </span>
    </p>
  )
}
