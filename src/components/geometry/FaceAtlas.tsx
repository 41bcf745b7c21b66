import { useMemo, useState } from 'react'
import { useWidth } from '../../lib/useWidth.ts'
import { dualLengthColour } from '../../lib/colours.ts'
import { counted } from '../../lib/numbers.ts'
import { Button } from '../ui/Button.tsx'
import { dualLengthsOf, type FaceDrawing } from './faceDrawing.ts'
import { FacePicture, type Highlight } from './FacePicture.tsx'

interface FaceAtlasProps {
  /** Largest first. */
  faces: readonly FaceDrawing[]
  highlight?: Highlight
  onHighlight?: (highlight: Highlight) => void
  onChoose?: (highlight: Highlight) => void
}

const largestUnit = 30
const smallestUnit = 3

/** Pixels per lattice unit so that the widest face fits the page; `most` where all are small. */
export function commonUnit(faces: readonly FaceDrawing[], width: number, most = largestUnit): number {
  const widest = Math.max(1, ...faces.map((face) => face.width))
  const tallest = Math.max(1, ...faces.map((face) => face.height))
  return Math.max(smallestUnit, Math.min(most, (width - 32) / widest, 520 / tallest))
}

const contains = (face: FaceDrawing, highlight: Highlight) =>
  highlight !== null && highlight.every((point) => face.at.has(point))

/** All 2-faces, drawn to one scale or each to fit; what is pointed at lights up in every face that contains it. */
export function FaceAtlas({ faces, highlight = null, onHighlight, onChoose }: FaceAtlasProps) {
  const [frame, width] = useWidth<HTMLDivElement>(900)
  const [fitted, setFitted] = useState(false)
  const [withSingles, setWithSingles] = useState(false)
  const lengths = useMemo(() => dualLengthsOf(faces), [faces])
  const singles = faces.filter((face) => face.area === 1).length
  const allSingle = singles === faces.length
  const shown = withSingles || allSingle ? faces : faces.filter((face) => face.area > 1)
  const unit = commonUnit(faces, width)

  return (
    <div ref={frame}>
      <div className="mb-3 flex flex-wrap items-center gap-x-4 gap-y-2 text-xs">
        <span className="flex flex-wrap items-center gap-x-3 gap-y-1" aria-label="Colour by dual length">
          {lengths.map((length) => (
            <span key={length} className="inline-flex items-center gap-1">
              <span
                className="inline-block size-3.5 border border-ink"
                style={{ background: dualLengthColour(length, lengths) }}
              />
              <span>
                L<sub>f</sub> = {length}
              </span>
            </span>
          ))}
        </span>
        <label className="inline-flex items-center gap-1.5">
          <input type="checkbox" checked={fitted} onChange={(event) => setFitted(event.target.checked)} />
          each face to fit
        </label>
        {singles > 0 && !allSingle && (
          <label className="inline-flex items-center gap-1.5">
            <input
              type="checkbox"
              checked={withSingles}
              onChange={(event) => setWithSingles(event.target.checked)}
            />
            with {singles === 1 ? 'the face that is' : `the ${counted(singles, 'face')} that are`} one
            triangle
          </label>
        )}
      </div>
      <Faces
        faces={shown}
        unitOf={(face) => (fitted ? Math.min(40, 180 / Math.max(1, face.width, face.height)) : unit)}
        lengths={lengths}
        highlight={highlight}
        onHighlight={onHighlight}
        onChoose={onChoose}
      />
    </div>
  )
}

const firstFaces = 60

function Faces({
  faces,
  unitOf,
  lengths,
  highlight,
  onHighlight,
  onChoose,
}: Required<Pick<FaceAtlasProps, 'faces'>> &
  FaceAtlasProps & { unitOf: (face: FaceDrawing) => number; lengths: readonly number[] }) {
  const [all, setAll] = useState(false)
  const shown = all ? faces : faces.slice(0, firstFaces)
  return (
    <>
      <ol className="flex flex-wrap items-end gap-x-5 gap-y-4">
        {shown.map((face) => (
          <li key={face.index} className="max-w-full overflow-x-auto">
            <FacePicture
              face={face}
              unit={unitOf(face)}
              lengths={lengths}
              highlight={contains(face, highlight ?? null) ? highlight : null}
              onHighlight={onHighlight}
              onChoose={onChoose}
            />
            <p className="text-xs text-soft">
              f{face.index} · {counted(face.points.length, 'point')} · L = {face.dualLength}
            </p>
          </li>
        ))}
      </ol>
      {faces.length > shown.length && (
        <Button className="mt-3" onClick={() => setAll(true)}>
          Show all {faces.length} faces
        </Button>
      )}
    </>
  )
}
