import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { useHighlightStore } from '../../components/geometry/highlight.ts'
import { TextField } from '../../components/ui/Field.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Empty } from '../../components/ui/States.tsx'
import { answering, readQuery } from './intersectionQuery.ts'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'

type Intersection = CandidateGeometry['intersections'][number]

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
  const query = useMemo(() => readQuery(text), [text])
  const rows = useMemo(() => answering(intersections, query), [intersections, query])
  const tooLarge = query.divisors.find((index) => index >= points)
  return (
    <div className="flex flex-col gap-2">
      <TextField
        label="Find"
        className="max-w-80 print:hidden"
        placeholder="contains 12, or 3 3, or = -2"
        value={text}
        error={
          tooLarge !== undefined
            ? `There is no D${tooLarge}; the last is D${points - 1}.`
            : query.unread !== null
              ? `“${query.unread}” is neither a divisor nor a comparison such as = −2 or > 0.`
              : null
        }
        onChange={(event) => setText(event.target.value)}
      />
      <p role="status" className="text-xs text-soft">
        {rows.length === intersections.length
          ? counted(rows.length, 'number')
          : `${formatNumber(rows.length)} of ${formatNumber(intersections.length)} numbers`}
      </p>
      {rows.length === 0 ? (
        <Empty title={query.value ? 'No number other than 0 fits.' : 'All of these are zero.'} />
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
