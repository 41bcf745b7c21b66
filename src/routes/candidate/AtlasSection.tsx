import { useMemo, useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { ChartFrame } from '../../components/charts/ChartFrame.tsx'
import { FaceAtlas } from '../../components/geometry/FaceAtlas.tsx'
import {
  colouringBy,
  colouringByCarrier,
  type FaceColouring,
} from '../../components/geometry/faceColouring.ts'
import { drawingsOf } from '../../components/geometry/faceDrawing.ts'
import { Section } from '../../components/ui/Layout.tsx'
import { HighlightLine } from './HighlightLine.tsx'
import { TriangleTable } from './TriangleTable.tsx'

const colourings: Record<string, [label: string, of: (geometry: CandidateGeometry) => FaceColouring | null]> =
  {
    length: ['dual length L of the face', () => null],
    carrier: ['where points lie', ({ polytope }) => colouringByCarrier(polytope.carrierDimension)],
    volume: [
      'volume τ',
      ({ divisors }) =>
        colouringBy(
          'Volume τ',
          divisors.map(({ volume }) => volume),
        ),
    ],
    chi: [
      'χ(O)',
      ({ divisors }) =>
        colouringBy(
          'χ(O)',
          divisors.map(({ chi }) => chi),
        ),
    ],
    cube: [
      'D³',
      ({ divisors }) =>
        colouringBy(
          'D³',
          divisors.map(({ cube }) => cube),
        ),
    ],
    c2: ['c₂·D', ({ secondChern }) => colouringBy('c₂·D', secondChern)],
  }

/** The distinguishing view: every 2-face with its triangles, in colours one chooses. */
export function AtlasSection({ geometry }: { geometry: CandidateGeometry }) {
  const [by, setBy] = useState('length')
  const faces = useMemo(
    () => drawingsOf(geometry.polytope.twoFaces, geometry.triangles, geometry.faceOf),
    [geometry],
  )
  const colouring = useMemo(() => colourings[by]?.[1](geometry) ?? null, [by, geometry])
  return (
    <Section
      title="2-faces"
      note={
        <>
          Each 2-face with its triangulation, to one scale.
          <span className="print:hidden">
            {' '}
            Pointing at a point or an edge shows it in every face that shares it; a click keeps it. By
            keyboard: arrows from point to point, e through the edges there, Enter keeps, Page up and Page
            down change the face.
          </span>
        </>
      }
    >
      <ChartFrame
        title={`${geometry.triangles.length} triangles`}
        file={`two-faces-${geometry.key.slice(0, 10)}`}
        table={<TriangleTable geometry={geometry} />}
      >
        <HighlightLine geometry={geometry} />
        <FaceAtlas
          faces={faces}
          live
          colouring={colouring}
          controls={
            <label className="inline-flex items-center gap-1.5 print:hidden">
              Colour by
              <select
                className="min-h-7 rounded border border-edge bg-sheet px-1"
                value={by}
                onChange={(event) => setBy(event.target.value)}
              >
                {Object.entries(colourings).map(([value, [label]]) => (
                  <option key={value} value={value}>
                    {label}
                  </option>
                ))}
              </select>
            </label>
          }
        />
      </ChartFrame>
    </Section>
  )
}
