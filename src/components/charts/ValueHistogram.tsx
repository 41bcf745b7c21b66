import { useMemo } from 'react'
import { useWidth } from '../../lib/useWidth.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { BottomAxis, LeftAxis } from './Axis.tsx'
import { type AxisOf, scaleOver } from './axisScale.ts'
import { BinTable } from './BinTable.tsx'
import { ChartFrame } from './ChartFrame.tsx'
import { linearScale } from './scales.ts'
import { useBrush } from './useBrush.ts'
import { binsOf } from './valueBins.ts'

const top = 26
const left = 44

interface ValueHistogramProps {
  title: string
  axis: AxisOf
  /** Defined values in ascending order. */
  sorted: readonly number[]
  /** Marked by lines, each with its name. */
  marks: readonly (readonly [name: string, value: number | null])[]
  /** What is selected on this axis. */
  range?: { readonly low?: number; readonly high?: number }
  onRange: (range: { low?: number; high?: number }) => void
  /** What a search found is amber, the null grey. */
  found?: boolean
  height?: number
  file: string
}

/** How the values of one column lie; dragging selects an interval, a click lets it go. */
export function ValueHistogram({
  title,
  axis,
  sorted,
  marks,
  range,
  onRange,
  found,
  height = 230,
  file,
}: ValueHistogramProps) {
  const [frame, width] = useWidth<HTMLDivElement>(420)
  const bottom = height - 40
  const right = width - 12
  const { edges, counts } = useMemo(
    () => binsOf(sorted, { log: axis.log, whole: axis.whole }),
    [sorted, axis.log, axis.whole],
  )
  const most = Math.max(1, ...counts)
  const x = scaleOver(sorted, axis, left, right, Math.max(2, Math.floor(width / 90)))
  const y = linearScale(0, most, bottom, top, Math.min(4, most))
  const { svg, drag, handlers } = useBrush({
    onSelect: ({ x0, x1 }) => onRange({ low: x.invert(Math.min(x0, x1)), high: x.invert(Math.max(x0, x1)) }),
    onClick: () => onRange({}),
  })
  const inside = (pixel: number) => Math.min(right, Math.max(left, pixel))
  const marked = drag
    ? ([inside(Math.min(drag.x0, drag.x1)), inside(Math.max(drag.x0, drag.x1))] as const)
    : range && (range.low !== undefined || range.high !== undefined)
      ? ([
          range.low === undefined ? left : inside(x(range.low)),
          range.high === undefined ? right : inside(x(range.high)),
        ] as const)
      : null
  // Names that would stand on each other: the first one stays, the others are told by their lines.
  const apart = new Set<string>()
  let taken = left + 68
  for (const [name, value] of marks) {
    if (value === null || (axis.log && value <= 0)) continue
    const half = 3.2 * name.length
    if (x(value) - half < taken) continue
    taken = x(value) + half
    apart.add(name)
  }
  const off = axis.log ? sorted.filter((value) => value <= 0).length : 0
  return (
    <ChartFrame
      title={title}
      note={off > 0 ? `${formatNumber(off)} not positive, not on this axis` : undefined}
      file={file}
      table={<BinTable label={title} edges={edges} counts={counts} />}
    >
      <div ref={frame}>
        <svg
          ref={svg}
          data-chart
          width={width}
          height={height}
          role="img"
          aria-label={`${title}: ${formatNumber(sorted.length)} values between ${formatNumber(sorted[0] ?? 0)} and ${formatNumber(sorted.at(-1) ?? 0)}`}
          className="block cursor-crosshair touch-pan-y select-none"
          {...handlers}
        >
          <BottomAxis scale={x} label={axis.label} left={left} right={right} top={top} bottom={bottom} />
          <LeftAxis scale={y} label="candidates" left={left} right={right} top={top} bottom={bottom} />
          {marked && (
            <rect
              x={marked[0]}
              width={Math.max(1, marked[1] - marked[0])}
              y={top}
              height={bottom - top}
              className="fill-action-wash stroke-action"
            />
          )}
          {counts.map((count, at) => {
            const x0 = inside(x(edges[at] ?? 0))
            const x1 = inside(x(edges[at + 1] ?? 0))
            return (
              count > 0 && (
                <rect
                  key={at}
                  x={x0 + 0.5}
                  width={Math.max(1, x1 - x0 - 1)}
                  y={y(count)}
                  height={bottom - y(count)}
                  className={found ? 'fill-found-fill' : 'fill-null'}
                />
              )
            )
          })}
          {marks.map(
            ([name, value]) =>
              value !== null &&
              !(axis.log && value <= 0) && (
                <g key={name} transform={`translate(${inside(x(value))} 0)`}>
                  <line y1={top - 4} y2={bottom} className="stroke-ink" strokeDasharray="3 3" />
                  <title>{`${name}: ${formatNumber(value, 5)}`}</title>
                  {apart.has(name) && (
                    <text
                      y={top - 8}
                      textAnchor="middle"
                      fontSize="11"
                      className="fill-soft"
                      aria-hidden="true"
                    >
                      {name}
                    </text>
                  )}
                </g>
              ),
          )}
        </svg>
      </div>
    </ChartFrame>
  )
}
