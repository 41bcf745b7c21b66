import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { useHighlight, useHighlightStore } from '../../components/geometry/highlight.ts'
import { columnDecimals } from '../../lib/numbers.ts'
import { Num } from '../../components/ui/Num.tsx'
import { SortButton } from '../../components/ui/Table.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'

const carriers = ['vertex', 'edge', '2-face']

interface DivisorRow {
  index: number
  coordinates: string
  carrier: number
  components: number
  h1: number
  h2: number
  chi: number
  rigid: boolean
  cube: number
  c2: number
  weight: number
  volume: number
}

export function divisorRows({ polytope, divisors, secondChern, reference }: CandidateGeometry): DivisorRow[] {
  return divisors.map((divisor, index) => ({
    ...divisor,
    index,
    coordinates: (polytope.pointCoordinates[index] ?? []).join(' '),
    carrier: polytope.carrierDimension[index] ?? 0,
    c2: secondChern[index] ?? 0,
    weight: reference.weights[index] ?? 0,
  }))
}

const numbers = [
  ['h1', 'h¹(O)'],
  ['h2', 'h²(O)'],
  ['chi', 'χ(O)'],
  ['cube', 'D³'],
  ['c2', 'c₂·D'],
  ['weight', 'w'],
  ['volume', 'Volume τ'],
] as const

export function DivisorTable({ geometry }: { geometry: CandidateGeometry }) {
  const highlight = useHighlight()
  const store = useHighlightStore()
  const [sort, setSort] = useState<{ by: 'index' | (typeof numbers)[number][0]; down: boolean }>({
    by: 'index',
    down: false,
  })
  const rows = useMemo(() => {
    const sign = sort.down ? -1 : 1
    return divisorRows(geometry).sort((a, b) => sign * (a[sort.by] - b[sort.by]) || a.index - b.index)
  }, [geometry, sort])
  const sortable = (by: typeof sort.by, name: string) => ({
    header: (
      <SortButton
        active={sort.by === by}
        order={sort.down ? 'desc' : 'asc'}
        onClick={() => setSort({ by, down: sort.by === by && !sort.down })}
      >
        {name}
      </SortButton>
    ),
    sorted: sort.by === by ? (sort.down ? ('descending' as const) : ('ascending' as const)) : undefined,
  })
  const decimals: Partial<Record<string, number | null>> = {
    weight: columnDecimals(
      rows.map(({ weight }) => weight),
      5,
    ),
    volume: columnDecimals(
      rows.map(({ volume }) => volume),
      5,
    ),
  }
  const columns: Column<DivisorRow>[] = [
    {
      key: 'index',
      numeric: true,
      ...sortable('index', 'D'),
      cell: (row) => (
        <button
          type="button"
          className="min-w-6 text-right text-action hover:underline"
          title={`Show D${row.index} in the 2-faces`}
          onClick={() => store.keep([row.index])}
        >
          {row.index}
        </button>
      ),
    },
    {
      key: 'coordinates',
      header: 'Point',
      cellClass: 'font-mono text-xs',
      cell: (row) => (
        <span data-raw={row.coordinates}>({row.coordinates.replaceAll('-', '−').replaceAll(' ', ', ')})</span>
      ),
    },
    { key: 'carrier', header: 'Inside', cell: (row) => carriers[row.carrier] },
    { key: 'components', numeric: true, header: 'Components', cell: (row) => row.components },
    ...numbers.map(([key, name]): Column<DivisorRow> => ({
      key,
      numeric: true,
      ...sortable(key, name),
      cell: (row) => <Num value={row[key]} digits={5} decimals={decimals[key]} />,
    })),
    { key: 'rigid', header: 'Rigid', cell: (row) => (row.rigid ? 'yes' : 'no') },
  ]
  return (
    <VirtualTable
      label="Divisors"
      className="max-h-96"
      count={rows.length}
      rowAt={(at) => rows[at]}
      rowKey={(row) => String(row.index)}
      columns={columns}
      rowProps={(row) => ({
        className: highlight?.some((point) => point === row.index) ? 'bg-action-wash' : '',
        onPointerEnter: () => store.point([row.index]),
        onPointerLeave: () => store.point(null),
      })}
    />
  )
}
