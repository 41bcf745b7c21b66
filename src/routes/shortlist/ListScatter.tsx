import { X } from 'lucide-react'
import { type ShortlistRow } from '../../../shared/shortlists.ts'
import { ObservableScatter, type ScatterColumn } from '../../components/charts/ObservableScatter.tsx'
import { IconButton } from '../../components/ui/Button.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { valueOf, type ListColumn } from './listColumns.ts'
import { type Selection } from './useSelection.ts'

/** Rows in the table behind the drawing. */
const tableRows = 200

export const scatterColumns = (columns: readonly ListColumn[]): ListColumn[] =>
  columns.filter(({ type }) => type === 'number')

/** One column of the rows shown, laid on an axis. */
function columnOf(rows: readonly ShortlistRow[], column: ListColumn): ScatterColumn {
  const values = rows.map((row) => {
    const value = valueOf(row, column)
    return typeof value === 'number' ? value : null
  })
  const sorted = values.filter((value) => value !== null).sort((a, b) => a - b)
  const whole = sorted.length > 0 && sorted.every(Number.isInteger)
  const [low, high] = [sorted[0] ?? 0, sorted.at(-1) ?? 0]
  // Over several powers of ten a linear axis would show one heap.
  const log = column.name !== 'rank' && low > 0 && high / low > 300
  return { axis: { label: column.label, log, truth: false, whole }, values, sorted }
}

/** Two columns of the rows shown against each other; what is dragged over is selected in the table. */
export function ListScatter({
  rows,
  columns,
  across,
  up,
  selection,
  onChange,
  onClose,
}: {
  rows: readonly ShortlistRow[]
  columns: readonly ListColumn[]
  across: string
  up: string
  selection: Selection
  onChange: (axis: 'across' | 'up', column: string) => void
  onClose: () => void
}) {
  const choices = scatterColumns(columns)
  const find = (name: string) => choices.find((column) => column.name === name) ?? choices[0]
  const [x, y] = [find(across), find(up)]
  const xs = columnOf(rows, x)
  const ys = columnOf(rows, y)
  const selected =
    selection.keys.length === 0
      ? null
      : new Set(rows.flatMap(({ candidateKey }, at) => (selection.has(candidateKey) ? [at] : [])))
  const options = choices.map(({ name, label }) => [name, label] as const)
  const select = (axis: 'across' | 'up', label: string, value: string) => (
    <Select
      label={label}
      className="w-40"
      value={value}
      onChange={(event) => onChange(axis, event.target.value)}
      options={options}
    />
  )
  return (
    <section aria-label="Two columns against each other" className="mb-3 border-y py-3">
      <div className="mb-2 flex flex-wrap items-end gap-3">
        {select('across', 'Across', x.name)}
        {select('up', 'Up', y.name)}
        <IconButton label="Close the scatter" className="ml-auto" onClick={onClose}>
          <X size={15} aria-hidden />
        </IconButton>
      </div>
      <ObservableScatter
        title={`${y.label} against ${x.label}`}
        across={xs}
        up={ys}
        selected={selected}
        found
        onSelect={(ranges) =>
          selection.only(
            ranges === null
              ? []
              : rows.flatMap(({ candidateKey }, at) => {
                  const inside = [xs, ys].every(({ values }, axis) => {
                    const value = values[at] ?? null
                    const { low = -Infinity, high = Infinity } = ranges[axis] ?? {}
                    return value !== null && value >= low && value <= high
                  })
                  return inside ? [candidateKey] : []
                }),
          )
        }
        rowName={(at) => {
          const row = rows[at]
          return row ? `rank ${row.rank}, ${row.polytopeName}` : ''
        }}
        table={<Values rows={rows} columns={[x, y]} />}
        file="shortlist-scatter"
      />
    </section>
  )
}

function Values({ rows, columns }: { rows: readonly ShortlistRow[]; columns: readonly ListColumn[] }) {
  return (
    <>
      <Table label="Values of the two columns" fit>
        <thead>
          <tr>
            <Th numeric>Rank</Th>
            {columns.map(({ name, label }, at) => (
              <Th key={`${at} ${name}`} numeric>
                {label}
              </Th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.slice(0, tableRows).map((row) => (
            <tr key={row.candidateKey}>
              <Td numeric>{row.rank}</Td>
              {columns.map((column, at) => {
                const value = valueOf(row, column)
                return (
                  <Td key={`${at} ${column.name}`} numeric>
                    <Num value={typeof value === 'number' ? value : null} digits={5} />
                  </Td>
                )
              })}
            </tr>
          ))}
        </tbody>
      </Table>
      {rows.length > tableRows && (
        <p className="mt-1 text-xs text-soft">
          The first {tableRows} of {rows.length}; all are in the list below.
        </p>
      )}
    </>
  )
}
