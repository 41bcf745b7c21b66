import { useRef, useState, type PointerEvent } from 'react'
import { useWidth } from '../../lib/useWidth.ts'
import { logPlace, scaleColour } from '../../lib/colours.ts'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { Table, Td, Th } from '../ui/Table.tsx'
import { BottomAxis, LeftAxis } from './Axis.tsx'
import { ChartFrame } from './ChartFrame.tsx'
import { logScale } from './scales.ts'

export interface HodgeCount {
  h11: number
  h21: number
  count: number
}

export interface HodgeRange {
  h11Min?: number
  h11Max?: number
  h21Min?: number
  h21Max?: number
}

interface Box {
  x0: number
  y0: number
  x1: number
  y1: number
}

const height = 340
const top = 28
const bottom = height - 40
const left = 44

/** Whole-number range that an interval on a logarithmic axis of h covers; empty when it holds none. */
export function coveredRange(low: number, high: number): [number, number] {
  return [Math.max(0, Math.ceil(low - 1e-9)), Math.floor(high + 1e-9)]
}

/**
 * Polytopes by Hodge numbers, both axes logarithmic and of one range, with the line that mirror symmetry reflects in;
 * darker where more share a place. Dragging over an area or choosing a point narrows the library to it; the number
 * fields of the filter do the same from the keyboard.
 */
export function HodgeScatter({
  counts,
  range,
  onRange,
}: {
  counts: readonly HodgeCount[]
  range: HodgeRange
  onRange: (range: HodgeRange) => void
}) {
  const [frame, width] = useWidth<HTMLDivElement>(560)
  const svg = useRef<SVGSVGElement>(null)
  const [drag, setDrag] = useState<Box | null>(null)
  const [over, setOver] = useState<HodgeCount | null>(null)
  const right = width - 12
  const most = Math.max(1, ...counts.map(({ count }) => count))
  // One range for both: mirror pairs lie mirrored in the diagonal.
  const end = Math.max(10, ...counts.map(({ h11, h21 }) => Math.max(h11, h21))) * 1.25
  const x = logScale(0.8, end, left, right)
  const y = logScale(0.8, end, bottom, top)
  const place = (h: number) => Math.max(0.85, h)

  const at = (event: PointerEvent) => {
    const box = svg.current?.getBoundingClientRect()
    return box ? { x: event.clientX - box.left, y: event.clientY - box.top } : { x: 0, y: 0 }
  }
  const nearest = (point: { x: number; y: number }) => {
    let best: HodgeCount | null = null
    let reach = 12
    for (const count of counts) {
      const distance = Math.hypot(x(place(count.h11)) - point.x, y(place(count.h21)) - point.y)
      if (distance < reach) {
        reach = distance
        best = count
      }
    }
    return best
  }
  const finish = (event: PointerEvent) => {
    if (!drag) return
    setDrag(null)
    const point = at(event)
    if (Math.abs(point.x - drag.x0) < 4 && Math.abs(point.y - drag.y0) < 4) {
      const hit = nearest(point)
      onRange(hit ? { h11Min: hit.h11, h11Max: hit.h11, h21Min: hit.h21, h21Max: hit.h21 } : {})
      return
    }
    const [h11Min, h11Max] = coveredRange(
      x.invert(Math.min(drag.x0, point.x)),
      x.invert(Math.max(drag.x0, point.x)),
    )
    const [h21Min, h21Max] = coveredRange(
      y.invert(Math.max(drag.y0, point.y)),
      y.invert(Math.min(drag.y0, point.y)),
    )
    if (h11Min <= h11Max && h21Min <= h21Max) onRange({ h11Min, h11Max, h21Min, h21Max })
  }

  const limited = Object.values(range).some((value) => value !== undefined)
  const marked: Box | null = drag ?? (limited ? markedBox(range, x, y, right) : null)

  return (
    <ChartFrame
      title="Hodge numbers"
      note={
        over
          ? `(${over.h11}, ${over.h21}): ${counted(over.count, 'polytope')}`
          : 'drag to select, click for one place'
      }
      file="hodge-numbers"
      table={<CountTable counts={counts} />}
    >
      <div ref={frame}>
        <svg
          ref={svg}
          data-chart
          width={width}
          height={height}
          role="img"
          aria-label={`Scatter of ${counted(counts.length, 'pair')} of Hodge numbers, h11 across, h21 up, both logarithmic`}
          className="block cursor-crosshair touch-pan-y select-none"
          onPointerDown={(event) => {
            if (event.button !== 0) return
            const point = at(event)
            setDrag({ x0: point.x, y0: point.y, x1: point.x, y1: point.y })
            event.currentTarget.setPointerCapture(event.pointerId)
          }}
          onPointerMove={(event) => {
            const point = at(event)
            if (drag) setDrag({ ...drag, x1: point.x, y1: point.y })
            else setOver(nearest(point))
          }}
          onPointerUp={finish}
          onPointerCancel={() => setDrag(null)}
          onPointerLeave={() => setOver(null)}
        >
          <BottomAxis scale={x} label="h11" left={left} right={right} top={top} bottom={bottom} />
          <LeftAxis scale={y} label="h21" left={left} right={right} top={top} bottom={bottom} />
          <line
            x1={x(0.8)}
            y1={y(0.8)}
            x2={x(end)}
            y2={y(end)}
            className="stroke-line"
            strokeDasharray="3 3"
          />
          <text x={x(end) - 6} y={y(end) + 18} textAnchor="end" className="fill-soft text-xs">
            h11 = h21
          </text>
          {marked && (
            <rect
              x={Math.min(marked.x0, marked.x1)}
              y={Math.min(marked.y0, marked.y1)}
              width={Math.abs(marked.x1 - marked.x0)}
              height={Math.abs(marked.y1 - marked.y0)}
              className="fill-action-wash stroke-action"
            />
          )}
          {counts.map((count) => (
            <circle
              key={`${count.h11},${count.h21}`}
              cx={x(place(count.h11))}
              cy={y(place(count.h21))}
              r={2 + 2.2 * logPlace(count.count, most)}
              style={{ fill: scaleColour(0.25 + 0.75 * logPlace(count.count, most)) }}
            />
          ))}
          {over && (
            <circle
              cx={x(place(over.h11))}
              cy={y(place(over.h21))}
              r={7}
              className="fill-transparent stroke-ink"
              strokeWidth={1.5}
            />
          )}
        </svg>
      </div>
    </ChartFrame>
  )
}

