import { useEffect, useMemo, useRef } from 'react'
import uPlot from 'uplot'
import 'uplot/dist/uPlot.min.css'
import { useDark } from '../../lib/theme.ts'
import { useWidth } from '../../lib/useWidth.ts'
import { resolvedColour } from '../../lib/colours.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { Num } from '../ui/Num.tsx'
import { Table, Td, Th } from '../ui/Table.tsx'
import { alignCurves, type Curve } from './alignCurves.ts'
import { tickFormat } from './scales.ts'
import { ChartFrame } from './ChartFrame.tsx'

interface LiveCurveProps {
  /** Best score so far over evaluations: what the search found, in amber. */
  found: Curve
  /** Expected best of as many null candidates, in grey. */
  expected: Curve
  /** Evaluations so far; the found curve is level up to here. */
  evaluations: number
  budget: number
}

const height = 300

export function LiveCurve({ found, expected, evaluations, budget }: LiveCurveProps) {
  const [frame, width] = useWidth<HTMLDivElement>(720)
  const dark = useDark()
  const plot = useRef<uPlot | null>(null)
  const data = useMemo(() => alignCurves(found, expected, evaluations), [found, expected, evaluations])
  const reach = Math.max(evaluations, Math.min(budget, expected.at(-1)?.[0] ?? 0), 10)
  const latest = useRef({ data, reach })
  useEffect(() => {
    latest.current = { data, reach }
  })

  useEffect(() => {
    const host = frame.current
    if (!host) return
    const made = new uPlot(
      options(width, () => latest.current.reach),
      latest.current.data,
      host,
    )
    plot.current = made
    return () => {
      made.destroy()
      plot.current = null
    }
    // The theme is part of the drawing: colours on a canvas do not follow the style sheet.
  }, [frame, width, dark])

  useEffect(() => {
    plot.current?.setData(data)
  }, [data, reach])

  return (
    <ChartFrame title="Best score so far" table={<CurveTable data={data} />}>
      <p className="mb-1 flex flex-wrap gap-x-4 text-xs">
        <span className="inline-flex items-center gap-1.5">
          <span className="inline-block h-0.5 w-5 bg-found-fill" aria-hidden /> this search
        </span>
        <span className="inline-flex items-center gap-1.5">
          <span className="inline-block w-5 border-t-2 border-dashed border-null" aria-hidden /> expected best
          of as many null candidates
        </span>
      </p>
      <div
        ref={frame}
        role="img"
        aria-label={`Best score so far over ${formatNumber(evaluations)} evaluations, beside the expectation from the null sample`}
        style={{ minHeight: height }}
      />
    </ChartFrame>
  )
}

function options(width: number, reach: () => number): uPlot.Options {
  const [ink, line, foundColour, nullColour] = ['ink-soft', 'line', 'found-fill', 'null'].map((name) =>
    resolvedColour(name),
  ) as [string, string, string, string]
  const font = '11px "IBM Plex Sans Variable", system-ui, sans-serif'
  const axis = {
    stroke: ink,
    font,
    labelFont: font,
    grid: { stroke: line, width: 1 },
    ticks: { stroke: line, width: 1 },
  }
  return {
    width,
    height,
    legend: { show: false },
    cursor: { y: false, points: { size: 7 } },
    scales: {
      x: { time: false, range: () => [0, reach()] },
      y: { range: (_, low, high) => padded(low, high) },
    },
    axes: [
      {
        ...axis,
        label: 'distinct evaluations',
        labelSize: 20,
        values: (_, ticks) => ticks.map((n) => formatNumber(n)),
      },
      {
        ...axis,
        label: 'score',
        labelSize: 18,
        size: 64,
        values: (_, ticks) => ticks.map(tickFormat(ticks)),
      },
    ],
    series: [
      {},
      {
        label: 'this search',
        stroke: foundColour,
        width: 2.5,
        spanGaps: true,
        points: { show: alone },
        paths: uPlot.paths.stepped?.({ align: 1 }),
      },
      { label: 'null', stroke: nullColour, width: 2, dash: [6, 4], spanGaps: true, points: { show: alone } },
    ],
  }
}

/** A curve of a single value is shown as a point. */
function alone(plot: uPlot, series: number): boolean {
  return Array.from(plot.data[series] ?? []).filter((value) => typeof value === 'number').length === 1
}

function padded(low: number | null, high: number | null): [number, number] {
  if (low === null || high === null || !Number.isFinite(low) || !Number.isFinite(high)) return [0, 1]
  const room = (high - low || Math.abs(high) || 1) * 0.08
  return [low - room, high + room]
}

function CurveTable({ data }: { data: ReturnType<typeof alignCurves> }) {
  const [counts, found, expected] = data
  return (
    <Table label="Best score over evaluations">
      <thead>
        <tr>
          <Th numeric>Evaluations</Th>
          <Th numeric>This search</Th>
          <Th numeric>Expected from the null</Th>
        </tr>
      </thead>
      <tbody>
        {counts.map((count, at) => (
          <tr key={count}>
            <Td numeric>
              <Num value={count} />
            </Td>
            <Td numeric>
              <Num value={found[at] ?? null} digits={6} />
            </Td>
            <Td numeric>
              <Num value={expected[at] ?? null} digits={6} />
            </Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
