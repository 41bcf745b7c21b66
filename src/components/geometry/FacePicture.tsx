import { memo } from 'react'
import { dualLengthColour } from '../../lib/colours.ts'
import { type FaceColouring } from './faceColouring.ts'
import { type FaceDrawing } from './faceDrawing.ts'
import { FaceHighlight } from './FaceHighlight.tsx'

interface FacePictureProps {
  face: FaceDrawing
  /** Pixels per lattice unit. */
  unit: number
  /** Distinct dual lengths of the polytope: they set the colours. */
  lengths: readonly number[]
  /** Colours the surroundings of each point in place of the whole face. */
  colouring?: FaceColouring | null
  /** With the index beside each point. */
  labels?: boolean
  /** Shows what is pointed at, here or in another face. */
  live?: boolean
  label?: string
  /** Pixels left free around the polygon. */
  margin?: number
  /** Lines only, for pictures as small as a table row. */
  plain?: boolean
}

export interface FacePlacing {
  readonly width: number
  readonly height: number
  x(value: number): number
  y(value: number): number
}

export const faceMargin = 7

export function placingOf(face: FaceDrawing, unit: number, margin = faceMargin): FacePlacing {
  const width = face.width * unit + 2 * margin
  const height = face.height * unit + 2 * margin
  return {
    width,
    height,
    x: (value) => margin + value * unit,
    y: (value) => height - margin - value * unit,
  }
}

/** One 2-face to scale: lattice points, and its triangles in the colour of its dual length or of its points. */
export const FacePicture = memo(function FacePicture({
  face,
  unit,
  lengths,
  colouring,
  labels = false,
  live = false,
  label,
  margin = faceMargin,
  plain = false,
}: FacePictureProps) {
  const { width, height, x, y } = placingOf(face, unit, margin)
  const at = (point: number): string => {
    const [px, py] = face.at.get(point) ?? [0, 0]
    return `${x(px)} ${y(py)}`
  }
  const outline = `M${face.corners.map(at).join('L')}Z`
  const dot = plain ? 0 : unit >= 22 ? 2.4 : unit >= 13 ? 1.7 : unit >= 5 ? 1.2 : 0
  const isCorner = new Set(face.corners)
  // One path of round dots per size: a face may have hundreds of points.
  const dots = (points: readonly number[]) => points.map((point) => `M${at(point)}h0`).join('')
  return (
    <svg
      data-chart
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={
        label ?? `2-face ${face.index}, ${face.points.length} points, dual length ${face.dualLength}`
      }
      className="block"
    >
      <path
        d={outline}
        style={{ fill: colouring ? 'var(--sheet)' : dualLengthColour(face.dualLength, lengths) }}
        stroke="none"
      />
      {colouring && <Cells face={face} colouring={colouring} x={x} y={y} />}
      {face.edges.length > 0 && (
        <path
          d={face.edges.map(([i, j]) => `M${at(i)}L${at(j)}`).join('')}
          className="fill-none stroke-ink"
          strokeWidth={unit >= 9 && !plain ? 1 : 0.6}
          opacity={0.8}
        />
      )}
      <path
        d={outline}
        className="fill-none stroke-ink"
        strokeWidth={plain ? 0.9 : 1.5}
        strokeLinejoin="round"
      />
      {dot > 0 && (
        <>
          <path
            d={dots(face.points.filter((point) => !isCorner.has(point)))}
            className="fill-none stroke-ink"
            strokeWidth={2 * dot}
            strokeLinecap="round"
          />
          <path
            d={dots(face.corners)}
            className="fill-none stroke-ink"
            strokeWidth={2 * dot + 1.2}
            strokeLinecap="round"
          />
        </>
      )}
      {labels &&
        face.points.map((point) => {
          const [px, py] = face.at.get(point) ?? [0, 0]
          return (
            <text key={point} x={x(px) + 3} y={y(py) - 3} fontSize="10" className="face-label">
              {point}
            </text>
          )
        })}
      {live && <FaceHighlight face={face} x={x} y={y} />}
    </svg>
  )
})

/** The third of each triangle that is nearest to a corner, in the corner's colour; one path per colour. */
function Cells({
  face,
  colouring,
  x,
  y,
}: Pick<FacePlacing, 'x' | 'y'> & { face: FaceDrawing; colouring: FaceColouring }) {
  const paths = colouring.classes.map((): string[] => [])
  for (const triangle of face.triangles) {
    const corners = triangle.map((point) => {
      const [px, py] = face.at.get(point) ?? [0, 0]
      return [x(px), y(py)] as const
    })
    const [a, b, c] = corners
    if (!a || !b || !c) continue
    const middle = `${round((a[0] + b[0] + c[0]) / 3)} ${round((a[1] + b[1] + c[1]) / 3)}`
    triangle.forEach((point, k) => {
      const own = corners[k] ?? a
      const half = (other: readonly [number, number]) =>
        `${round((own[0] + other[0]) / 2)} ${round((own[1] + other[1]) / 2)}`
      const next = half(corners[(k + 1) % 3] ?? a)
      const last = half(corners[(k + 2) % 3] ?? a)
      paths[colouring.classOf[point] ?? 0]?.push(`M${own[0]} ${own[1]}L${next}L${middle}L${last}Z`)
    })
  }
  return (
    <>
      {paths.map(
        (parts, at) =>
          parts.length > 0 && (
            <path
              key={at}
              d={parts.join('')}
              style={{ fill: colouring.classes[at]?.colour, stroke: colouring.classes[at]?.colour }}
              strokeWidth="0.5"
            />
          ),
      )}
    </>
  )
}

const round = (value: number) => Math.round(value * 100) / 100
