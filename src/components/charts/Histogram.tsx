import { type z } from 'zod'
import { type histogramSchema } from '../../../shared/outcomes.ts'
import { useWidth } from '../../lib/useWidth.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { BottomAxis, LeftAxis } from './Axis.tsx'
import { BinTable } from './BinTable.tsx'
import { ChartFrame } from './ChartFrame.tsx'
import { linearScale } from './scales.ts'

const height = 190
const top = 26
const bottom = height - 38
const left = 40

/** Counts over score; grey, since it shows the null sample. */
export function Histogram({
  title,
  histogram,
  file,
  unit = 'score',
  note,
}: {
  title: string
  histogram: z.infer<typeof histogramSchema>
  file: string
  unit?: string
  note?: string
}) {
  const [frame, width] = useWidth<HTMLDivElement>(420)
  const { edges, counts } = histogram
  const right = width - 10
  const first = edges[0] ?? 0
  const last = edges.at(-1) ?? 1
  const x = linearScale(
    first,
    last === first ? first + 1 : last,
    left,
    right,
    Math.max(2, Math.floor(width / 90)),
  )
  const most = Math.max(1, ...counts)
  const y = linearScale(0, most, bottom, top, Math.min(4, most))
  const total = counts.reduce((sum, count) => sum + count, 0)
  return (
    <ChartFrame
      title={title}
      note={note}
      file={file}
      table={<BinTable label={title} edges={edges} counts={counts} />}
    >
      <div ref={frame}>
        <svg
          data-chart
          width={width}
          height={height}
          role="img"
          aria-label={`${title}: ${formatNumber(total)} candidates between ${formatNumber(first)} and ${formatNumber(last)}`}
          className="block"
        >
          <BottomAxis scale={x} label={unit} left={left} right={right} top={top} bottom={bottom} />
          <LeftAxis scale={y} label="candidates" left={left} right={right} top={top} bottom={bottom} />
          {counts.map((count, at) => {
            const x0 = x(edges[at] ?? first)
            const x1 = x(edges[at + 1] ?? last)
            return (
              count > 0 && (
                <rect
                  key={at}
                  x={x0 + 0.5}
                  width={Math.max(1, x1 - x0 - 1)}
                  y={y(count)}
                  height={bottom - y(count)}
                  className="fill-null"
                >
                  <title>{`${formatNumber(count)} from ${formatNumber(edges[at] ?? first)} to ${formatNumber(edges[at + 1] ?? last)}`}</title>
                </rect>
              )
            )
          })}
        </svg>
      </div>
    </ChartFrame>
  )
}
