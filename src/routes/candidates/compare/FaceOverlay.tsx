import { type FaceDifference } from './candidateDifferences.ts'

const margin = 14
/** A is drawn solid, B dashed, so that they are told apart without colour. */
const looks = {
  a: { colour: 'var(--action)', dash: undefined, word: 'only in A' },
  b: { colour: 'var(--run-c)', dash: '5 3', word: 'only in B' },
} as const

/** One 2-face with the edges that both classes have in grey, and those of only one in its colour and dashes. */
export function FaceOverlay({
  face,
  unit,
  which,
}: {
  face: FaceDifference
  unit: number
  which: 'a' | 'b' | 'both'
}) {
  const { a: drawing } = face
  const width = drawing.width * unit + 2 * margin
  const height = drawing.height * unit + 2 * margin
  const at = (point: number): string => {
    const [x, y] = drawing.at.get(point) ?? [0, 0]
    return `${margin + x * unit} ${height - margin - y * unit}`
  }
  const lines = (edges: readonly (readonly [number, number])[]) =>
    edges.map(([i, j]) => `M${at(i)}L${at(j)}`).join('')
  const outline = (points: readonly number[]) => `M${points.map(at).join('L')}Z`
  const own = (['a', 'b'] as const).filter((one) => which === 'both' || which === one)
  const labelled = unit >= 14
  const touched = [...new Set(face.trianglesA.flat())]
  const stroke = unit >= 9 ? 2.2 : 1.4
  return (
    <svg
      data-chart
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={`2-face ${drawing.index}${which === 'both' ? '' : ` of ${which.toUpperCase()}`}: ${face.onlyA.length} edges only in A, ${face.onlyB.length} only in B, ${face.common.length} in both`}
      className="block"
    >
      <path d={outline(drawing.corners)} className="fill-sheet" stroke="none" />
      <path d={face.trianglesA.map(outline).join('')} className="fill-null-wash" stroke="none" />
      <path d={lines(face.common)} className="fill-none stroke-null" strokeWidth={unit >= 9 ? 1 : 0.6} />
      <path
        d={outline(drawing.corners)}
        className="fill-none stroke-ink"
        strokeWidth="1.4"
        strokeLinejoin="round"
      />
      {own.map((one) => (
        <path
          key={one}
          d={lines(one === 'a' ? face.onlyA : face.onlyB)}
          fill="none"
          style={{ stroke: looks[one].colour }}
          strokeWidth={stroke}
          strokeDasharray={looks[one].dash}
        />
      ))}
      {unit >= 7 &&
        drawing.points.map((point) => {
          const [x, y] = drawing.at.get(point) ?? [0, 0]
          return (
            <circle
              key={point}
              cx={margin + x * unit}
              cy={height - margin - y * unit}
              r={unit >= 13 ? 1.7 : 1.2}
              className="fill-ink"
            />
          )
        })}
      {labelled &&
        touched.map((point) => {
          const [x, y] = drawing.at.get(point) ?? [0, 0]
          return (
            <text
              key={point}
              x={margin + x * unit + 3}
              y={height - margin - y * unit - 3}
              fontSize="9"
              className="fill-ink"
            >
              {point}
            </text>
          )
        })}
    </svg>
  )
}

export function OverlayKey() {
  return (
    <span className="flex flex-wrap gap-x-4 gap-y-1">
      {(['a', 'b'] as const).map((one) => (
        <span key={one} className="inline-flex items-center gap-1.5">
          <svg width="28" height="8" aria-hidden>
            <path
              d="M0 4H28"
              strokeWidth="2.2"
              style={{ stroke: looks[one].colour }}
              strokeDasharray={looks[one].dash}
            />
          </svg>
          {looks[one].word}
        </span>
      ))}
      <span className="inline-flex items-center gap-1.5">
        <svg width="28" height="8" aria-hidden>
          <path d="M0 4H28" className="stroke-null" strokeWidth="1" />
        </svg>
        in both
      </span>
    </span>
  )
}
