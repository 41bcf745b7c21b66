import { useMemo, useState, type KeyboardEvent, type PointerEvent, type ReactNode } from 'react'
import { useWidth } from '../../lib/useWidth.ts'
import { dualLengthColour } from '../../lib/colours.ts'
import { counted } from '../../lib/numbers.ts'
import { Button } from '../ui/Button.tsx'
import { type FaceColouring } from './faceColouring.ts'
import { dualLengthsOf, type FaceDrawing } from './faceDrawing.ts'
import { faceMargin, FacePicture } from './FacePicture.tsx'
import { useHighlightStore } from './highlight.ts'
import { pointedAt, stepTo } from './pointing.ts'

interface FaceAtlasProps {
  /** Largest first. */
  faces: readonly FaceDrawing[]
  /** Pointing at a point or an edge shows it in every face that shares it. */
  live?: boolean
  colouring?: FaceColouring | null
  /** Further controls beside the atlas's own. */
  controls?: ReactNode
}

const largestUnit = 30
const smallestUnit = 3
/** Below this, labels of neighbouring points would run into each other. */
const labelledUnit = 22

/** Pixels per lattice unit so that the widest face fits the page; `most` where all are small. */
export function commonUnit(faces: readonly FaceDrawing[], width: number, most = largestUnit): number {
  const widest = Math.max(1, ...faces.map((face) => face.width))
  const tallest = Math.max(1, ...faces.map((face) => face.height))
  return Math.max(smallestUnit, Math.min(most, (width - 32) / widest, 520 / tallest))
}

/** All 2-faces, drawn to one scale or each to fit. */
export function FaceAtlas({ faces, live = false, colouring = null, controls }: FaceAtlasProps) {
  const [frame, width] = useWidth<HTMLDivElement>(900)
  const [fitted, setFitted] = useState(false)
  const [labels, setLabels] = useState(false)
  const [withSingles, setWithSingles] = useState(false)
  const lengths = useMemo(() => dualLengthsOf(faces), [faces])
  const singles = faces.filter((face) => face.area === 1).length
  const allSingle = singles === faces.length
  const shown = useMemo(
    () => (withSingles || allSingle ? faces : faces.filter((face) => face.area > 1)),
    [faces, withSingles, allSingle],
  )
  const unit = commonUnit(faces, width)
  const unitOf = (face: FaceDrawing) => {
    const own = fitted ? Math.min(40, 180 / Math.max(1, face.width, face.height)) : unit
    return labels ? Math.max(labelledUnit, own) : own
  }
  return (
    <div ref={frame}>
      <div className="mb-3 flex flex-wrap items-center gap-x-4 gap-y-2 text-xs">
        {controls}
        <ColouringKey lengths={lengths} colouring={colouring} />
        <span className="flex flex-wrap gap-x-4 gap-y-2 print:hidden">
          <Tick checked={labels} onChange={setLabels}>
            labels of points
          </Tick>
          <Tick checked={fitted} onChange={setFitted}>
            each face to fit
          </Tick>
          {singles > 0 && !allSingle && (
            <Tick checked={withSingles} onChange={setWithSingles}>
              with {singles === 1 ? 'the face that is' : `the ${counted(singles, 'face')} that are`} one
              triangle
            </Tick>
          )}
        </span>
      </div>
      <Faces
        faces={shown}
        live={live}
        unitOf={unitOf}
        lengths={lengths}
        colouring={colouring}
        labels={labels}
      />
    </div>
  )
}

function Tick({
  checked,
  onChange,
  children,
}: {
  checked: boolean
  onChange: (on: boolean) => void
  children: ReactNode
}) {
  return (
    <label className="inline-flex items-center gap-1.5">
      <input type="checkbox" checked={checked} onChange={(event) => onChange(event.target.checked)} />
      {/* One text, so that its parts keep their spaces. */}
      <span>{children}</span>
    </label>
  )
}

