import { useMemo, useState } from 'react'
import { useWidth } from '../../lib/useWidth.ts'
import { scaleColour } from '../../lib/colours.ts'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { BottomAxis, LeftAxis } from './Axis.tsx'
import { type AxisOf, scaleOver } from './axisScale.ts'
import { ChartFrame } from './ChartFrame.tsx'
import { ColourKey } from './ColourKey.tsx'
import { linearScale, logScale } from './scales.ts'
import { useBrush } from './useBrush.ts'

export interface ScatterColumn {
  readonly axis: AxisOf
  /** Per row; null where undefined. */
  readonly values: readonly (number | null)[]
  readonly sorted: readonly number[]
}

interface Range {
  low?: number
  high?: number
}

interface ObservableScatterProps {
  title: string
  across: ScatterColumn
  up: ScatterColumn
  /** Gives the colours, when there is a third column. */
  colour?: ScatterColumn
  selected: ReadonlySet<number> | null
  /** Ranges across and up; null lets the selection go. */
  onSelect: (ranges: readonly [Range, Range] | null) => void
  /** Name of a row, for the pointer. */
  rowName: (row: number) => string
  found?: boolean
  table: React.ReactNode
  file: string
}

const height = 400
const top = 28
const bottom = height - 42
const left = 62
const steps = 9
const reach = 12

/** Spread of whole numbers, in units: points of the same value would hide each other. */
const spread = 0.28

/** Fixed for each row, even over [-1, 1]: multiples of the golden section. */
const offset = (row: number, golden: number) => 2 * ((row * golden) % 1) - 1

/**
 * Two columns against each other, a third one by colour. Dragging selects; a click lets the selection go. Points are
 * drawn as dots of one path per colour, so that thousands of them move without delay.
 */
