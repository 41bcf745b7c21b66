import { compactPlane, extent, type Point2 } from './facePlane.ts'

/** Points of a closed lattice polygon at which it turns. */
export function cornersOf(outline: readonly Point2[]): Point2[] {
  return outline.filter(([x, y], i) => {
    const [ax, ay] = outline[(i + outline.length - 1) % outline.length] ?? [0, 0]
    const [bx, by] = outline[(i + 1) % outline.length] ?? [0, 0]
    return ax + bx !== 2 * x || ay + by !== 2 * y
  })
}

const unit = 18
const margin = 6

/** A reflexive polygon with its lattice points; the one inside is the origin, with the rays that start there. */
export function ReflexivePolygon({ outline, label }: { outline: readonly Point2[]; label: string }) {
  const drawn = compactPlane([[0, 0], ...outline], cornersOf(outline))
  const [origin, ...rim] = drawn
  const [width, height] = extent(drawn)
  const x = (value: number) => margin + value * unit
  const y = (value: number) => margin + (height - value) * unit
  const place = ([px, py]: Point2) => `${x(px)} ${y(py)}`
  if (!origin) return null
  return (
    <svg
      data-chart
      width={width * unit + 2 * margin}
      height={height * unit + 2 * margin}
      role="img"
      aria-label={label}
      className="block"
    >
      <path
        d={`M${rim.map(place).join('L')}Z`}
        className="stroke-ink"
        style={{ fill: 'var(--face-low)' }}
        strokeWidth={1.5}
        strokeLinejoin="round"
      />
      <path
        d={rim.map((point) => `M${place(origin)}L${place(point)}`).join('')}
        className="fill-none stroke-ink"
        strokeWidth={0.6}
        opacity={0.7}
      />
      {rim.map((point) => (
        <circle key={place(point)} cx={x(point[0])} cy={y(point[1])} r={2.2} className="fill-ink" />
      ))}
      <circle cx={x(origin[0])} cy={y(origin[1])} r={3} className="fill-sheet stroke-ink" strokeWidth={1.2} />
    </svg>
  )
}
