import { useCallback, useEffect, useMemo, useRef, useState } from 'react'
import uPlot from 'uplot'
import 'uplot/dist/uPlot.min.css'
import { useDark } from '../../lib/theme.ts'
import { useWidth } from '../../lib/useWidth.ts'
import { resolvedColour } from '../../lib/colours.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { alignCurves, type AlignedCurves, type NullCurves, type RunCurve } from './runCurves.ts'
import { BestCurvesTable } from './BestCurvesTable.tsx'
import { CurveKey } from './CurveKey.tsx'
import { runLooks } from './runLooks.ts'
import { tickFormat } from './scales.ts'
import { ChartFrame } from './ChartFrame.tsx'

interface BestCurvesProps {
  runs: readonly RunCurve[]
  /** Drawn in grey; null: none, or none that all runs are compared with. */
  sample: NullCurves | null
  /** The x axis goes at least as far as the runs have come, and no further than this. */
  budget: number
}

const height = 300

/** Best score so far over distinct evaluations, with what the null would have found with as many. */
export function BestCurves({ runs, sample, budget }: BestCurvesProps) {
  const [measured, width] = useWidth<HTMLDivElement>(720)
  const [host, setHost] = useState<HTMLDivElement | null>(null)
  const dark = useDark()
  const plot = useRef<uPlot | null>(null)
  const evaluations = Math.max(0, ...runs.map((run) => run.evaluations))
  const reach = Math.max(evaluations, Math.min(budget, sample?.expected.at(-1)?.[0] ?? 0), 10)
  const aligned = useMemo(() => alignCurves(runs, sample, reach), [runs, sample, reach])
  const data = useMemo(() => dataOf(aligned), [aligned])
  const latest = useRef({ data, reach })
  useEffect(() => {
    latest.current = { data, reach }
  })
  const count = runs.length

  // The element goes while the table is shown, and another comes after it.
  const frame = useCallback(
    (element: HTMLDivElement | null) => {
      setHost(element)
      return measured(element)
    },
    [measured],
  )
  useEffect(() => {
    if (!host) return
    const made = new uPlot(
      options(width, count, () => latest.current.reach),
      latest.current.data,
      host,
    )
    plot.current = made
    return () => {
      made.destroy()
      plot.current = null
    }
    // The theme is part of the drawing: colours on a canvas do not follow the style sheet.
  }, [host, width, dark, count])

  useEffect(() => {
    if (plot.current?.series.length === data.length) plot.current.setData(data)
  }, [data, reach])

  return (
    <ChartFrame
      title="Best score so far"
      table={<BestCurvesTable runs={runs} sample={sample} counts={aligned.counts} />}
    >
      <CurveKey runs={runs} sample={sample} reach={reach} />
      <div
        ref={frame}
        role="img"
        aria-label={`Best score so far over ${formatNumber(evaluations)} evaluations${sample ? ', beside what the null sample would have found with as many' : ''}`}
        style={{ minHeight: height }}
      />
    </ChartFrame>
  )
}

/** Low and high first, so that the band lies under everything. */
function dataOf({ counts, runs, expected, low, high, bound }: AlignedCurves): uPlot.AlignedData {
  return [counts, low, high, expected, bound, ...runs]
}

function options(width: number, runs: number, reach: () => number): uPlot.Options {
  const [ink, line, grey, wash] = ['ink-soft', 'line', 'null', 'null-wash'].map((name) =>
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
  const edge = { stroke: 'transparent', width: 0, spanGaps: true, points: { show: false } }
  return {
    width,
    height,
    legend: { show: false },
    cursor: { y: false, points: { size: 7 } },
    scales: {
      x: { time: false, range: () => [0, reach()] },
      y: { range: (_, low, high) => padded(low, high) },
    },
    bands: [{ series: [2, 1], fill: wash }],
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
      edge,
      edge,
      { stroke: grey, width: 2, dash: [6, 4], spanGaps: true, points: { show: alone } },
      { stroke: grey, width: 1.5, dash: [1, 5], spanGaps: true, points: { show: false } },
      ...runLooks.slice(0, runs).map(({ colour, dash }) => ({
        stroke: resolvedColour(colour),
        width: 2.5,
        dash: [...dash],
        spanGaps: true,
        points: { show: alone },
        paths: uPlot.paths.stepped?.({ align: 1 }),
      })),
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
