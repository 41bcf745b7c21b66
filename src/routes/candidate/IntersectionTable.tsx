import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { useHighlightStore } from '../../components/geometry/highlight.ts'
import { TextField } from '../../components/ui/Field.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Empty } from '../../components/ui/States.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'

type Intersection = CandidateGeometry['intersections'][number]

/** Rows that contain all the wanted indices, each as often as it is wanted ("3 3" asks for κ_33k). */
export function containing(rows: readonly Intersection[], wanted: readonly number[]): Intersection[] {
  return rows.filter((row) => {
    const left = [row[0], row[1], row[2]]
    return wanted.every((index) => {
      const at = left.indexOf(index)
      if (at < 0) return false
      left.splice(at, 1)
      return true
    })
  })
}

const columns: Column<Intersection>[] = [
  ...(['i', 'j', 'k'] as const).map((name, at): Column<Intersection> => ({
    key: name,
    header: name,
    numeric: true,
    cell: (row) => row[at],
  })),
  { key: 'value', header: 'κ', numeric: true, cell: (row) => <Num value={row[3]} /> },
]

export function IntersectionTable({
  intersections,
  points,
}: {
  intersections: CandidateGeometry['intersections']
  points: number
}) {
  const store = useHighlightStore()
  const [text, setText] = useState('')
  const wanted = useMemo(() => (text.match(/\d+/g) ?? []).map(Number), [text])
  const rows = useMemo(() => containing(intersections, wanted), [intersections, wanted])
  const tooLarge = wanted.find((index) => index >= points)
  return (
    <div className="flex flex-col gap-2">
      <TextField
        label="With the divisors"
        className="max-w-64"
        inputMode="numeric"
        placeholder="for instance 3 3 or 0 4 7"
        value={text}
        error={tooLarge !== undefined ? `There is no D${tooLarge}; the last is D${points - 1}.` : null}
        onChange={(event) => setText(event.target.value)}
      />
      <p role="status" className="text-xs text-soft">
        {rows.length === intersections.length
          ? counted(rows.length, 'number')
          : `${formatNumber(rows.length)} of ${formatNumber(intersections.length)} numbers`}
      </p>
      {rows.length === 0 ? (
        <Empty title="All of these are zero." />
      ) : (
        <VirtualTable
          label="Intersection numbers"
          className="max-h-80"
          count={rows.length}
          rowAt={(at) => rows[at]}
          rowKey={(row) => row.join(' ')}
          columns={columns}
          rowProps={(row) => ({
            className: 'hover:bg-action-wash',
            onPointerEnter: () =>
              store.point(
                row[0] === row[1] ? (row[1] === row[2] ? [row[0]] : [row[0], row[2]]) : [row[0], row[1]],
              ),
            onPointerLeave: () => store.point(null),
          })}
        />
      )}
    </div>
  )
}
