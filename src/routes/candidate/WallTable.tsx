import { type ConeSliceView } from '../../../shared/coneSlices.ts'
import { Num } from '../../components/ui/Num.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { wallName } from './wallNames.ts'

type Wall = ConeSliceView['walls'][number] & { bounds: boolean }

const columns: Column<Wall>[] = [
  { key: 'name', header: 'Wall', cell: (wall) => wallName(wall) },
  {
    key: 'class',
    header: 'C · D, entries that are not 0',
    cellClass: 'font-mono text-xs',
    cell: ({ row }) => (
      <span data-raw={row.map((entry) => entry.join(':')).join(' ')}>
        {row.map(([point, n]) => `${point}:${String(n).replace('-', '−')}`).join(' ')}
      </span>
    ),
  },
  { key: 'bounds', header: 'Bounds', cell: ({ bounds }) => (bounds ? 'the cone' : 'the stretched cone') },
  {
    key: 'value',
    header: 'Volume here',
    numeric: true,
    cell: ({ value }) => <Num value={value} digits={5} rounded />,
  },
  {
    key: 'inPlane',
    header: 'Distance, in the plane',
    numeric: true,
    cell: ({ value, slope }) => <Num value={value / Math.hypot(...slope)} digits={4} rounded />,
  },
  {
    key: 'distance',
    header: 'over all',
    numeric: true,
    cell: ({ distance }) => <Num value={distance} digits={4} rounded />,
  },
]

/** The walls of a slice, nearest first over all directions. */
export function WallTable({
  walls,
  bounding,
  pointed = null,
  onPoint,
}: {
  walls: ConeSliceView['walls']
  bounding: ReadonlySet<number>
  pointed?: number | null
  onPoint?: (wall: number | null) => void
}) {
  const rows = walls.map((wall, at) => ({ ...wall, bounds: bounding.has(at) }))
  return (
    <VirtualTable
      label="Walls of the slice"
      className="max-h-[28rem]"
      count={rows.length}
      rowAt={(at) => rows[at]}
      rowKey={({ row }) => row.map((entry) => entry.join(':')).join(' ')}
      columns={columns}
      rowProps={(_, at) => ({
        className: at === pointed ? 'bg-action-wash' : '',
        onPointerEnter: onPoint && (() => onPoint(at)),
        onPointerLeave: onPoint && (() => onPoint(null)),
      })}
    />
  )
}