export function ObservableScatter({
  title,
  across,
  up,
  colour,
  selected,
  onSelect,
  rowName,
  found,
  table,
  file,
}: ObservableScatterProps) {
  const [frame, width] = useWidth<HTMLDivElement>(640)
  const [over, setOver] = useState<number | null>(null)
  const right = width - 14
  const x = useMemo(
    () => scaleOver(across.sorted, across.axis, left, right, Math.max(2, Math.floor(width / 100))),
    [across, right, width],
  )
  const y = useMemo(() => scaleOver(up.sorted, up.axis, bottom, top, 6), [up])
  const points = useMemo(() => {
    const placed = ({ axis }: ScatterColumn, value: number, row: number, golden: number) =>
      axis.whole && !axis.log ? value + spread * offset(row, golden) : value
    const shown = ({ axis }: ScatterColumn, value: number | null | undefined): value is number =>
      value !== null && value !== undefined && (!axis.log || value > 0)
    return across.values.flatMap((value, row) => {
      const other = up.values[row]
      if (!shown(across, value) || !shown(up, other)) return []
      return [
        {
          row,
          x: x(placed(across, value, row, 0.6180339887)),
          y: y(placed(up, other, row, 0.7548776662)),
          shade: colour ? shadeOf(colour, colour.values[row] ?? null) : 0,
        },
      ]
    })
  }, [across, up, colour, x, y])

  const { svg, drag, handlers } = useBrush({
    onSelect: ({ x0, y0, x1, y1 }) =>
      onSelect([
        { low: x.invert(Math.min(x0, x1)), high: x.invert(Math.max(x0, x1)) },
        { low: y.invert(Math.max(y0, y1)), high: y.invert(Math.min(y0, y1)) },
      ]),
    onClick: () => onSelect(null),
    onHover: (at) => {
      let best: number | null = null
      let distance = reach
      for (const point of at === null ? [] : points) {
        const here = Math.hypot(point.x - at!.x, point.y - at!.y)
        if (here < distance) [best, distance] = [point.row, here]
      }
      setOver(best)
    },
  })
  const shades = colour ? [-1, ...Array.from({ length: steps }, (_, shade) => shade)] : [0]
  const dots = (wanted: typeof points) =>
    wanted.map((point) => `M${point.x.toFixed(1)} ${point.y.toFixed(1)}h0`).join('')
  const size = points.length > 800 ? 4.5 : 6
  const faint = selected !== null
  const pointed = points.find(({ row }) => row === over)
  const whole = [across, up].some(({ axis }) => axis.whole && !axis.log)
  const missing = across.values.length - points.length
  const value = (column: ScatterColumn, row: number) => {
    const here = column.values[row] ?? null
    if (here === null) return 'undefined'
    return column.axis.truth ? (here === 1 ? 'yes' : 'no') : formatNumber(here, 5)
  }
  return (
    <ChartFrame
      title={title}
      note={
        pointed
          ? `${rowName(pointed.row)}: ${[across, up, ...(colour ? [colour] : [])].map((column) => value(column, pointed.row)).join(', ')}`
          : [
              'drag to select, click to let go',
              ...(missing > 0 ? [`${counted(missing, 'candidate')} not on these axes`] : []),
              ...(whole ? ['whole numbers are spread a little to show how many there are'] : []),
            ].join('; ')
      }
      file={file}
      table={table}
    >
      <div ref={frame}>
        <svg
          ref={svg}
          data-chart
          width={width}
          height={height}
          role="img"
          aria-label={`${title}: ${counted(points.length, 'candidate')}, ${across.axis.label} across, ${up.axis.label} up`}
          className="block cursor-crosshair touch-pan-y select-none"
          {...handlers}
        >
          <BottomAxis
            scale={x}
            label={across.axis.label}
            left={left}
            right={right}
            top={top}
            bottom={bottom}
          />
          <LeftAxis scale={y} label={up.axis.label} left={left} right={right} top={top} bottom={bottom} />
          {drag && (
            <rect
              x={Math.min(drag.x0, drag.x1)}
              y={Math.min(drag.y0, drag.y1)}
              width={Math.abs(drag.x1 - drag.x0)}
              height={Math.abs(drag.y1 - drag.y0)}
              className="fill-action-wash stroke-action"
            />
          )}
          {([false, true] as const).map((inside) =>
            shades.map((shade) => {
              const wanted = points.filter(
                (point) => point.shade === shade && (selected === null || selected.has(point.row)) === inside,
              )
              return (
                wanted.length > 0 && (
                  <path
                    key={`${inside} ${shade}`}
                    d={dots(wanted)}
                    fill="none"
                    strokeLinecap="round"
                    strokeWidth={size}
                    opacity={inside ? (colour ? 0.95 : 0.62) : faint ? 0.36 : 0.62}
                    className={
                      colour && shade >= 0
                        ? undefined
                        : inside && faint && !colour
                          ? 'stroke-action'
                          : found
                            ? 'stroke-found-fill'
                            : 'stroke-null'
                    }
                    style={
                      colour && shade >= 0
                        ? { stroke: scaleColour(0.12 + (0.88 * shade) / (steps - 1)) }
                        : undefined
                    }
                  />
                )
              )
            }),
          )}
          {pointed && (
            <circle
              cx={pointed.x}
              cy={pointed.y}
              r={7}
              className="fill-transparent stroke-ink"
              strokeWidth={1.5}
            />
          )}
        </svg>
        {colour && <ColourKey axis={colour.axis} sorted={colour.sorted} steps={steps} />}
      </div>
    </ChartFrame>
  )
}

/** Step of a value on the colour scale; -1 where there is none. */
function shadeOf({ axis, sorted }: ScatterColumn, value: number | null): number {
  if (value === null || (axis.log && value <= 0)) return -1
  const shown = axis.log ? sorted.filter((one) => one > 0) : sorted
  const [low, high] = [shown[0] ?? 0, shown.at(-1) ?? 1]
  if (!(high > low)) return steps - 1
  const place = (axis.log ? logScale : linearScale)(low, high, 0, 1)(value)
  return Math.min(steps - 1, Math.max(0, Math.floor(place * steps)))
}
