import { type Scale } from './scales.ts'

interface AxisProps {
  scale: Scale
  label: string
  /** Where the plot's edges are, in pixels. */
  left: number
  right: number
  top: number
  bottom: number
}

export function BottomAxis({ scale, label, left, right, top, bottom }: AxisProps) {
  return (
    <g className="text-xs">
      <line x1={left} x2={right} y1={bottom} y2={bottom} className="stroke-edge" />
      {scale.ticks.map((tick) => (
        <g key={tick} transform={`translate(${scale(tick)} 0)`}>
          <line y1={top} y2={bottom} className="stroke-line" />
          <line y1={bottom} y2={bottom + 4} className="stroke-edge" />
          <text y={bottom + 16} textAnchor="middle" fontSize="11" className="fill-soft">
            {scale.format(tick)}
          </text>
        </g>
      ))}
      <text x={right} y={bottom + 32} textAnchor="end" fontSize="12" className="fill-ink">
        {label}
      </text>
    </g>
  )
}

export function LeftAxis({ scale, label, left, right, top, bottom }: AxisProps) {
  return (
    <g className="text-xs">
      <line x1={left} x2={left} y1={top} y2={bottom} className="stroke-edge" />
      {scale.ticks.map((tick) => (
        <g key={tick} transform={`translate(0 ${scale(tick)})`}>
          <line x1={left} x2={right} className="stroke-line" />
          <line x1={left - 4} x2={left} className="stroke-edge" />
          <text x={left - 7} dy="0.32em" textAnchor="end" fontSize="11" className="fill-soft">
            {scale.format(tick)}
          </text>
        </g>
      ))}
      <text x={left} y={top - 8} textAnchor="start" fontSize="12" className="fill-ink">
        {label}
      </text>
    </g>
  )
}
