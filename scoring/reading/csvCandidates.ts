import { readCsv, type CsvRecord } from './csvText.ts'
import type {
  CandidateReading,
  GivenCandidate,
  GivenPolytope,
  GivenTriangulation,
  ReadingProblem,
} from './given.ts'
import { linesOf } from './given.ts'
import { integerLine } from './integerText.ts'

const pointColumns = ['x1', 'x2', 'x3', 'x4', 'height'] as const
const polytopeColumns = ['polytope', 'vertices', 'weights', 'points'] as const
const triangulationColumns = ['heights', 'simplices', 'triangles'] as const
const columns = [
  ...['name', 'candidate', 'side', 'index from'],
  ...polytopeColumns,
  ...triangulationColumns,
  ...pointColumns,
] as const
type Column = (typeof columns)[number] | string

/** The separator of a table whose head names some of our columns; undefined when the text is no such table. */
export function csvSeparator(text: string): string | undefined {
  const head = text
    .replace(/^\uFEFF/, '')
    .split(/\r\n|\n|\r/)
    .find((line) => line.trim() !== '' && !line.trimStart().startsWith('#'))
  if (head === undefined) return undefined
  return [',', ';', '\t'].find((separator) => {
    const names = head.split(separator).map(columnName)
    return (
      names.length > 1 && names.filter((name) => (columns as readonly string[]).includes(name)).length > 1
    )
  })
}

/**
 * Candidates in a table. Either a candidate a row, with columns `name` (optional), one of `polytope` (key),
 * `vertices`, `weights` with `side`, or `points`, and one of `heights`, `simplices` and `triangles`; lists of integers
 * in cells are parted by blanks, their rows by semicolons, or written in brackets. Or a point a row, with columns
 * `x1`, `x2`, `x3`, `x4`, `height` and, for several candidates, `name`. A table with the column `candidate` (as the
 * export of a shortlist has) names candidates by their keys. Other columns are not looked at.
 */
export function readCsvCandidates(text: string, separator: string): CandidateReading {
  const { records, fault } = readCsv(text, separator)
  const table = new Table(records)
  if (fault !== undefined) table.fail(fault.line, '', fault.code, fault.message)
  return table.reading()
}

class Table {
  private readonly candidates: GivenCandidate[] = []
  private readonly problems: ReadingProblem[] = []
  private readonly names: readonly Column[]
  private readonly head: CsvRecord

  constructor(private readonly records: readonly CsvRecord[]) {
    this.head = records[0] ?? { line: 1, cells: [] }
    this.names = this.head.cells.map(columnName)
  }

  fail(line: number, entry: string, code: string, message: string): void {
    this.problems.push({ line, entry, code, message })
  }

  reading(): CandidateReading {
    const perPoint = pointColumns.some((name) => this.names.includes(name))
    const rows = this.records.slice(1).filter((record) => this.isWide(record))
    if (perPoint) this.perPoint(rows)
    else this.perCandidate(rows)
    return {
      format: `table of ${perPoint ? 'points' : 'candidates'} (CSV)`,
      candidates: this.candidates,
      problems: this.problems.sort((a, b) => a.line - b.line),
      skipped: [],
      ambiguous: [],
    }
  }

  private isWide({ cells, line }: CsvRecord): boolean {
    if (cells.length === this.names.length) return true
    const message = `This row has ${cells.length} cells; the head has ${this.names.length}.`
    this.fail(line, '', 'csv.ragged', message)
    return false
  }

  private has(name: string): boolean {
    return this.names.includes(name)
  }

  private cell(record: CsvRecord, name: string): string {
    return record.cells[this.names.indexOf(name)]?.trim() ?? ''
  }

  private missing(names: readonly string[], what: string): void {
    const found = this.head.cells.map((cell) => JSON.stringify(cell)).join(', ')
    const wanted = names.map((name) => `"${name}"`).join(names.length > 1 && what !== '' ? ', ' : ' and ')
    this.fail(
      this.head.line,
      '',
      'csv.missing-column',
      `The table has no column ${what}${wanted}; its columns are ${found}.`,
    )
  }

  /** A point with its height on every row. */
  private perPoint(records: readonly CsvRecord[]): void {
    const absent = pointColumns.filter((name) => !this.has(name))
    if (absent.length > 0) {
      this.missing(absent, '')
      return
    }
    const groups = new Map<string, { records: CsvRecord[]; spoilt: boolean }>()
    for (const record of records) {
      const name = this.cell(record, 'name')
      const group = groups.get(name) ?? { records: [], spoilt: false }
      groups.set(name, group)
      group.records.push(record)
    }
    for (const [name, { records: own }] of groups) {
      const rows = own.map((record) => this.integersOfRow(record))
      if (rows.some((row) => row === undefined)) continue
      const numbers = rows as number[][]
      const lines = linesOf(own.map(({ line }) => line))
      const points = numbers.map((row) => row.slice(0, 4))
      this.candidates.push({
        line: own[0].line,
        entry: '',
        name: name === '' ? null : name,
        polytope: { kind: 'points', rows: points },
        points,
        triangulation: { kind: 'heights', values: numbers.map((row) => row[4]) },
        naming: 0,
        claims: {},
        places: { points: lines, heights: lines },
      })
    }
  }

