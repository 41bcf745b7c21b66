import { useCallback } from 'react'
import { type FaceDrawing } from './faceDrawing.ts'
import { type FacePlacing } from './FacePicture.tsx'
import { useHighlight } from './highlight.ts'

/** What is pointed at, in one face: the only part of a picture that is drawn again when that changes. */
export function FaceHighlight({ face, x, y }: { face: FaceDrawing } & Pick<FacePlacing, 'x' | 'y'>) {
  const concerns = useCallback(
    (highlight: readonly number[]) => highlight.every((point) => face.at.has(point)),
    [face],
  )
  const highlight = useHighlight(concerns)
  if (!highlight) return null
  const places = highlight.map((point) => {
    const [px, py] = face.at.get(point) ?? [0, 0]
    return { point, cx: x(px), cy: y(py) }
  })
  const [a, b] = places
  return (
    <g pointerEvents="none" data-highlight>
      {a && b && (
        <path
          d={`M${a.cx} ${a.cy}L${b.cx} ${b.cy}`}
          className="stroke-action"
          strokeWidth={4}
          strokeLinecap="round"
          fill="none"
        />
      )}
      {places.map(({ point, cx, cy }) => (
        <g key={point}>
          <circle cx={cx} cy={cy} r={6} className="fill-none stroke-action" strokeWidth={2.5} />
          <text x={cx + 6} y={cy - 5} fontSize="11" fontWeight="600" className="face-label">
            {point}
          </text>
        </g>
      ))}
    </g>
  )
}
