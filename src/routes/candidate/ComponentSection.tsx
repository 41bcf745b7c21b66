import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { useHighlightStore } from '../../components/geometry/highlight.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'
import { columnDecimals, counted } from '../../lib/numbers.ts'

type Components = NonNullable<CandidateGeometry['components']>

interface ComponentRow {
  label: string
  point: number
  cube: number
  c2: number
  volume: number
}

interface NumberRow {
  labels: readonly string[]
  points: readonly number[]
  value: number
}

/** "12.1", "12.2" for the components of D12, "3" for a divisor of one component. */
export function componentLabels({ pointOf, sheetOf }: Pick<Components, 'pointOf' | 'sheetOf'>): string[] {
  const split = new Set(pointOf.filter((_, c) => (sheetOf[c] ?? 0) > 0))
  return pointOf.map((point, c) => (split.has(point) ? `${point}.${(sheetOf[c] ?? 0) + 1}` : String(point)))
}

/** The components of split divisors, and the numbers in which they occur. */
export function splitRows(components: Components): { parts: ComponentRow[]; numbers: NumberRow[] } {
  const labels = componentLabels(components)
  const isPart = labels.map((label) => label.includes('.'))
  const parts = labels.flatMap((label, c) =>
    isPart[c]
      ? [
          {
            label,
            point: components.pointOf[c] ?? 0,
            cube: components.cubes[c] ?? 0,
            c2: components.secondChern[c] ?? 0,
            volume: components.volumes[c] ?? 0,
          },
        ]
      : [],
  )
  const numbers = components.intersections
    .filter(([i, j, k]) => isPart[i] || isPart[j] || isPart[k])
    .map(([i, j, k, value]) => ({
      labels: [i, j, k].map((c) => labels[c] ?? ''),
      points: [...new Set([i, j, k].map((c) => components.pointOf[c] ?? 0))],
      value,
    }))
  return { parts, numbers }
}

/** Shown on polytopes that are not favourable: what the divisors' totals hide. */
export function ComponentSection({ components }: { components: Components }) {
  const store = useHighlightStore()
  const { parts, numbers } = useMemo(() => splitRows(components), [components])
  const [open, setOpen] = useState(false)
  const columns: Column<ComponentRow>[] = [
    { key: 'label', header: 'Component', cell: ({ label }) => `D${label}` },
    { key: 'cube', header: 'D³', numeric: true, cell: ({ cube }) => <Num value={cube} /> },
    { key: 'c2', header: 'c₂·D', numeric: true, cell: ({ c2 }) => <Num value={c2} /> },
    {
      key: 'chi',
      header: 'χ(O)',
      numeric: true,
      cell: ({ cube, c2 }) => <Num value={(2 * cube + c2) / 12} />,
    },
    {
      key: 'volume',
      header: 'Volume τ',
      numeric: true,
      cell: ({ volume }) => (
        <Num
          value={volume}
          digits={5}
          decimals={columnDecimals(
            parts.map((part) => part.volume),
            5,
          )}
        />
      ),
    },
  ]
  return (
    <Section
      title="Components"
      note={
        <>
          The polytope is not favourable: {counted(parts.length, 'component')} of split divisors are divisors
          of their own, all rigid, and with the others they span all of H<sup>1,1</sup>. Cone, reference point
          and metric use the toric part only, where the components of one divisor have equal weight.
        </>
      }
    >
      <div className="grid grid-cols-1 gap-x-8 gap-y-3 lg:grid-cols-2">
        <VirtualTable
          label="Components"
          className="max-h-80"
          count={parts.length}
          rowAt={(at) => parts[at]}
          rowKey={({ label }) => label}
          columns={columns}
          rowProps={({ point }) => ({
            className: 'hover:bg-action-wash',
            onPointerEnter: () => store.point([point]),
            onPointerLeave: () => store.point(null),
          })}
        />
        <div className="flex flex-col items-start gap-2">
          <Button aria-expanded={open} onClick={() => setOpen(!open)}>
            {open ? 'Hide' : 'Show'} their intersection numbers
          </Button>
          {open && (
            <VirtualTable
              label="Intersection numbers of components"
              className="max-h-80 w-full"
              count={numbers.length}
              rowAt={(at) => numbers[at]}
              rowKey={({ labels }) => labels.join(' ')}
              columns={numberColumns}
            />
          )}
        </div>
      </div>
    </Section>
  )
}

const numberColumns: Column<NumberRow>[] = [
  ...(['i', 'j', 'k'] as const).map((name, at): Column<NumberRow> => ({
    key: name,
    header: name,
    numeric: true,
    cell: ({ labels }) => labels[at],
  })),
  { key: 'value', header: 'κ', numeric: true, cell: ({ value }) => <Num value={value} /> },
]
