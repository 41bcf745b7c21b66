import { useState } from 'react'
import { type PolytopeDetail } from '../../../shared/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'

const first = 12

/** The 2-faces in numbers, largest first, under the names they have in the pictures. */
export function FaceTable({ faces }: { faces: PolytopeDetail['twoFaces'] }) {
  const [all, setAll] = useState(false)
  const rows = faces
    .map((face, index) => ({ ...face, index }))
    .sort((a, b) => b.area - a.area || a.index - b.index)
  const shown = all ? rows : rows.slice(0, first)
  return (
    <>
      <Table label="2-faces" fit>
        <thead>
          <tr>
            <Th>f</Th>
            <Th numeric>Vertices</Th>
            <Th numeric>Points</Th>
            <Th numeric title="Triangles in every fine triangulation: twice the area in lattice units">
              Area
            </Th>
            <Th numeric title="L, the lattice length of the dual edge">
              Dual length
            </Th>
            <Th>Its vertices</Th>
          </tr>
        </thead>
        <tbody>
          {shown.map((face) => (
            <tr key={face.index}>
              <Td className="text-soft">f{face.index}</Td>
              <Td numeric>{face.corners.length}</Td>
              <Td numeric>{face.points.length}</Td>
              <Td numeric>{face.area}</Td>
              <Td numeric>{face.dualLength}</Td>
              <Td>{face.corners.map((corner) => `D${corner}`).join(' ')}</Td>
            </tr>
          ))}
        </tbody>
      </Table>
      {rows.length > shown.length && (
        <Button className="mt-2" onClick={() => setAll(true)}>
          Show all {rows.length}
        </Button>
      )}
    </>
  )
}
