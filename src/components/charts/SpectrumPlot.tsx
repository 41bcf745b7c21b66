import { useWidth } from '../../lib/useWidth.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { BottomAxis, LeftAxis } from './Axis.tsx'
import { ChartFrame } from './ChartFrame.tsx'
import { linearScale, logScale } from './scales.ts'
import { SpectrumTable } from './SpectrumTable.tsx'

const height = 260
const top = 28
const bottom = height - 40
const left = 62

export interface SpectrumSeries {
  /** Needed only where there are several. */
  readonly name?: string
  /** Eigenvalues, ascending. */
  readonly values: readonly number[]
}

/** What unselected candidates have at each number: quantiles of the eigenvalue of equal rank. */
export interface SpectrumBand {
  readonly label: string
  /** One list per number, each: 5 %, 25 %, median, 75 %, 95 %. */
  readonly quantiles: readonly (readonly number[])[]
  /** Number (from 1) of the first list; the bands of only the largest eigenvalue begin at the last. */
  readonly from: number
}

/** The first is a filled disc, the second an open diamond. */
export const spectrumColours = ['var(--action)', 'var(--run-c)'] as const

/** Eigenvalues in ascending order on a logarithmic axis, one or two spectra, with the null's band. */
export function SpectrumPlot({
  title,
  series,
  band,
  note,
  file,
}: {
  title: string
  series: readonly SpectrumSeries[]
  band?: SpectrumBand
  note?: string
  file: string
}) {
  const [frame, width] = useWidth<HTMLDivElement>(480)
  const right = width - 12
  const count = Math.max(2, ...series.map(({ values }) => values.length))
  const shown = [...series.flatMap(({ values }) => values), ...(band?.quantiles.flat() ?? [])].filter(
    (value) => value > 0,
  )
  const low = Math.min(...shown)
  const high = Math.max(...shown)
  const x = linearScale(1, count, left, right, Math.min(6, count))
  const y = logScale(low / 1.5, high * 1.5, bottom, top)
  const radius = count > 200 ? 1.6 : count > 60 ? 2.2 : 3.2
  return (
    <ChartFrame
      title={title}
      note={note}
      file={file}
      table={<SpectrumTable title={title} series={series} band={band} />}
    >
      <div ref={frame}>
        {shown.length > 0 && (
          <svg
            data-chart
            width={width}
            height={height}
            viewBox={`0 0 ${width} ${height}`}
            role="img"
            aria-label={`${title}: ${series.map(({ name, values }) => `${name ? `${name}, ` : ''}${values.length} eigenvalues from ${formatNumber(values[0] ?? 0)} to ${formatNumber(values.at(-1) ?? 0)}`).join('; ')}`}
            className="block"
          >
            <BottomAxis
              scale={x}
              label="number, ascending"
              left={left}
              right={right}
              top={top}
              bottom={bottom}
            />
            <LeftAxis scale={y} label="eigenvalue" left={left} right={right} top={top} bottom={bottom} />
            {band && <Band band={band} x={x} y={y} />}
            {series.map(({ name, values }, place) => (
              <g key={place}>
                {values.map((value, at) =>
                  value > 0 ? (
                    <Mark
                      key={at}
                      place={place}
                      x={x(at + 1)}
                      y={y(value)}
                      radius={radius}
                      title={`${name ? `${name}, ` : ''}${at + 1}: ${formatNumber(value, 6)}`}
                    />
                  ) : null,
                )}
              </g>
            ))}
          </svg>
        )}
        <Key series={series} band={band} />
      </div>
    </ChartFrame>
  )
}

function Band({
  band: { quantiles, from },
  x,
  y,
}: {
  band: SpectrumBand
  x: (value: number) => number
  y: (value: number) => number
}) {
  const place = (at: number, which: number) => `${x(from + at)} ${y(quantiles[at]?.[which] ?? 1)}`
  if (quantiles.length === 1) {
    const [least, lower, median, upper, most] = (quantiles[0] ?? []).map(y)
    const at = x(from)
    return (
      <g>
        <path d={`M${at} ${least}V${most}`} className="stroke-null" strokeWidth="2" />
        <path d={`M${at} ${lower}V${upper}`} className="stroke-null" strokeWidth="7" opacity="0.6" />
        <path d={`M${at - 7} ${median}H${at + 7}`} className="stroke-null" strokeWidth="2" />
      </g>
    )
  }
  const ranks = quantiles.map((_, at) => at)
  const area = (lower: number, upper: number) =>
    `M${ranks.map((at) => place(at, lower)).join('L')}L${ranks
      .toReversed()
      .map((at) => place(at, upper))
      .join('L')}Z`
  return (
    <g>
      <path d={area(0, 4)} className="fill-null" opacity="0.22" />
      <path d={area(1, 3)} className="fill-null" opacity="0.3" />
      <path
        d={`M${ranks.map((at) => place(at, 2)).join('L')}`}
        className="fill-none stroke-null"
        strokeWidth="1.2"
      />
    </g>
  )
}

function Mark({
  place,
  x,
  y,
  radius,
  title,
}: {
  place: number
  x: number
  y: number
  radius: number
  title?: string
}) {
  const reach = radius * 1.5
  return place === 0 ? (
    <circle cx={x} cy={y} r={radius} style={{ fill: spectrumColours[0] }}>
      {title && <title>{title}</title>}
    </circle>
  ) : (
    <path
      d={`M${x - reach} ${y}L${x} ${y - reach}L${x + reach} ${y}L${x} ${y + reach}Z`}
      style={{ stroke: spectrumColours[1], fill: 'none' }}
      strokeWidth={radius > 2 ? 1.4 : 0.8}
    >
      {title && <title>{title}</title>}
    </path>
  )
}

function Key({ series, band }: { series: readonly SpectrumSeries[]; band?: SpectrumBand }) {
  const named = series.filter(({ name }) => name)
  if (named.length === 0 && !band) return null
  return (
    <p className="flex flex-wrap gap-x-4 gap-y-1 pl-[62px] text-xs">
      {named.map(({ name }, place) => (
        <span key={place} className="inline-flex items-center gap-1.5">
          <svg width="12" height="12" aria-hidden>
            <Mark place={place} x={6} y={6} radius={3.2} />
          </svg>
          {name}
        </span>
      ))}
      {band && (
        <span className="inline-flex items-center gap-1.5">
          <svg width="16" height="12" aria-hidden>
            <rect width="16" height="12" className="fill-null" opacity="0.22" />
            <rect y="3" width="16" height="6" className="fill-null" opacity="0.3" />
            <path d="M0 6H16" className="stroke-null" strokeWidth="1.2" />
          </svg>
          {band.label}: median, half of them, nine in ten
        </span>
      )}
    </p>
  )
}
