import { useMemo } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { Num } from '../../components/ui/Num.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'

type Curve = CandidateGeometry['curves'][number] & { times: number }

/** Equal classes once, with how many edges give them; smallest volume first. */
export function distinctCurves(curves: CandidateGeometry['curves']): Curve[] {
  const classes = new Map<string, Curve>()
  for (const curve of curves) {
    const key = curve.row.map((entry) => entry.join(':')).join(' ')
    const known = classes.get(key)
    if (known) known.times += 1
    else classes.set(key, { ...curve, times: 1 })
  }
  return [...classes.values()].sort((a, b) => a.volume - b.volume)
}

const columns: Column<Curve>[] = [
  {
    key: 'class',
    header: 'C · D, entries that are not 0',
    cellClass: 'font-mono text-xs',
    cell: ({ row }) => (
      <span data-raw={row.map(([k, n]) => `${k}:${n}`).join(' ')}>
        {row.map(([k, n]) => (
          <span key={k} className="mr-2 inline-block">
            <span className="text-soft">{k}:</span>
            {String(n).replace('-', '−')}
          </span>
        ))}
      </span>
    ),
  },
  { key: 'times', header: 'Edges', numeric: true, cell: (curve) => curve.times },
  {
    key: 'volume',
    header: 'Volume',
    numeric: true,
    cell: (curve) => <Num value={curve.volume} digits={5} rounded />,
  },
]

export function CurveTable({ curves }: { curves: CandidateGeometry['curves'] }) {
  const rows = useMemo(() => distinctCurves(curves), [curves])
  return (
    <VirtualTable
      label="Curve classes"
      className="max-h-96"
      count={rows.length}
      rowAt={(at) => rows[at]}
      rowKey={({ row }) => row.map((entry) => entry.join(':')).join(' ')}
      columns={columns}
    />
  )
}
