import { CsvError, parse } from 'csv-parse/sync'
import { externalLimits, type ExternalTable, type ExternalValue } from '../../shared/externalTables.ts'
import { candidateKeySchema } from '../../shared/keys.ts'
import type { PlacedProblem } from '../../shared/problems.ts'

/** What a text holds: columns and a row of values per candidate, or everything that is wrong with it. */
export type ExternalReading =
  | {
      readonly ok: true
      readonly columns: ExternalTable['columns']
      readonly rows: ReadonlyMap<string, readonly (ExternalValue | null)[]>
    }
  | { readonly ok: false; readonly problems: readonly PlacedProblem[] }

/** More mistakes than this are not listed. */
const problemsListed = 50

interface Line {
  /** From 1. */
  readonly line: number
  readonly cells: readonly string[]
}

/**
 * Reads a table of external columns: a heading line that names them, one of them `candidate`, then a line per candidate. Cells
 * are parted by commas, semicolons or tabs, whichever the heading has most of. Mistakes have a line and the number
 * of the cell in it, both from 1.
 */
export function readExternalText(text: string, asText: readonly string[] = []): ExternalReading {
  const problems: PlacedProblem[] = []
  const complain = (line: number, column: number, code: string, message: string) => {
    problems.push({ line, column, code, message })
  }
  const failed = (): ExternalReading => ({ ok: false, problems: problems.slice(0, problemsListed) })

  const lines = readLines(text, complain)
  if (lines === null) return failed()
  const [heading, ...body] = lines
  if (heading === undefined) {
    complain(
      1,
      1,
      'table-empty',
      'There is no heading line; it should name the columns: candidate, then yours.',
    )
    return failed()
  }
  const keyAt = heading.cells.findIndex((name) => name.toLowerCase() === 'candidate')
  if (keyAt < 0) {
    const names = heading.cells.map((name) => `“${name.slice(0, 30)}”`).slice(0, 6)
    complain(
      heading.line,
      1,
      'no-candidate-column',
      `No column is called candidate; found: ${names.join(', ')}.`,
    )
    return failed()
  }
  checkHeading(heading, keyAt, asText, complain)
  if (body.length > externalLimits.rows) {
    const { line } = body[externalLimits.rows]
    complain(
      line,
      1,
      'too-many-rows',
      `A table may have ${externalLimits.rows} candidates; it has ${body.length}.`,
    )
  }
  if (problems.length > 0) return failed()

  const width = heading.cells.length
  const seen = new Map<string, number>()
  for (const { line, cells } of body) {
    if (cells.length !== width) {
      const most = Math.min(cells.length, width)
      complain(line, most + 1, 'row-ragged', `${cells.length} cells, but the heading names ${width} columns.`)
      continue
    }
    const key = cells[keyAt]
    if (!candidateKeySchema.safeParse(key).success) {
      const found = key === '' ? 'nothing' : `“${key.slice(0, 40)}”`
      complain(
        line,
        keyAt + 1,
        'candidate-malformed',
        `A candidate's key has 32 digits 0-9 a-f; found ${found}.`,
      )
      continue
    }
    const before = seen.get(key)
    if (before !== undefined) {
      complain(line, keyAt + 1, 'candidate-twice', `This candidate stands in line ${before} already.`)
      continue
    }
    seen.set(key, line)
    cells.forEach((cell, at) => {
      if (cell.length <= externalLimits.textLength) return
      const { textLength } = externalLimits
      complain(
        line,
        at + 1,
        'text-too-long',
        `A cell may have ${textLength} characters; it has ${cell.length}.`,
      )
    })
  }
  if (problems.length > 0) return failed()

  const places = heading.cells.map((_, at) => at).filter((at) => at !== keyAt)
  const columns = places.map((at): ExternalTable['columns'][number] => {
    const name = heading.cells[at]
    const cells = body.map(({ cells }) => cells[at]).filter((cell) => cell !== '')
    const numeric = !asText.includes(name) && cells.length > 0 && cells.every(isNumber)
    return { name, type: numeric ? 'number' : 'text' }
  })
  const rows = body.map(({ cells }): [string, (ExternalValue | null)[]] => [
    cells[keyAt],
    places.map((at, place) => {
      const cell = cells[at]
      if (cell === '') return null
      return columns[place].type === 'number' ? Number(cell) : cell
    }),
  ])
  return { ok: true, columns, rows: new Map(rows) }
}

