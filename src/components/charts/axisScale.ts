import { linearScale, logScale, tickFormat, type Scale } from './scales.ts'

/** How one quantity is laid on an axis. */
export interface AxisOf {
  readonly label: string
  readonly log: boolean
  /** Truth values: 0 is no, 1 is yes. */
  readonly truth: boolean
  /** Whole numbers, truth values included. */
  readonly whole: boolean
}

/** A scale over the values, with some room at both ends. */
export function scaleOver(
  sorted: readonly number[],
  { log, truth, whole }: AxisOf,
  from: number,
  to: number,
  ticks: number,
): Scale {
  if (truth) {
    const scale = linearScale(-0.6, 1.6, from, to)
    return Object.assign((value: number) => scale(value), {
      invert: scale.invert,
      ticks: [0, 1],
      format: (value: number) => (value === 1 ? 'yes' : 'no'),
    })
  }
  const shown = log ? sorted.filter((value) => value > 0) : sorted
  const low = shown[0] ?? (log ? 1 : 0)
  const high = shown.at(-1) ?? (log ? 10 : 1)
  if (log) {
    const room = high > low ? (high / low) ** 0.04 : 1.5
    return logScale(low / room, high * room, from, to)
  }
  const room = high > low ? (high - low) * 0.04 : Math.max(Math.abs(low) * 0.05, 0.5)
  const half = whole ? 0.6 : 0
  const scale = linearScale(low - Math.max(room, half), high + Math.max(room, half), from, to, ticks)
  if (!whole) return scale
  const inside = wholeTicks(scale.ticks)
  return Object.assign(scale, { ticks: inside, format: tickFormat(inside) })
}

/** Whole numbers have no ticks in between. */
function wholeTicks(ticks: readonly number[]): number[] {
  const whole = ticks.filter(Number.isInteger)
  return whole.length > 0 ? whole : [...ticks]
}
