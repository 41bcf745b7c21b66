import { useState } from 'react'
import { Num } from '../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { quantile, type ColumnSummary, type ColumnView } from './columnValues.ts'
import { type ExploreView, type Range } from './exploreAddress.ts'

interface SummaryTableProps {
  columns: readonly ColumnView[]
  summaries: readonly ColumnSummary[]
  view: ExploreView
  onRange: (place: number, range: Range) => void
  onLog: (place: number, log: boolean) => void
}

/** How each column lies, its axis, and the selection in figures: what dragging does, from the keyboard. */
export function SummaryTable({ columns, summaries, view, onRange, onLog }: SummaryTableProps) {
  return (
    <Table label="Columns, their quantiles and the selection">
      <thead>
        <tr>
          <Th>Column</Th>
          <Th numeric>Defined</Th>
          <Th numeric>Undefined</Th>
          {['Least', '5 %', 'Median', '95 %', 'Largest'].map((name) => (
            <Th key={name} numeric>
              {name}
            </Th>
          ))}
          <Th>Axis</Th>
          <Th>Select from … to</Th>
        </tr>
      </thead>
      <tbody>
        {columns.map(({ name, type, unit }, place) => {
          const { sorted, values } = summaries[place] ?? { sorted: [], values: [] }
          const range = view.ranges.get(place) ?? {}
          return (
            <tr key={name}>
              <Td className="max-w-72 truncate" title={name}>
                <span className="font-mono text-xs">{name}</span>
                {unit && unit !== '1' && <span className="ml-1 text-xs text-soft">{unit}</span>}
              </Td>
              <Td numeric>{formatNumber(sorted.length)}</Td>
              <Td numeric>{formatNumber(values.length - sorted.length)}</Td>
              {[0, 0.05, 0.5, 0.95, 1].map((p) => (
                <Td key={p} numeric>
                  {type === 'truth' ? (
                    <Truth value={quantile(sorted, p)} />
                  ) : (
                    <Num value={quantile(sorted, p)} digits={4} />
                  )}
                </Td>
              ))}
              <Td>
                {type === 'truth' ? (
                  <span className="text-soft">no, yes</span>
                ) : (
                  <label className="inline-flex items-center gap-1.5">
                    <input
                      type="checkbox"
                      checked={view.log.includes(place)}
                      onChange={(event) => onLog(place, event.target.checked)}
                    />
                    logarithmic<span className="sr-only"> axis for {name}</span>
                  </label>
                )}
              </Td>
              <Td>
                <span className="inline-flex items-center gap-1">
                  <EndField
                    label={`Select ${name} from`}
                    value={range.low}
                    onValue={(low) => onRange(place, { ...range, low })}
                  />
                  <EndField
                    label={`Select ${name} to`}
                    value={range.high}
                    onValue={(high) => onRange(place, { ...range, high })}
                  />
                </span>
              </Td>
            </tr>
          )
        })}
      </tbody>
    </Table>
  )
}

function Truth({ value }: { value: number | null }) {
  return value === null ? <span className="text-soft">–</span> : value === 1 ? 'yes' : 'no'
}

/** One end of an interval; it takes effect with Enter or on leaving. */
function EndField({
  label,
  value,
  onValue,
}: {
  label: string
  value: number | undefined
  onValue: (value: number | undefined) => void
}) {
  const shown = value === undefined ? '' : String(value)
  // What is typed counts until the value itself moves, by dragging for instance.
  const [typed, setTyped] = useState({ text: shown, over: shown })
  const text = typed.over === shown ? typed.text : shown
  const setText = (next: string) => setTyped({ text: next, over: shown })
  const take = () => {
    const next = text.trim() === '' ? undefined : Number(text)
    if (next !== undefined && !Number.isFinite(next)) setText(shown)
    else if (next !== value) onValue(next)
  }
  return (
    <input
      aria-label={label}
      inputMode="decimal"
      className="min-h-7 w-24 rounded border border-edge bg-sheet px-1 text-right text-xs tabular-nums"
      value={text}
      onChange={(event) => setText(event.target.value)}
      onBlur={take}
      onKeyDown={(event) => {
        if (event.key === 'Enter') take()
      }}
    />
  )
}
