/** How numbers are written on every page. Integers are exact; other numbers keep a few significant digits. */

const superscripts: Record<string, string> = {
  '-': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
}

/** A number taken apart for display: `mantissa` alone, or mantissa × 10^exponent. */
export interface NumberParts {
  mantissa: string
  exponent: number | null
}

const minus = (text: string) => text.replace('-', '−')

/**
 * Integers up to 10^15 in full with thin spaces between groups of three (from five digits on), other numbers
 * with `digits` significant digits, as a × 10^n outside 10^-3 .. 10^5. `rounded` marks a value that is no
 * exact integer even when it happens to be whole, so that a column of such values lines up.
 */
export function numberParts(value: number, digits = 4, rounded = false): NumberParts {
  if (Number.isNaN(value)) return { mantissa: 'undefined', exponent: null }
  if (!Number.isFinite(value)) return { mantissa: value > 0 ? '∞' : '−∞', exponent: null }
  if (!(rounded && value !== 0) && Number.isInteger(value) && Math.abs(value) < 1e15)
    return { mantissa: grouped(value), exponent: null }
  const [mantissa, power] = value.toExponential(digits - 1).split('e') as [string, string]
  const exponent = Number(power)
  if (exponent >= -3 && exponent < 5) {
    return { mantissa: minus(value.toFixed(Math.max(0, digits - 1 - exponent))), exponent: null }
  }
  return { mantissa: minus(mantissa), exponent }
}

function grouped(value: number): string {
  const text = String(Math.abs(value))
  const body = text.length < 5 ? text : text.replace(/\B(?=(\d{3})+$)/g, '\u2009')
  return value < 0 ? `−${body}` : body
}

/** The same as one line of text, for labels, titles and SVG. */
export function formatNumber(value: number, digits = 4): string {
  const { mantissa, exponent } = numberParts(value, digits)
  if (exponent === null) return mantissa
  return `${mantissa} × 10${superscript(exponent)}`
}

export function superscript(exponent: number): string {
  return [...String(exponent)].map((digit) => superscripts[digit] ?? digit).join('')
}

/**
 * Decimals that a column of rounded values is written with so that their points stand under each other, or null
 * when they are too far apart for that and each keeps its own significant digits. None where all are whole.
 */
export function columnDecimals(values: readonly number[], digits: number): number | null {
  if (values.length > 0 && values.every(Number.isInteger)) return 0
  const sizes = values.map(Math.abs).filter((size) => size > 0 && Number.isFinite(size))
  if (sizes.length === 0) return null
  const most = Math.floor(Math.log10(Math.max(...sizes)))
  const least = Math.floor(Math.log10(Math.min(...sizes)))
  if (most >= 7 || least < -4) return null
  const decimals = Math.max(0, digits - 1 - most, 1 - least)
  return decimals <= 6 ? decimals : null
}

/** With a fixed number of decimals, for such a column. */
export function formatFixed(value: number, decimals: number): string {
  const [whole, rest] = Math.abs(value).toFixed(decimals).split('.')
  const body = grouped(Number(whole))
  return `${value < 0 ? '−' : ''}${body}${rest ? `.${rest}` : ''}`
}

/** A rate in per cent, with enough digits to tell small rates apart. */
export function formatPercent(rate: number): string {
  const percent = rate * 100
  if (percent === 0) return '0 %'
  if (percent < 0.01) return `${formatNumber(percent, 2)} %`
  return `${percent.toFixed(percent < 1 ? 2 : percent < 10 ? 1 : 0)} %`
}

/** A stretch of time, in the two largest units that matter. */
export function formatDuration(seconds: number): string {
  if (seconds < 1) return 'under 1 s'
  if (seconds < 90) return `${Math.round(seconds)} s`
  const minutes = Math.round(seconds / 60)
  if (minutes < 90) return `${minutes} min`
  const hours = Math.floor(minutes / 60)
  return hours < 36 ? `${hours} h ${minutes % 60} min` : `${Math.round(hours / 24)} days`
}

export function formatBytes(bytes: number): string {
  return bytes < 1e6 ? `${Math.round(bytes / 1e3)} kB` : `${formatNumber(bytes / 1e6, 3)} MB`
}

const dayAndTime = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short' })

export function formatTime(iso: string): string {
  const time = new Date(iso)
  return Number.isNaN(time.getTime()) ? iso : dayAndTime.format(time)
}

/** "1 polytope", "2 polytopes". */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${formatNumber(count)} ${count === 1 ? one : many}`
}
