import { useMemo, useState } from 'react'
import { Minus, Plus } from 'lucide-react'
import { type ConeSliceView } from '../../../shared/coneSlices.ts'
import { BottomAxis, LeftAxis } from '../../components/charts/Axis.tsx'
import { ChartFrame } from '../../components/charts/ChartFrame.tsx'
import { linearScale } from '../../components/charts/scales.ts'
import { IconButton } from '../../components/ui/Button.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { useWidth } from '../../lib/useWidth.ts'
import { wallName } from './wallNames.ts'
import { WallTable } from './WallTable.tsx'

const top = 24
const left = 56
const below = 40

/** Half-width that shows the walls around the reference point and some room beyond. */
export function firstView({ walls, cone, reach }: ConeSliceView): number {
  const lines = new Set(cone.map(({ line }) => line))
  const distances = walls
    .filter((_, at) => lines.has(at))
    .map(({ value, slope }) => value / Math.hypot(...slope))
    .filter((distance) => distance > 0)
    .sort((a, b) => a - b)
  const shown = distances[Math.min(distances.length - 1, 3)] ?? 1
  return Math.min(reach, Math.max(1.6 * shown, 2.5 * (distances[0] ?? 1)))
}

/** The piece of the line value + slope · (x, y) = level inside the square of half-width `half`; null when it misses. */
export function lineInside(
  value: number,
  [a, b]: readonly [number, number],
  half: number,
): [number, number, number, number] | null {
  const length = Math.hypot(a, b)
  if (length === 0) return null
  const [nx, ny] = [a / length, b / length]
  const [px, py] = [(-value / length) * nx, (-value / length) * ny]
  let [from, to] = [-Infinity, Infinity]
  for (const [at, step] of [
    [px, -ny],
    [py, nx],
  ] as const) {
    if (Math.abs(step) < 1e-12) {
      if (Math.abs(at) > half) return null
      continue
    }
    const ends = [(-half - at) / step, (half - at) / step].sort((x, y) => x - y)
    from = Math.max(from, ends[0] ?? from)
    to = Math.min(to, ends[1] ?? to)
  }
  return from < to ? [px - from * ny, py + from * nx, px - to * ny, py + to * nx] : null
}