  private integersOfRow(record: CsvRecord): number[] | undefined {
    const row: number[] = []
    for (const name of pointColumns) {
      const value = this.integers(record, name)
      if (value === undefined) return undefined
      if (value.length !== 1 || value[0].length !== 1) {
        this.fail(
          record.line,
          name,
          'blocks.not-integers',
          `The column "${name}" holds "${shortened(this.cell(record, name))}", which is no integer; the candidate was left out.`,
        )
        return undefined
      }
      row.push(value[0][0])
    }
    return row
  }

  private perCandidate(records: readonly CsvRecord[]): void {
    const polytopeIsGiven = polytopeColumns.some((name) => this.has(name))
    const triangulationIsGiven = triangulationColumns.some((name) => this.has(name))
    if (!polytopeIsGiven) {
      this.missing(polytopeColumns, 'for the polytope: one of ')
      return
    }
    if (!triangulationIsGiven && !this.has('candidate')) {
      this.missing(triangulationColumns, 'for the triangulation: one of ')
      return
    }
    if (this.has('weights') && !this.has('side')) {
      this.missing(['side'], '')
      return
    }
    records.forEach((record, n) => this.candidateOf(record, `row ${n + 1}`))
  }

  private candidateOf(record: CsvRecord, entry: string): void {
    const { line } = record
    const polytope = this.polytopeOf(record)
    if (polytope === undefined) return
    const points = this.cell(record, 'points') === '' ? null : this.integers(record, 'points')
    if (points === undefined) return
    const claimed = this.cell(record, 'candidate')
    const ways = triangulationColumns.filter((name) => this.cell(record, name) !== '')
    let triangulation: GivenTriangulation
    if (ways.length === 0 && claimed !== '') {
      if (polytope.kind !== 'key' || !isKey(claimed)) {
        this.fail(
          line,
          'candidate',
          'csv.no-key',
          `"${shortened(claimed)}" is no key of 32 hexadecimal digits.`,
        )
        return
      }
      triangulation = { kind: 'address' }
    } else if (ways.length !== 1) {
      const [code, what] =
        ways.length === 0
          ? ['candidate.no-triangulation', 'no triangulation']
          : ['candidate.two-triangulations', `${ways.join(' and ')}, of which one is enough`]
      this.fail(line, entry, code, `This row has ${what}; give heights, simplices or triangles.`)
      return
    } else {
      const rows = this.integers(record, ways[0])
      if (rows === undefined) return
      const from = this.cell(record, 'index from') === '1' ? 1 : 0
      triangulation =
        ways[0] === 'heights'
          ? { kind: 'heights', values: rows.flat() }
          : { kind: ways[0], rows: rows.map((row) => row.map((index) => index - from)) }
    }
    const name = this.cell(record, 'name')
    this.candidates.push({
      line,
      entry,
      name: name === '' ? null : name.slice(0, 200),
      polytope,
      points,
      triangulation,
      naming: this.cell(record, 'index from') === '1' ? 1 : 0,
      claims: isKey(claimed) ? { candidateKey: claimed } : {},
      places: {},
    })
  }

  private polytopeOf(record: CsvRecord): GivenPolytope | undefined {
    const { line } = record
    // Points alone are the polytope's; beside another way they are what indices refer to.
    const way = polytopeColumns.find((name) => this.cell(record, name) !== '')
    if (way === undefined) {
      this.fail(
        line,
        '',
        'candidate.no-polytope',
        `This row has no polytope; give ${polytopeColumns.filter((name) => this.has(name)).join(' or ')}.`,
      )
      return undefined
    }
    if (way === 'polytope') {
      const key = this.cell(record, way)
      if (isKey(key.toLowerCase())) return { kind: 'key', key: key.toLowerCase() }
      this.fail(line, way, 'csv.no-key', `"${shortened(key)}" is no key of 32 hexadecimal digits.`)
      return undefined
    }
    const rows = this.integers(record, way)
    if (rows === undefined) return undefined
    if (way !== 'weights') return { kind: 'points', rows }
    const side = this.cell(record, 'side').toLowerCase()
    if (side === 'fan' || side === 'newton') return { kind: 'weights', weights: rows.flat(), side }
    this.fail(
      line,
      'side',
      'input.no-side',
      `The side is "${shortened(side)}"; it is "fan" (the weighted hypersurface) or "newton" (its mirror).`,
    )
    return undefined
  }

  private integers(record: CsvRecord, name: string): number[][] | undefined {
    const text = this.cell(record, name)
    const found = integerLine(text.replace(/\r\n|\n|\r/g, ';'))
    if (found.kind === 'rows') return found.rows.map((row) => [...row])
    const what =
      found.kind === 'slip'
        ? `Entry ${found.position} of the column "${name}", "${found.entry}", is no integer`
        : `The column "${name}" holds "${shortened(text)}", which is no list of integers`
    this.fail(record.line, name, 'blocks.not-integers', `${what}; the candidate was left out.`)
    return undefined
  }
}

const columnName = (cell: string): string => cell.trim().replace(/^"|"$/g, '').trim().toLowerCase()
const isKey = (text: string): boolean => /^[0-9a-f]{32}$/.test(text)
const shortened = (text: string): string => (text.length > 24 ? `${text.slice(0, 24)}…` : text)
