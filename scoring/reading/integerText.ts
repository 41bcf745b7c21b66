/** Integers of a line of text, or the first entry that is none. */
export type IntegerLine =
  | { readonly kind: 'blank' }
  | { readonly kind: 'rows'; readonly rows: readonly (readonly number[])[] }
  | { readonly kind: 'text' }
  /** Nearly integers: a slip rather than a line of text. */
  | { readonly kind: 'slip'; readonly entry: string; readonly position: number }

const integer = /^[+-]?\d+(\.0*)?$/

/**
 * Reads a line of integers, parted by blanks, tabs or commas; brackets around a row are fine, and closing and opening
 * brackets or semicolons part rows on one line.
 */
export function integerLine(content: string): IntegerLine {
  const rows = content
    .replaceAll('\u2212', '-')
    .split(/;|[\])}]\s*,?\s*[[({]/)
    .map((part) => part.split(/[\s,[\](){}]+/).filter((entry) => entry !== ''))
    .filter((entries) => entries.length > 0)
  if (rows.length === 0) return { kind: 'blank' }
  const entries = rows.flat()
  const wrong = entries.findIndex((entry) => !integer.test(entry))
  if (wrong < 0) return { kind: 'rows', rows: rows.map((row) => row.map((entry) => Number(entry) + 0)) }
  const integers = entries.filter((entry) => integer.test(entry)).length
  return integers >= 2 && integers >= entries.length - 2
    ? { kind: 'slip', entry: shortened(entries[wrong]), position: wrong + 1 }
    : { kind: 'text' }
}

const shortened = (entry: string): string => (entry.length > 24 ? `${entry.slice(0, 24)}…` : entry)