export function ConeSlice({ slice, names }: { slice: ConeSliceView; names: readonly string[] }) {
  const [frame, width] = useWidth<HTMLDivElement>(560)
  const [zoom, setZoom] = useState(0)
  const [pointed, setPointed] = useState<number | null>(null)
  const half = useMemo(() => Math.min(slice.reach, firstView(slice) * 1.6 ** -zoom), [slice, zoom])
  const side = Math.min(width - left - 8, 460)
  const right = left + side
  const bottom = top + side
  const x = linearScale(-half, half, left, right, 5)
  const y = linearScale(-half, half, bottom, top, 5)
  const path = (polygon: ConeSliceView['cone']) =>
    polygon.length > 2 ? `M${polygon.map((corner) => `${x(corner.x)} ${y(corner.y)}`).join('L')}Z` : ''
  const bounding = new Set(slice.cone.map(({ line }) => line))
  const lines = slice.walls.map((wall, at) => ({
    wall,
    at,
    bounds: bounding.has(at),
    line: lineInside(wall.value, wall.slope, half),
  }))
  const wall = pointed === null ? undefined : slice.walls[pointed]
  return (
    <ChartFrame
      title={`${slice.cone.filter(({ line }) => line >= 0).length} walls bound the slice`}
      file={`cone-slice-${slice.key.slice(0, 10)}`}
      actions={
        <span className="print:hidden">
          <IconButton label="Nearer" onClick={() => setZoom(zoom + 1)}>
            <Plus size={14} aria-hidden />
          </IconButton>
          <IconButton label="Farther" onClick={() => setZoom(zoom - 1)}>
            <Minus size={14} aria-hidden />
          </IconButton>
        </span>
      }
      table={<WallTable walls={slice.walls} bounding={bounding} />}
    >
      <div className="grid gap-x-8 gap-y-3 lg:grid-cols-[minmax(0,540px)_minmax(0,1fr)] print:grid-cols-2">
        <div ref={frame} className="min-w-0">
          <p aria-live="polite" className="mb-1 min-h-10 text-xs sm:min-h-5 print:hidden">
            {wall ? (
              <>
                <strong className="font-medium">{wallName(wall)}</strong>; class{' '}
                <span className="font-mono">
                  {wall.row.map(([point, n]) => `${point}:${String(n).replace('-', '−')}`).join(' ')}
                </span>
                ; volume {formatNumber(wall.value)} here, distance {formatNumber(wall.distance, 3)} over all
                directions
              </>
            ) : (
              <span className="text-soft">
                Point at a wall, or go to it with the Tab key, to see which it is.
              </span>
            )}
          </p>
          <svg
            data-chart
            width={right + 8}
            height={bottom + below}
            role="group"
            aria-label={`The cone in a plane through the reference point, ${lines.filter(({ bounds }) => bounds).length} walls`}
            viewBox={`0 0 ${right + 8} ${bottom + below}`}
            className="block max-w-full"
          >
            <defs>
              <clipPath id={`slice-${slice.key}`}>
                <rect x={left} y={top} width={side} height={side} />
              </clipPath>
            </defs>
            <BottomAxis
              scale={x}
              label={names[0] ?? ''}
              left={left}
              right={right}
              top={top}
              bottom={bottom}
            />
            <LeftAxis scale={y} label="across" left={left} right={right} top={top} bottom={bottom} />
            <g clipPath={`url(#slice-${slice.key})`}>
              <path d={path(slice.cone)} style={{ fill: 'var(--face-low)' }} fillOpacity="0.8" />
              <path d={path(slice.stretched)} style={{ fill: 'var(--face-high)' }} fillOpacity="0.7" />
              {lines.map(
                ({ line, at, bounds, wall: one }) =>
                  line && (
                    <g
                      key={at}
                      role="img"
                      tabIndex={bounds ? 0 : undefined}
                      aria-label={`${wallName(one)}${bounds ? '' : ', of the stretched cone'}`}
                      className="outline-none"
                      onPointerEnter={() => setPointed(at)}
                      onPointerLeave={() => setPointed(null)}
                      onFocus={() => setPointed(at)}
                      onBlur={() => setPointed(null)}
                    >
                      <path
                        d={`M${x(line[0])} ${y(line[1])}L${x(line[2])} ${y(line[3])}`}
                        className={pointed === at ? 'stroke-action' : 'stroke-ink'}
                        strokeWidth={pointed === at ? 3 : bounds ? 1 : 0.6}
                        strokeDasharray={one.edges.length === 0 ? '6 3' : undefined}
                        opacity={bounds || pointed === at ? 0.9 : 0.35}
                      />
                      <path
                        d={`M${x(line[0])} ${y(line[1])}L${x(line[2])} ${y(line[3])}`}
                        stroke="transparent"
                        strokeWidth="11"
                      />
                    </g>
                  ),
              )}
              {slice.directions.map(([dx, dy], at) => (
                <Arrow key={at} from={[x(0), y(0)]} to={[x(dx * half * 0.3), y(dy * half * 0.3)]} />
              ))}
            </g>
            <circle cx={x(0)} cy={y(0)} r="4.5" className="fill-sheet stroke-ink" strokeWidth="2" />
            {slice.directions.map(([dx, dy], at) => (
              <text
                key={at}
                x={x(dx * half * 0.34)}
                y={y(dy * half * 0.34) + (at === 0 ? -5 : 0)}
                fontSize="11"
                textAnchor={dx < 0 ? 'end' : 'start'}
                className="face-label"
              >
                {names[at]}
              </text>
            ))}
          </svg>
          <SliceKey empty={slice.stretched.length === 0} />
        </div>
        <div className="hidden min-w-0 lg:block print:block print:[&_td:nth-child(n+5)]:hidden print:[&_th:nth-child(n+5)]:hidden">
          <WallTable walls={slice.walls} bounding={bounding} onPoint={setPointed} pointed={pointed} />
        </div>
      </div>
    </ChartFrame>
  )
}

function Arrow({ from, to }: { from: readonly [number, number]; to: readonly [number, number] }) {
  const angle = (Math.atan2(to[1] - from[1], to[0] - from[0]) * 180) / Math.PI
  return (
    <g className="stroke-action" fill="none" strokeWidth="1.6" pointerEvents="none">
      <path d={`M${from[0]} ${from[1]}L${to[0]} ${to[1]}`} />
      <path d="M-7 -3.5L0 0L-7 3.5" transform={`translate(${to[0]} ${to[1]}) rotate(${angle})`} />
    </g>
  )
}

function SliceKey({ empty }: { empty: boolean }) {
  const swatch = (colour: string) => (
    <span className="inline-block size-3.5 border border-ink" style={{ background: colour }} />
  )
  return (
    <p className="flex flex-wrap gap-x-4 gap-y-1 text-xs" style={{ paddingLeft: left }}>
      <span className="inline-flex items-center gap-1.5">
        {swatch('var(--face-low)')} cone, every volume above 0
      </span>
      <span className="inline-flex items-center gap-1.5">
        {swatch('var(--face-high)')} stretched cone, every volume at least 1
        {empty && ': only the reference point, in this plane'}
      </span>
      <span className="inline-flex items-center gap-1.5">
        <svg width="24" height="8" aria-hidden>
          <path d="M0 4H24" className="stroke-ink" />
        </svg>
        curve of an edge
      </span>
      <span className="inline-flex items-center gap-1.5">
        <svg width="24" height="8" aria-hidden>
          <path d="M0 4H24" className="stroke-ink" strokeDasharray="6 3" />
        </svg>
        circuit
      </span>
      <span className="inline-flex items-center gap-1.5">
        <svg width="12" height="12" aria-hidden>
          <circle cx="6" cy="6" r="4" className="fill-sheet stroke-ink" strokeWidth="2" />
        </svg>
        reference point
      </span>
    </p>
  )
}
