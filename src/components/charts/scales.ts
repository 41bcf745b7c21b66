import { formatNumber, superscript } from '../../lib/numbers.ts'

/** A map from values to pixels, with the values that get a tick. */
export interface Scale {
  (value: number): number
  invert: (pixel: number) => number
  ticks: number[]
  /** How its ticks are written. */
  format: (value: number) => string
}

export function linearScale(low: number, high: number, from: number, to: number, wanted = 5): Scale {
  const span = high - low || 1
  const scale = (value: number) => from + ((value - low) / span) * (to - from)
  const invert = (pixel: number) => low + ((pixel - from) / (to - from)) * span
  const ticks = linearTicks(low, high, wanted)
  return Object.assign(scale, { invert, ticks, format: tickFormat(ticks) })
}

/** Round values inside [low, high], about `wanted` of them. */
export function linearTicks(low: number, high: number, wanted = 5): number[] {
  const span = high - low
  if (!(span > 0)) return [low]
  const rough = span / wanted
  const power = 10 ** Math.floor(Math.log10(rough))
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((size) => size >= rough) ?? rough
  const ticks: number[] = []
  for (let n = Math.ceil(low / step - 1e-9); n * step <= high + step * 1e-9; n++) {
    ticks.push(Number((n * step).toPrecision(12)))
  }
  return ticks
}

/** Logarithmic, for positive values; ticks at 1, 2, 5 of a decade while there is room, else at decades. */
export function logScale(low: number, high: number, from: number, to: number): Scale {
  const bottom = Math.log10(low)
  const span = Math.log10(high) - bottom || 1
  const scale = (value: number) => from + ((Math.log10(value) - bottom) / span) * (to - from)
  const invert = (pixel: number) => 10 ** (bottom + ((pixel - from) / (to - from)) * span)
  const ticks = logTicks(low, high)
  return Object.assign(scale, { invert, ticks, format: logTickFormat(ticks) })
}

export function logTicks(low: number, high: number): number[] {
  const first = Math.floor(Math.log10(low) + 1e-9)
  const last = Math.ceil(Math.log10(high) - 1e-9)
  const decades = last - first
  const inDecade = decades <= 3 ? [1, 2, 5] : [1]
  const stride = Math.max(1, Math.ceil(decades / 7))
  const ticks: number[] = []
  for (let power = first; power <= last; power += 1) {
    if (inDecade.length === 1 && (power - first) % stride !== 0) continue
    for (const digit of inDecade) {
      const value = Number(`${digit}e${power}`)
      if (value >= low * (1 - 1e-9) && value <= high * (1 + 1e-9)) ticks.push(value)
    }
  }
  return ticks
}

/** Ticks written with as many decimals as the finest of them needs, all alike. */
export function tickFormat(ticks: readonly number[]): (value: number) => string {
  const decimals = Math.max(0, ...ticks.map((tick) => (String(tick).split('.')[1] ?? '').length))
  const large = ticks.some((tick) => Math.abs(tick) >= 1e5)
  const small = decimals > 4 || ticks.some((tick) => String(tick).includes('e'))
  if (large || small) return (value) => formatNumber(value, 3)
  return (value) => value.toFixed(decimals).replace('-', '−')
}

/** Powers of ten as such where plain numbers would grow long. */
export function logTickFormat(ticks: readonly number[]): (value: number) => string {
  if (ticks.every((tick) => tick >= 1e-3 && tick < 1e5)) return (value) => formatNumber(value)
  return (value) => {
    const power = Math.floor(Math.log10(value) + 1e-9)
    const digit = Math.round(value / 10 ** power)
    return `${digit === 1 ? '' : `${digit} × `}10${superscript(power)}`
  }
}