type Complain = (line: number, column: number, code: string, message: string) => void

function checkHeading(
  { line, cells }: Line,
  keyAt: number,
  asText: readonly string[],
  complain: Complain,
): void {
  const { columns, nameLength } = externalLimits
  if (cells.length === 1) complain(line, 2, 'no-columns', 'There is no column beside candidate.')
  if (cells.length - 1 > columns) {
    complain(
      line,
      columns + 2,
      'too-many-columns',
      `A table may have ${columns} columns; it has ${cells.length - 1}.`,
    )
  }
  cells.forEach((name, at) => {
    if (name === '') complain(line, at + 1, 'column-unnamed', 'This column has no name.')
    else if (name.length > nameLength) {
      complain(
        line,
        at + 1,
        'column-name-too-long',
        `A name may have ${nameLength} characters; it has ${name.length}.`,
      )
    }
    const before = cells.findIndex((other) => other.toLowerCase() === name.toLowerCase())
    if (name !== '' && before < at) {
      complain(line, at + 1, 'column-twice', `Column ${before + 1} is called “${cells[before]}” already.`)
    }
  })
  for (const name of asText) {
    if (!cells.some((cell, at) => at !== keyAt && cell === name)) {
      complain(line, 1, 'no-such-column', `No column is called “${name}”, which is to be text.`)
    }
  }
}

/** An integer that a number cannot hold exactly counts as text, which keeps its digits. */
function isNumber(cell: string): boolean {
  if (/^[+-]?\d+$/.test(cell)) return Number.isSafeInteger(Number(cell))
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(cell) && Number.isFinite(Number(cell))
}

/** The records with the lines on which they begin; null after a mistake that leaves the rest unreadable. */
function readLines(text: string, complain: Complain): Line[] | null {
  // One kind of line end: otherwise those inside quotes would be counted twice.
  const plain = text.replace(/\r\n?/g, '\n')
  try {
    const records = parse(plain, {
      bom: true,
      comment: '#',
      comment_no_infix: true,
      delimiter: separatorOf(plain),
      info: true,
      relax_column_count: true,
      skip_empty_lines: true,
      trim: true,
    }) as unknown as { readonly record: string[]; readonly info: { readonly lines: number } }[]
    return records.map(({ record, info }) => {
      const breaks = record.reduce((count, cell) => count + cell.split('\n').length - 1, 0)
      return { line: info.lines - breaks, cells: record }
    })
  } catch (error) {
    if (!(error instanceof CsvError)) throw error
    const { code, lines, column } = error as CsvError & { lines?: number; column?: number | string }
    const line = lines ?? 1
    const cell = typeof column === 'number' ? column + 1 : 1
    if (code === 'CSV_QUOTE_NOT_CLOSED')
      complain(line, cell, 'quote-open', 'This quotation mark is never closed.')
    else if (code === 'INVALID_OPENING_QUOTE' || code === 'CSV_INVALID_CLOSING_QUOTE') {
      complain(
        line,
        cell,
        'quote-misplaced',
        'A quotation mark inside a cell; quote the whole cell and double it.',
      )
    } else complain(line, cell, 'not-a-table', error.message)
    return null
  }
}

function separatorOf(text: string): string {
  const heading =
    text.split('\n').find((line) => line.trim() !== '' && !line.trimStart().startsWith('#')) ?? ''
  const count = (separator: string) => heading.split(separator).length
  return [',', ';', '\t'].reduce((best, one) => (count(one) > count(best) ? one : best))
}