function markedBox(
  range: HodgeRange,
  x: (v: number) => number,
  y: (v: number) => number,
  right: number,
): Box {
  const inside = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value))
  return {
    x0: range.h11Min === undefined ? left : inside(x(Math.max(0.8, range.h11Min - 0.12)) - 4, left, right),
    x1: range.h11Max === undefined ? right : inside(x(Math.max(0.8, range.h11Max)) + 6, left, right),
    y0: range.h21Min === undefined ? bottom : inside(y(Math.max(0.8, range.h21Min)) + 6, top, bottom),
    y1: range.h21Max === undefined ? top : inside(y(Math.max(0.8, range.h21Max)) - 6, top, bottom),
  }
}

function CountTable({ counts }: { counts: readonly HodgeCount[] }) {
  const rows = [...counts].sort((a, b) => b.count - a.count).slice(0, 200)
  return (
    <>
      <Table label="Polytopes at each pair of Hodge numbers">
        <thead>
          <tr>
            <Th numeric>h11</Th>
            <Th numeric>h21</Th>
            <Th numeric>Polytopes</Th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={`${row.h11},${row.h21}`}>
              <Td numeric>{row.h11}</Td>
              <Td numeric>{row.h21}</Td>
              <Td numeric>{formatNumber(row.count)}</Td>
            </tr>
          ))}
        </tbody>
      </Table>
      {counts.length > rows.length && (
        <p className="py-2 text-xs text-soft">
          The 200 most frequent of {formatNumber(counts.length)} pairs.
        </p>
      )}
    </>
  )
}
