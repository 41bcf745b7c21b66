import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'

interface TriangleRow {
  face: number
  dualLength: number
  corners: readonly [number, number, number]
}

const columns: Column<TriangleRow>[] = [
  { key: 'face', header: '2-face', cell: (row) => `f${row.face}` },
  { key: 'i', header: 'i', numeric: true, cell: (row) => row.corners[0] },
  { key: 'j', header: 'j', numeric: true, cell: (row) => row.corners[1] },
  { key: 'k', header: 'k', numeric: true, cell: (row) => row.corners[2] },
  { key: 'length', header: 'Dual length', numeric: true, cell: (row) => row.dualLength },
]

/** The pictures of the 2-faces as a list: every triangle with its corners and its 2-face. */
export function TriangleTable({ geometry }: { geometry: CandidateGeometry }) {
  const rowAt = (at: number): TriangleRow | undefined => {
    const corners = geometry.triangles[at]
    const face = geometry.faceOf[at] ?? 0
    return corners && { face, corners, dualLength: geometry.polytope.twoFaces[face]?.dualLength ?? 1 }
  }
  return (
    <VirtualTable
      label="Triangles"
      className="max-h-72"
      count={geometry.triangles.length}
      rowAt={rowAt}
      rowKey={({ corners }) => corners.join(' ')}
      columns={columns}
    />
  )
}
