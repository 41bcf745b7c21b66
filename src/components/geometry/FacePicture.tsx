import { memo, type PointerEvent } from 'react'
import { dualLengthColour } from '../../lib/colours.ts'
import { type FaceDrawing } from './faceDrawing.ts'
import { distanceToSegment, type Point2 } from './facePlane.ts'

/** What is pointed at: a point (one index) or an edge (two), shared by all 2-faces that contain it. */
export type Highlight = readonly [number] | readonly [number, number] | null

interface FacePictureProps {
  face: FaceDrawing
  /** Pixels per lattice unit. */
  unit: number
  lengths: readonly number[]
  highlight?: Highlight
  onHighlight?: (highlight: Highlight) => void
  onChoose?: (highlight: Highlight) => void
  label?: string
  /** Pixels left free around the polygon. */
  margin?: number
  /** Lines only, for pictures as small as a table row. */
  plain?: boolean
}

/** What lies under a place in lattice coordinates: a point first, else an edge. */
export function pointedAt(face: FaceDrawing, place: Point2, unit: number): Highlight {
  const reach = Math.min(0.45, 9 / unit)
  let nearest: Highlight = null
  let least = reach
  for (const [point, [x, y]] of face.at) {
    const distance = Math.hypot(x - place[0], y - place[1])
    if (distance < least) {
      least = distance
      nearest = [point]
    }
  }
  if (nearest) return nearest
  for (const [i, j] of face.edges) {
    const a = face.at.get(i)
    const b = face.at.get(j)
    if (!a || !b) continue
    const distance = distanceToSegment(place, a, b)
    if (distance < least) {
      least = distance
      nearest = [i, j]
    }
  }
  return nearest
}

/** One 2-face to scale: lattice points, and its triangles in the colour of its dual length. */
export const FacePicture = memo(function FacePicture({
  face,
  unit,
  lengths,
  highlight = null,
  onHighlight,
  onChoose,
  label,
  margin = 7,
  plain = false,
}: FacePictureProps) {
  const width = face.width * unit + 2 * margin
  const height = face.height * unit + 2 * margin
  const x = (value: number) => margin + value * unit
  const y = (value: number) => height - margin - value * unit
  const path = (points: readonly number[]) => {
    const places = points.map((point) => face.at.get(point) ?? ([0, 0] as const))
    return `M${places.map(([px, py]) => `${x(px)} ${y(py)}`).join('L')}Z`
  }
  const line = ([i, j]: readonly [number, number]) => {
    const [ax, ay] = face.at.get(i) ?? [0, 0]
    const [bx, by] = face.at.get(j) ?? [0, 0]
    return `M${x(ax)} ${y(ay)}L${x(bx)} ${y(by)}`
  }
  const at = (event: PointerEvent<SVGSVGElement>): Point2 => {
    const box = event.currentTarget.getBoundingClientRect()
    return [(event.clientX - box.left - margin) / unit, (height - (event.clientY - box.top) - margin) / unit]
  }
  const dot = plain ? 0 : unit >= 22 ? 2.4 : unit >= 13 ? 1.7 : unit >= 5 ? 1.2 : 0
  const isCorner = new Set(face.corners)

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
      onPointerMove={onHighlight && ((event) => onHighlight(pointedAt(face, at(event), unit)))}
      onPointerLeave={onHighlight && (() => onHighlight(null))}
      onClick={
        onChoose &&
        ((event) => {
          const box = event.currentTarget.getBoundingClientRect()
          onChoose(
            pointedAt(
              face,
              [
                (event.clientX - box.left - margin) / unit,
                (height - (event.clientY - box.top) - margin) / unit,
              ],
              unit,
            ),
          )
        })
      }
    >
      <path
        d={path(face.corners)}
        style={{ fill: dualLengthColour(face.dualLength, lengths) }}
        stroke="none"
      />
      {face.edges.length > 0 && (
        <path
          d={face.edges.map(line).join('')}
          className="fill-none stroke-ink"
          strokeWidth={unit >= 9 && !plain ? 1 : 0.6}
          opacity={0.8}
        />
      )}
      <path
        d={path(face.corners)}
        className="fill-none stroke-ink"
        strokeWidth={plain ? 0.9 : 1.5}
        strokeLinejoin="round"
      />
      {dot > 0 &&
        face.points.map((point) => {
          const [px, py] = face.at.get(point) ?? [0, 0]
          return (
            <circle
              key={point}
              cx={x(px)}
              cy={y(py)}
              r={isCorner.has(point) ? dot + 0.6 : dot}
              className="fill-ink"
            />
          )
        })}
      {highlight && highlight.length === 2 && face.at.has(highlight[0]) && face.at.has(highlight[1]) && (
        <path
          d={line([highlight[0], highlight[1]])}
          stroke="var(--action)"
          strokeWidth={4}
          strokeLinecap="round"
          fill="none"
        />
      )}
      {highlight?.map((point) => {
        const place = face.at.get(point)
        return (
          place && (
            <circle
              key={point}
              cx={x(place[0])}
              cy={y(place[1])}
              r={6}
              className="fill-none stroke-action"
              strokeWidth={2.5}
            />
          )
        )
      })}
    </svg>
  )
})
