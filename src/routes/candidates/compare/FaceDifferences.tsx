import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../../shared/candidates.ts'
import { ChartFrame } from '../../../components/charts/ChartFrame.tsx'
import { commonUnit } from '../../../components/geometry/FaceAtlas.tsx'
import { Button } from '../../../components/ui/Button.tsx'
import { Section } from '../../../components/ui/Layout.tsx'
import { Empty } from '../../../components/ui/States.tsx'
import { Table, Td, Th } from '../../../components/ui/Table.tsx'
import { counted } from '../../../lib/numbers.ts'
import { useWidth } from '../../../lib/useWidth.ts'
import { faceDifferences, type FaceDifference, type Relabelled } from './candidateDifferences.ts'
import { FaceOverlay, OverlayKey } from './FaceOverlay.tsx'

const firstFaces = 12

/** The 2-faces on which two classes differ, laid over each other or side by side. */
export function FaceDifferences({ a, b, keyB }: { a: CandidateGeometry; b: Relabelled; keyB: string }) {
  const [frame, width] = useWidth<HTMLDivElement>(900)
  const [apart, setApart] = useState(false)
  const [all, setAll] = useState(false)
  const differences = useMemo(() => faceDifferences(a, b), [a, b])
  const shown = all ? differences : differences.slice(0, firstFaces)
  const unit = commonUnit(
    differences.map((face) => face.a),
    apart ? width / 2 - 16 : width,
    44,
  )
  const faces = a.polytope.twoFaces.length
  return (
    <Section
      title="2-faces that differ"
      note={
        differences.length > 0 &&
        `${counted(differences.length, '2-face')} of ${faces}, to one scale; the others have the same triangles.`
      }
    >
      {differences.length === 0 ? (
        <Empty title="All 2-faces have the same triangles." />
      ) : (
        <ChartFrame
          title={apart ? 'Side by side' : 'One over the other'}
          file={`differences-${a.key.slice(0, 6)}-${keyB.slice(0, 6)}`}
          table={<TrianglesThatDiffer differences={differences} />}
        >
          <div ref={frame}>
            <div className="mb-3 flex flex-wrap items-center gap-x-5 gap-y-2 text-xs">
              <OverlayKey />
              <label className="inline-flex items-center gap-1.5">
                <input type="checkbox" checked={apart} onChange={(event) => setApart(event.target.checked)} />
                side by side
              </label>
            </div>
            <ol className="flex flex-wrap items-end gap-x-6 gap-y-5">
              {shown.map((face) => (
                <li key={face.a.index} className="max-w-full overflow-x-auto">
                  <div className="flex flex-wrap gap-3">
                    {(apart ? (['a', 'b'] as const) : (['both'] as const)).map((which) => (
                      <FaceOverlay key={which} face={face} unit={unit} which={which} />
                    ))}
                  </div>
                  <p className="text-xs text-soft">
                    f{face.a.index} · {counted(face.trianglesA.length, 'other triangle')} · L ={' '}
                    {face.a.dualLength}
                  </p>
                </li>
              ))}
            </ol>
            {differences.length > shown.length && (
              <Button className="mt-3" onClick={() => setAll(true)}>
                Show all {differences.length} faces
              </Button>
            )}
          </div>
        </ChartFrame>
      )}
    </Section>
  )
}

function TrianglesThatDiffer({ differences }: { differences: readonly FaceDifference[] }) {
  const list = (triangles: FaceDifference['trianglesA']) =>
    triangles.map((triangle) => `{${triangle.join(', ')}}`).join(' ')
  return (
    <Table label="Triangles that differ">
      <thead>
        <tr>
          <Th>2-face</Th>
          <Th>Only in A</Th>
          <Th>Only in B</Th>
        </tr>
      </thead>
      <tbody>
        {differences.map((face) => (
          <tr key={face.a.index}>
            <Td>f{face.a.index}</Td>
            <Td className="font-mono text-xs whitespace-normal">{list(face.trianglesA)}</Td>
            <Td className="font-mono text-xs whitespace-normal">{list(face.trianglesB)}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
