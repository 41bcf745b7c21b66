/** A record of comma-separated values with the line on which it begins. */
export interface CsvRecord {
  readonly line: number
  readonly cells: readonly string[]
}

export interface CsvReading {
  readonly records: readonly CsvRecord[]
  /** Line of a quoted cell that is never closed. */
  readonly open: number | undefined
}

/**
 * Reads separated values as RFC 4180 has them: cells in double quotes may hold separators, line ends and doubled
 * quotes. Lines that begin with `#` before a record, and blank lines, are comments.
 */
export function readCsv(text: string, separator: string): CsvReading {
  const records: CsvRecord[] = []
  let at = text.startsWith('\uFEFF') ? 1 : 0
  let line = 1
  const endOfLine = (from: number): number => {
    const end = text.indexOf('\n', from)
    return end < 0 ? text.length : end
  }
  while (at < text.length) {
    const end = endOfLine(at)
    const head = text.slice(at, end).trim()
    if (head === '' || head.startsWith('#')) {
      at = end + 1
      line++
      continue
    }
    const begun = line
    const cells: string[] = []
    for (;;) {
      while (text[at] === ' ') at++
      if (text[at] === '"') {
        let cell = ''
        for (;;) {
          const close = text.indexOf('"', at + 1)
          if (close < 0) return { records, open: line }
          const part = text.slice(at + 1, close)
          line += part.split('\n').length - 1
          cell += part
          at = close + 1
          if (text[at] !== '"') break
          cell += '"'
        }
        while (text[at] === ' ' || text[at] === '\r') at++
        cells.push(cell)
        if (at < text.length && text[at] !== separator && text[at] !== '\n') {
          // Something behind a closing quote: kept, so that the cell is reported and not silently cut.
          const stop = nextBreak(text, at, separator)
          cells[cells.length - 1] += text.slice(at, stop)
          at = stop
        }
      } else {
        const stop = nextBreak(text, at, separator)
        cells.push(text.slice(at, stop).trim())
        at = stop
      }
      if (text[at] !== separator) break
      at++
    }
    records.push({ line: begun, cells })
    at++
    line++
  }
  return { records, open: undefined }
}

function nextBreak(text: string, from: number, separator: string): number {
  const end = text.indexOf('\n', from)
  const cut = text.indexOf(separator, from)
  const line = end < 0 ? text.length : end
  return cut >= 0 && cut < line ? cut : line
}