/** What the colours mean. */
function ColouringKey({
  lengths,
  colouring,
}: {
  lengths: readonly number[]
  colouring: FaceColouring | null
}) {
  const swatches = colouring
    ? colouring.classes.map(({ label, colour }) => ({ label: <>{label}</>, colour }))
    : lengths.map((length) => ({
        label: (
          <>
            L<sub>f</sub> = {length}
          </>
        ),
        colour: dualLengthColour(length, lengths),
      }))
  return (
    <span
      role="group"
      className="flex flex-wrap items-center gap-x-3 gap-y-1"
      aria-label={`Colours: ${colouring?.name ?? 'dual length'}`}
    >
      {swatches.map(({ label, colour }, at) => (
        <span key={at} className="inline-flex items-center gap-1">
          <span
            className="inline-block size-3.5 border border-ink print:[print-color-adjust:exact]"
            style={{ background: colour }}
          />
          <span>{label}</span>
        </span>
      ))}
    </span>
  )
}

const firstFaces = 60

interface FacesProps {
  faces: readonly FaceDrawing[]
  unitOf: (face: FaceDrawing) => number
  lengths: readonly number[]
  colouring: FaceColouring | null
  labels: boolean
  live: boolean
}

function Faces({ faces, unitOf, live, ...looks }: FacesProps) {
  const [all, setAll] = useState(false)
  const [inHand, setInHand] = useState(0)
  const shown = all ? faces : faces.slice(0, firstFaces)
  return (
    <>
      <ol
        className="flex flex-wrap items-end gap-x-5 gap-y-4"
        aria-label={
          live
            ? '2-faces. Arrow keys go from point to point, e through the edges at a point, Enter keeps it, Page up and Page down go to another face.'
            : '2-faces'
        }
      >
        {shown.map((face, at) => (
          <li key={face.index} className="max-w-full break-inside-avoid overflow-x-auto">
            {live ? (
              <LiveFace
                face={face}
                unit={unitOf(face)}
                {...looks}
                isInHand={at === Math.min(inHand, shown.length - 1)}
                onFocus={() => setInHand(at)}
              />
            ) : (
              <FacePicture face={face} unit={unitOf(face)} {...looks} />
            )}
            <p className="text-xs text-soft">
              f{face.index} · {counted(face.points.length, 'point')} · L = {face.dualLength}
            </p>
          </li>
        ))}
      </ol>
      {faces.length > shown.length && (
        <Button className="mt-3 print:hidden" onClick={() => setAll(true)}>
          Show all {faces.length} faces
        </Button>
      )}
    </>
  )
}

/** A face that can be pointed at, and walked through with keys; one of all faces is a stop of the Tab key. */
function LiveFace({
  face,
  unit,
  isInHand,
  onFocus,
  ...looks
}: Omit<FacesProps, 'faces' | 'unitOf' | 'live'> & {
  face: FaceDrawing
  unit: number
  isInHand: boolean
  onFocus: () => void
}) {
  const store = useHighlightStore()
  const under = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect()
    const x = (event.clientX - box.left - faceMargin) / unit
    const y = face.height - (event.clientY - box.top - faceMargin) / unit
    return pointedAt(face, [x, y], unit)
  }
  const onKeyDown = (event: KeyboardEvent<HTMLElement>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const own = store.shown()?.every((point) => face.at.has(point)) ? store.shown() : null
    const other = faceBeside(event.currentTarget, event.key)
    const next = stepTo(face, own, event.key)
    if (other) other.focus()
    else if (next) store.point(next)
    else if (event.key === 'Enter' && own) store.keep(own)
    else if (event.key === 'Escape') store.point(null)
    else return
    event.preventDefault()
    event.stopPropagation()
  }
  return (
    <div
      role="application"
      aria-roledescription="2-face"
      aria-label={`2-face ${face.index}`}
      data-face={face.index}
      tabIndex={isInHand ? 0 : -1}
      className="inline-block align-bottom"
      onPointerMove={(event) => store.point(under(event))}
      onPointerLeave={() => store.point(null)}
      onClick={(event) => store.keep(under(event as unknown as PointerEvent<HTMLElement>))}
      onFocus={onFocus}
      onBlur={() => store.point(null)}
      onKeyDown={onKeyDown}
    >
      <FacePicture face={face} unit={unit} live {...looks} />
    </div>
  )
}

function faceBeside(element: HTMLElement, key: string): HTMLElement | null {
  const step = { PageDown: 1, PageUp: -1 }[key]
  if (step === undefined) return null
  const all = [...(element.closest('ol')?.querySelectorAll<HTMLElement>('[data-face]') ?? [])]
  return all[all.indexOf(element) + step] ?? null
}
