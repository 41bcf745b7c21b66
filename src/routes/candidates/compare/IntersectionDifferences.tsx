import { useMemo } from 'react'
import { type CandidateGeometry } from '../../../../shared/candidates.ts'
import { Section } from '../../../components/ui/Layout.tsx'
import { Num } from '../../../components/ui/Num.tsx'
import { Empty } from '../../../components/ui/States.tsx'
import { VirtualTable, type Column } from '../../../components/ui/VirtualTable.tsx'
import { counted } from '../../../lib/numbers.ts'
import { intersectionDifferences, type NumberDifference, type Relabelled } from './candidateDifferences.ts'

const columns: Column<NumberDifference>[] = [
  ...(['i', 'j', 'k'] as const).map((name, at): Column<NumberDifference> => ({
    key: name,
    header: name,
    numeric: true,
    cell: ({ points }) => points[at],
  })),
  { key: 'a', header: 'κ in A', numeric: true, cell: ({ a }) => <Num value={a} /> },
  { key: 'b', header: 'κ in B', numeric: true, cell: ({ b }) => <Num value={b} /> },
  { key: 'change', header: 'B − A', numeric: true, cell: ({ a, b }) => <Num value={b - a} /> },
]

/** The intersection numbers in which two classes on one polytope differ. */
export function IntersectionDifferences({ a, b }: { a: CandidateGeometry; b: Relabelled }) {
  const rows = useMemo(() => intersectionDifferences(a.intersections, b.intersections), [a, b])
  return (
    <Section
      title="Intersection numbers that differ"
      note={rows.length > 0 && `${counted(rows.length, 'number')} κ with i ≤ j ≤ k, zeros included.`}
    >
      {rows.length === 0 ? (
        <Empty title="All intersection numbers are equal." />
      ) : (
        <VirtualTable
          label="Intersection numbers that differ"
          className="max-h-96 max-w-xl"
          count={rows.length}
          rowAt={(at) => rows[at]}
          rowKey={({ points }) => points.join(' ')}
          columns={columns}
        />
      )}
    </Section>
  )
}
