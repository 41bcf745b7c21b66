import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { ChartFrame } from '../../components/charts/ChartFrame.tsx'
import { useHighlightStore } from '../../components/geometry/highlight.ts'
import { Field } from '../../components/ui/Field.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { useWidth } from '../../lib/useWidth.ts'
import { matrixOf } from './intersectionQuery.ts'

type Entry = ReturnType<typeof matrixOf>[number]

const columns: Column<Entry>[] = [
  { key: 'j', header: 'j', numeric: true, cell: ({ j }) => j },
  { key: 'k', header: 'k', numeric: true, cell: ({ k }) => k },
  { key: 'value', header: 'κ', numeric: true, cell: ({ value }) => <Num value={value} /> },
]

const margin = 30

/** κ_ijk for one i, over the j and k that occur: positive entries filled, negative ones open. */
export function IntersectionMatrix({ geometry }: { geometry: CandidateGeometry }) {
  const [frame, width] = useWidth<HTMLDivElement>(480)
  const [divisor, setDivisor] = useState(0)
  const [pointed, setPointed] = useState<Entry | null>(null)
  const store = useHighlightStore()
  const entries = useMemo(() => matrixOf(geometry.intersections, divisor), [geometry, divisor])
  const indices = useMemo(
    () => [...new Set(entries.flatMap(({ j, k }) => [j, k]))].sort((a, b) => a - b),
    [entries],
  )
  const place = useMemo(() => new Map(indices.map((index, at) => [index, at])), [indices])
  const cell = Math.max(4, Math.min(26, (Math.min(width, 420) - margin - 4) / Math.max(1, indices.length)))
  const side = cell * indices.length
  const labelled = Math.max(1, Math.ceil(13 / cell))
  const most = Math.max(1, ...entries.map(({ value }) => Math.abs(value)))
  const last = geometry.divisors.length - 1
  const point = (entry: Entry | null) => {
    setPointed(entry)
    store.point(entry && (entry.j === entry.k ? [entry.j] : [entry.j, entry.k]))
  }
  const under = (x: number, y: number): Entry | null => {
    const j = indices[Math.floor((y - margin) / cell)]
    const k = indices[Math.floor((x - margin) / cell)]
    if (j === undefined || k === undefined) return null
    return (
      entries.find((entry) => (entry.j === j && entry.k === k) || (entry.j === k && entry.k === j)) ?? null
    )
  }
  return (
    <ChartFrame
      title={`κ of D${divisor}`}
      file={`kappa-${divisor}-${geometry.key.slice(0, 10)}`}
      actions={
        <Field label="Divisor" className="print:hidden">
          {(field) => (
            <input
              {...field}
              type="number"
              min={0}
              max={last}
              value={divisor}
              className={`${field.className} max-w-20`}
              onChange={(event) =>
                setDivisor(Math.max(0, Math.min(last, Math.trunc(Number(event.target.value) || 0))))
              }
            />
          )}
        </Field>
      }
      table={
        <VirtualTable
          label={`Entries of κ of D${divisor}`}
          className="max-h-80"
          count={entries.length}
          rowAt={(at) => entries[at]}
          rowKey={({ j, k }) => `${j} ${k}`}
          columns={columns}
        />
      }
    >
      <div ref={frame}>
        <p aria-live="polite" className="mb-1 min-h-5 text-xs">
          {pointed ? (
            <>
              κ<sub>{[divisor, pointed.j, pointed.k].sort((a, b) => a - b).join(' ')}</sub> ={' '}
              {formatNumber(pointed.value)}
            </>
          ) : (
            <span className="text-soft">
              {counted(entries.length, 'entry', 'entries')} other than 0 with j ≤ k, over the{' '}
              {counted(indices.length, 'divisor')} that occur.
            </span>
          )}
        </p>
        <div className="max-h-[26rem] overflow-auto" tabIndex={0} role="group" aria-label="Matrix, scrolls">
          <svg
            data-chart
            width={side + margin + 2}
            height={side + margin + 2}
            role="img"
            aria-label={`κ of D${divisor} over j and k: ${entries.length} entries other than 0`}
            className="block"
            onPointerMove={(event) => {
              const box = event.currentTarget.getBoundingClientRect()
              point(under(event.clientX - box.left, event.clientY - box.top))
            }}
            onPointerLeave={() => point(null)}
          >
            <rect x={margin} y={margin} width={side} height={side} className="fill-sheet stroke-edge" />
            {indices.map(
              (index, at) =>
                at % labelled === 0 && (
                  <g key={index} fontSize="10" className="fill-soft">
                    <text x={margin - 4} y={margin + (at + 0.5) * cell} dy="0.35em" textAnchor="end">
                      {index}
                    </text>
                    <text x={margin + (at + 0.5) * cell} y={margin - 5} textAnchor="middle">
                      {index}
                    </text>
                  </g>
                ),
            )}
            {entries.flatMap(({ j, k, value }) => {
              const [a, b] = [place.get(j) ?? 0, place.get(k) ?? 0]
              return (
                a === b
                  ? [[a, b]]
                  : [
                      [a, b],
                      [b, a],
                    ]
              ).map(([row, column]) => (
                <Square
                  key={`${row} ${column}`}
                  x={margin + (column ?? 0) * cell}
                  y={margin + (row ?? 0) * cell}
                  cell={cell}
                  value={value}
                  share={Math.abs(value) / most}
                />
              ))
            })}
          </svg>
        </div>
        <p className="mt-1 text-xs text-soft">Filled: positive; open: negative; larger: further from 0.</p>
      </div>
    </ChartFrame>
  )
}

function Square({
  x,
  y,
  cell,
  value,
  share,
}: {
  x: number
  y: number
  cell: number
  value: number
  share: number
}) {
  const size = cell * (0.35 + 0.55 * Math.sqrt(share))
  const inset = (cell - size) / 2
  const written = cell >= 20
  return (
    <>
      <rect
        x={x + inset}
        y={y + inset}
        width={size}
        height={size}
        className={value > 0 ? 'fill-action stroke-action' : 'fill-sheet stroke-action'}
        fillOpacity={value > 0 && written ? 0.25 : 1}
      />
      {written && (
        <text
          x={x + cell / 2}
          y={y + cell / 2}
          dy="0.35em"
          fontSize="9"
          textAnchor="middle"
          className="fill-ink"
        >
          {String(value).replace('-', '−')}
        </text>
      )}
    </>
  )
}
