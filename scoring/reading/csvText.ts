// The build without Node's streams and buffers: tables are read in the browser too.
import { parse } from 'csv-parse/browser/esm/sync'

/** A record of comma-separated values with the line on which it begins. */
export interface CsvRecord {
  readonly line: number
  readonly cells: readonly string[]
}

/** Why a table could not be read to its end. */
export interface CsvFault {
  /** Line of the record that begins it. */
  readonly line: number
  readonly code: 'csv.open-quote' | 'csv.stray-quote'
  readonly message: string
}

export interface CsvReading {
  readonly records: readonly CsvRecord[]
  readonly fault: CsvFault | undefined
}

const remarks = /^(?:[ \t]*(?:#[^\r\n]*)?(?:\r\n|\n|\r))*/

/**
 * Reads separated values as RFC 4180 has them: cells in double quotes may hold separators, line ends and doubled
 * quotes. Lines that begin with `#` before a record, and blank lines, are comments. After a fault in the quotes
 * nothing more is read, since it cannot be told where the next record begins.
 */
export function readCsv(text: string, separator: string): CsvReading {
  const records: CsvRecord[] = []
  let fault: CsvFault | undefined
  let line = 1
  /** Line of a record whose text begins where the last one ended, with remarks before it. */
  const begin = (raw: string): number => line + lineEnds(remarks.exec(raw)?.[0] ?? '')
  parse(text, {
    delimiter: separator,
    bom: true,
    trim: true,
    comment: '#',
    comment_no_infix: true,
    skip_empty_lines: true,
    relax_column_count: true,
    relax_quotes: true,
    raw: true,
    skip_records_with_error: true,
    on_record: (row: unknown) => {
      // With `raw` a record comes with its text, which the package's types do not say.
      const { record, raw } = row as { record: string[]; raw: string }
      records.push({ line: begin(raw), cells: record })
      line += lineEnds(raw)
      return null
    },
    on_skip: (error, raw) => {
      fault ??= faultOf(error?.code, begin(raw ?? ''))
      return undefined
    },
  })
  return { records, fault }
}

function faultOf(reason: string | undefined, line: number): CsvFault {
  return reason === 'CSV_QUOTE_NOT_CLOSED'
    ? {
        line,
        code: 'csv.open-quote',
        message: 'A cell in quotes in the row that begins here is never closed; nothing after it was read.',
      }
    : {
        line,
        code: 'csv.stray-quote',
        message:
          'A cell in quotes in the row that begins here is followed by more text before the next separator; ' +
          'double a quote that belongs to the text. Nothing after it was read.',
      }
}

const lineEnds = (text: string): number => text.match(/\r\n|\n|\r/g)?.length ?? 0
