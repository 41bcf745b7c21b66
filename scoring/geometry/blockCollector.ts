/** A matrix of integers found in a text, its rows being points. */
export interface PointBlock {
  /** Line on which it begins, counted from 1. */
  readonly line: number
  readonly rows: number[][]
}

/** Something in the text that is no matrix of points, and was left out. */
export interface BlockProblem {
  /** Line, counted from 1. */
  readonly line: number
  /** blocks.not-integers, blocks.ragged, blocks.wrong-shape, blocks.no-matrix or blocks.open-bracket. */
  readonly code: string
  readonly message: string
}

const integer = /^[+-]?\d+(\.0*)?$/
const numeric = /^[+-]?(\d|\.\d)/

/** Puts lines together to blocks and sorts out what is none. */
export class BlockCollector {
  readonly polytopes: PointBlock[] = []
  readonly problems: BlockProblem[] = []
  private rows: number[][] = []
  private firstLine = 0
  /** The current block has a bad line, reported already; its other lines are passed over. */
  private spoilt = false
  /** First line of a heading whose matrix has not come yet. */
  private heading: number | undefined
  private headingEnded = false

  blank(): void {
    this.close()
    this.headingEnded = true
  }

  line(content: string, line: number): void {
    // Several rows on a line: closing and opening brackets, or semicolons, between them.
    const parts = content
      .split(/;|[\])}]\s*,?\s*[[({]/)
      .map((part) => part.split(/[\s,[\](){}]+/).filter((entry) => entry !== ''))
      .filter((entries) => entries.length > 0)
    const allRows = parts.every((entries) => entries.every((entry) => integer.test(entry)))
    if (allRows || parts.length === 1) for (const entries of parts) this.entries(entries, line)
    else if (parts.some((entries) => entries.every((entry) => integer.test(entry)))) {
      this.begin(line)
      this.spoil('blocks.not-integers', line, notAnInteger(parts.flat()))
    } else this.text(line)
  }

  private entries(entries: readonly string[], line: number): void {
    const inBlock = this.rows.length > 0 || this.spoilt
    if (entries.every((entry) => integer.test(entry))) this.row(entries.map(Number), line)
    else if (!isRowLike(entries, inBlock ? (this.rows[0]?.length ?? entries.length) : 4)) this.text(line)
    else {
      if (!inBlock) this.begin(line)
      this.spoil('blocks.not-integers', line, notAnInteger(entries))
    }
  }

  private row(row: number[], line: number): void {
    if (isShape(row)) {
      this.close()
      this.text(line)
    } else if (this.spoilt) {
      return
    } else if (this.rows.length === 0) {
      this.begin(line)
      this.rows.push(row)
    } else if (row.length === this.rows[0].length) {
      this.rows.push(row)
    } else {
      this.spoil('blocks.ragged', line, ragged(row.length, this.rows[0].length, this.firstLine))
    }
  }

  private begin(line: number): void {
    this.firstLine = line
    this.heading = undefined
    this.headingEnded = false
  }

  private spoil(code: string, line: number, message: string): void {
    if (!this.spoilt) this.problems.push({ line, code, message })
    this.spoilt = true
    this.rows = []
  }

  private text(line: number): void {
    this.close()
    if (this.heading !== undefined && this.headingEnded) this.lostHeading()
    this.heading ??= line
    this.headingEnded = false
  }

  nested(
    line: number,
    rows: readonly { readonly line: number; readonly entries: readonly string[] }[],
  ): void {
    this.begin(line)
    const width = rows[0].entries.length
    for (const row of rows) {
      if (!row.entries.every((entry) => integer.test(entry))) {
        this.spoil('blocks.not-integers', row.line, notAnInteger(row.entries))
      } else if (row.entries.length !== width) {
        this.spoil('blocks.ragged', row.line, ragged(row.entries.length, width, line))
      }
    }
    if (!this.spoilt) this.rows = rows.map(({ entries }) => entries.map(Number))
    this.close()
  }

  openBracket(line: number): void {
    const message = `The list that begins on line ${line} is never closed; it was left out.`
    this.problems.push({ line, code: 'blocks.open-bracket', message })
  }

  /** Ends the current block. */
  close(): void {
    const { rows, firstLine: line } = this
    this.rows = []
    this.spoilt = false
    if (rows.length === 0) return
    const [height, width] = [rows.length, rows[0].length]
    if (width === 4) this.polytopes.push({ line, rows })
    else if (height === 4 && width > 4) {
      this.polytopes.push({ line, rows: rows[0].map((_, column) => rows.map((row) => row[column])) })
    } else {
      const message = `The block on line ${line} is a ${height} x ${width} matrix; points are rows of 4 integers, or the columns of 4 rows.`
      this.problems.push({ line, code: 'blocks.wrong-shape', message })
    }
  }

  end(): void {
    this.close()
    if (this.heading !== undefined) this.lostHeading()
  }

  private lostHeading(): void {
    if (this.heading === undefined) return
    const message = `Line ${this.heading} is no row of integers, and no matrix follows it.`
    this.problems.push({ line: this.heading, code: 'blocks.no-matrix', message })
    this.heading = undefined
  }
}

/** Two integers that announce a matrix of 4 rows or 4 columns with at least 5 points. */
const isShape = (row: readonly number[]): boolean =>
  row.length === 2 && row.includes(4) && Math.max(row[0], row[1]) >= 5

/** A line with a slip rather than a line of text: of the width expected, and integers but for one entry. */
function isRowLike(entries: readonly string[], width: number): boolean {
  if (entries.length !== width) return false
  const integers = entries.filter((entry) => integer.test(entry)).length
  return integers === width - 1 || entries.every((entry) => numeric.test(entry))
}

function notAnInteger(entries: readonly string[]): string {
  const found = entries.find((entry) => !integer.test(entry)) ?? ''
  return `"${found.length > 24 ? `${found.slice(0, 24)}…` : found}" is no integer; the block was left out.`
}

const ragged = (found: number, expected: number, line: number): string =>
  `This row has ${found} ${found === 1 ? 'entry' : 'entries'}, those before it have ${expected}; the block from line ${line} was left out.`
