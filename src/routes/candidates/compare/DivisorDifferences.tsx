import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../../shared/candidates.ts'
import { Section } from '../../../components/ui/Layout.tsx'
import { Num } from '../../../components/ui/Num.tsx'
import { Empty } from '../../../components/ui/States.tsx'
import { VirtualTable, type Column } from '../../../components/ui/VirtualTable.tsx'
import { counted, formatPercent } from '../../../lib/numbers.ts'
import {
  differs,
  divisorDifferences,
  type DivisorDifference,
  type Relabelled,
} from './candidateDifferences.ts'

const pair = (
  key: string,
  name: string,
  values: (row: DivisorDifference) => readonly [number, number],
  changed: (row: DivisorDifference) => boolean,
  digits?: number,
): Column<DivisorDifference>[] =>
  ([0, 1] as const).map((place) => ({
    key: `${key}-${place}`,
    header: `${name}, ${'AB'[place]}`,
    numeric: true,
    cell: (row) => (
      <Num
        value={values(row)[place]}
        digits={digits}
        rounded={digits !== undefined}
        className={changed(row) ? 'font-semibold' : 'text-soft'}
      />
    ),
  }))

const columns: Column<DivisorDifference>[] = [
  { key: 'index', header: 'D', numeric: true, cell: ({ index }) => index },
  ...pair(
    'cube',
    'D³',
    ({ cube }) => cube,
    (row) => differs(row).cube,
  ),
  ...pair(
    'c2',
    'c₂·D',
    ({ c2 }) => c2,
    (row) => differs(row).c2,
  ),
  ...pair(
    'volume',
    'Volume τ',
    ({ volume }) => volume,
    (row) => differs(row).volume,
    5,
  ),
  {
    key: 'change',
    header: 'Change of τ',
    numeric: true,
    cell: ({ change }) => (
      <span data-raw={change}>
        {change === 0 ? (
          <span className="text-soft">equal</span>
        ) : (
          `${change > 0 ? '+' : '−'}${formatPercent(Math.abs(change))}`
        )}
      </span>
    ),
  },
]

/** Divisors by how much they differ: D³, c₂·D, and the volume at the two reference points. */
export function DivisorDifferences({ a, b }: { a: CandidateGeometry; b: Relabelled }) {
  const [all, setAll] = useState(false)
  const rows = useMemo(
    () =>
      divisorDifferences(a, b).sort((x, y) => Math.abs(y.change) - Math.abs(x.change) || x.index - y.index),
    [a, b],
  )
  const changed = rows.filter((row) => Object.values(differs(row)).some(Boolean))
  const count = (what: keyof ReturnType<typeof differs>) => rows.filter((row) => differs(row)[what]).length
  const shown = all ? rows : changed
  return (
    <Section
      title="Divisors that differ"
      note={`Of ${rows.length}: D³ in ${count('cube')}, c₂·D in ${count('c2')}, the volume in ${count('volume')}. Volumes at each class’s own reference point, scale 1; what differs is bold. χ(O) depends on the polytope alone.`}
      actions={
        changed.length < rows.length && (
          <label className="inline-flex items-center gap-1.5 text-xs">
            <input type="checkbox" checked={all} onChange={(event) => setAll(event.target.checked)} />
            all {counted(rows.length, 'divisor')}
          </label>
        )
      }
    >
      {shown.length === 0 ? (
        <Empty title="No divisor differs." />
      ) : (
        <VirtualTable
          label="Divisors that differ"
          className="max-h-96"
          count={shown.length}
          rowAt={(at) => shown[at]}
          rowKey={({ index }) => String(index)}
          columns={columns}
        />
      )}
    </Section>
  )
}
