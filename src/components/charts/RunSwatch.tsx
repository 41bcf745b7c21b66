import { runLooks } from './runLooks.ts'

/** A piece of a run's line, as it is drawn. */
export function RunSwatch({ place }: { place: number }) {
  const { colour, dash } = runLooks[place % runLooks.length] ?? runLooks[0]
  return (
    <svg width="28" height="8" aria-hidden className="inline-block shrink-0">
      <line
        x1="0"
        x2="28"
        y1="4"
        y2="4"
        strokeWidth="2.5"
        strokeDasharray={dash.join(' ')}
        style={{ stroke: `var(--${colour})` }}
      />
    </svg>
  )
}
