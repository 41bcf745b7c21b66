import type { NestedBlock } from '../geometry/nestedRows.ts'
import type {
  CandidateReading,
  GivenCandidate,
  GivenPolytope,
  GivenTriangulation,
  Orientation,
  ReadingProblem,
  Section,
} from './given.ts'
import { linesOf } from './given.ts'
import { integerLine, type IntegerLine } from './integerText.ts'
import { matrixRows, type MatrixKind } from './matrixShape.ts'

export type SectionName = Exclude<Section, 'polytope'> | 'lifted'

interface Rows {
  readonly rows: readonly (readonly number[])[]
  readonly lines: readonly number[]
}

/** A candidate under construction. */
class Draft {
  name: string | null = null
  polytope: GivenPolytope | undefined
  points: readonly (readonly number[])[] | null = null
  triangulation: GivenTriangulation | undefined
  indexFrom: 0 | 1 = 0
  spoilt = false
  readonly places: Partial<Record<Section, readonly number[]>> = {}

  constructor(readonly line: number) {}

  get empty(): boolean {
    return (
      this.polytope === undefined && this.points === null && this.triangulation === undefined && !this.spoilt
    )
  }
}

/** Puts the blocks of a text together to candidates. */
export class SectionCollector {
  private readonly candidates: GivenCandidate[] = []
  private readonly problems: ReadingProblem[] = []
  private readonly skipped: { line: number; text: string }[] = []
  private readonly ambiguous: { line: number; what: string }[] = []
  private draft: Draft | undefined
  /** The candidate before, on whose polytope the next may stand. */
  private before: Draft | undefined
  /** Heading of the block that is being read. */
  private section: SectionName | undefined
  private rows: number[][] = []
  private lines: number[] = []
  /** The block has a fault, reported already; its other lines are passed over. */
  private faulty = false

  constructor(private readonly orientation: Orientation | undefined) {}

  /** A candidate begins here whatever comes before. */
  candidate(name: string, line: number): void {
    this.close()
    if (this.draft !== undefined && (!this.draft.empty || this.draft.name !== null)) this.finish()
    this.draft ??= new Draft(line)
    if (name !== '') this.draft.name = name.slice(0, 200)
  }

  polytope(key: string, line: number): void {
    this.close()
    this.begin(line, 'polytope')
    this.current(line).polytope = { kind: 'key', key }
    this.current(line).places.polytope = [line]
  }

  weights(weights: readonly number[], side: 'fan' | 'newton', line: number): void {
    this.close()
    this.begin(line, 'polytope')
    this.current(line).polytope = { kind: 'weights', weights, side }
    this.current(line).places.weights = [line]
  }

  indicesFrom(first: 0 | 1, line: number): void {
    this.close()
    this.current(line).indexFrom = first
  }

  open(section: SectionName, line: number): void {
    this.close()
    this.section = section
    this.current(line)
  }

  blank(): void {
    // A blank line behind a heading belongs to it.
    if (this.rows.length > 0 || this.faulty) this.close()
  }

  content(found: IntegerLine, line: number, text: string): void {
    if (found.kind === 'rows') for (const row of found.rows) this.row(row, line)
    else if (found.kind === 'slip') {
      this.current(line)
      this.spoil(line, 'blocks.not-integers', `Entry ${found.position}, "${found.entry}", is no integer`)
    } else if (found.kind === 'text') {
      this.close()
      this.skipped.push({ line, text: text.length > 80 ? `${text.slice(0, 80)}…` : text })
    }
  }

  nested({ rows }: NestedBlock): void {
    if (this.rows.length > 0 || this.faulty) this.close()
    for (const { line, entries } of rows) {
      this.content(integerLine(entries.join(' ')), line, entries.join(' '))
    }
    this.close()
  }

  /** A fault of the candidate in hand, which is left out. */
  fault(line: number, code: string, what: string): void {
    this.current(line).spoilt = true
    this.problems.push({ line, entry: '', code, message: `${what}; the candidate was left out.` })
  }

  end(): CandidateReading {
    this.close()
    this.finish()
    return {
      format: 'text in sections',
      candidates: this.candidates,
      problems: this.problems.sort((a, b) => a.line - b.line),
      skipped: this.skipped,
      ambiguous: this.ambiguous,
    }
  }

  private current(line: number): Draft {
    return (this.draft ??= new Draft(line))
  }

  private row(row: readonly number[], line: number): void {
    if (this.faulty) return
    // Heights may be cut into lines anyhow.
    const width = this.section === 'heights' ? row.length : this.rows[0]?.length
    if (width !== undefined && row.length !== width) {
      this.spoil(line, 'blocks.ragged', `This row has ${counted(row.length)}, those before it have ${width}`)
      return
    }
    this.rows.push([...row])
    this.lines.push(line)
  }

  private spoil(line: number, code: string, what: string): void {
    if (this.faulty) return
    // A block without a heading may be the first of a new candidate: the fault must not take the one before with it.
    if (this.section === undefined && this.draft?.triangulation !== undefined) {
      this.rows = []
      this.finish()
    }
    this.fault(line, code, what)
    this.faulty = true
  }

  /** Ends the block in hand. */
  private close(): void {
    const { rows, lines, section } = this
    this.rows = []
    this.lines = []
    this.section = undefined
    this.faulty = false
    if (rows.length > 0) this.block(section ?? sectionOfShape(rows), { rows, lines }, section === undefined)
  }

  private block(section: SectionName | undefined, block: Rows, bare: boolean): void {
    const [line] = block.lines
    if (section === undefined) {
      const [height, width] = [block.rows.length, block.rows[0].length]
      this.fault(
        line,
        'blocks.wrong-shape',
        `A ${height} x ${width} matrix without a heading is neither points (4 columns or rows), heights (one row or column), triangles (3 columns) nor simplices (5 columns)`,
      )
      return
    }
    if (section === 'heights') {
      this.begin(line, 'triangulation')
      this.setTriangulation({ kind: 'heights', values: block.rows.flat() }, 'heights', {
        lines: block.rows.flatMap((row, r) => row.map(() => block.lines[r])),
      })
      return
    }
    this.begin(line, section === 'vertices' ? 'polytope' : section === 'points' ? 'points' : 'triangulation')
    const kind = matrixKinds[section]
    const reading = matrixRows(kind, block.rows, this.orientation)
    if ('ambiguous' in reading) {
      this.ambiguous.push({ line, what: kind })
      this.current(line).spoilt = true
      return
    }
    if ('wrong' in reading) {
      this.fault(line, 'blocks.wrong-shape', `${bare ? '' : `In "${section}" `}${reading.wrong}`)
      return
    }
    const lines = reading.transposed ? [line] : block.lines
    this.matrix(section, reading.rows, lines)
  }

  private matrix(section: SectionName, rows: readonly (readonly number[])[], lines: readonly number[]): void {
    const draft = this.current(lines[0])
    const { places } = draft
    if (section === 'vertices') {
      draft.polytope = { kind: 'points', rows }
      places.vertices = linesOf(lines)
    } else if (section === 'points') {
      draft.points = rows
      places.points = linesOf(lines)
    } else if (section === 'lifted') {
      draft.points = rows.map((row) => row.slice(0, 4))
      places.points = linesOf(lines)
      this.setTriangulation({ kind: 'heights', values: rows.map((row) => row[4]) }, 'heights', { lines })
    } else {
      this.setTriangulation({ kind: section as 'simplices' | 'triangles', rows }, section as Section, {
        lines,
      })
    }
  }

  private setTriangulation(
    triangulation: GivenTriangulation,
    section: Section,
    { lines }: { lines: readonly number[] },
  ): void {
    const draft = this.current(lines[0])
    draft.triangulation = triangulation
    draft.places[section] = linesOf(lines)
  }

  /** Ends the candidate in hand when a part of this kind would be its second. */
  private begin(line: number, part: 'polytope' | 'points' | 'triangulation'): void {
    const { draft } = this
    if (draft === undefined) {
      this.draft = new Draft(line)
      return
    }
    const second =
      part === 'polytope'
        ? draft.polytope !== undefined || draft.triangulation !== undefined
        : part === 'points'
          ? draft.points !== null || draft.triangulation !== undefined
          : draft.triangulation !== undefined
    if (!second) return
    this.finish()
    this.draft = new Draft(line)
  }

  private finish(): void {
    const { draft } = this
    this.draft = undefined
    if (draft === undefined) return
    if (draft.empty) {
      if (draft.name !== null) {
        this.problems.push({
          line: draft.line,
          entry: '',
          code: 'candidate.empty',
          message: `The candidate "${draft.name}" has no data.`,
        })
      }
      return
    }
    // On the polytope of the candidate before, and on its points unless it lists its own.
    const { before } = this
    const shares = draft.polytope === undefined && before !== undefined && !draft.spoilt
    if (shares) {
      draft.polytope = before.polytope
      draft.points ??= before.points
      for (const section of ['vertices', 'points', 'weights', 'polytope'] as const) {
        draft.places[section] ??= before.places[section]
      }
      if (draft.indexFrom === 0) draft.indexFrom = before.indexFrom
    }
    if (draft.polytope === undefined && draft.points !== null)
      draft.polytope = { kind: 'points', rows: draft.points }
    if (draft.polytope !== undefined) this.before = draft
    if (draft.spoilt) return
    const { polytope, triangulation, line } = draft
    if (polytope === undefined) {
      this.missing(line, 'candidate.no-polytope', 'no polytope before it', 'vertices, weights or a key')
    } else if (triangulation === undefined) {
      this.missing(line, 'candidate.no-triangulation', 'no triangulation', 'heights, simplices or triangles')
    } else {
      this.candidates.push({
        line,
        entry: '',
        name: draft.name,
        polytope,
        points: draft.points,
        triangulation: shifted(triangulation, draft.indexFrom),
        naming: draft.indexFrom,
        claims: {},
        places: draft.places,
      })
    }
  }

  private missing(line: number, code: string, what: string, right: string): void {
    this.problems.push({
      line,
      entry: '',
      code,
      message: `The candidate that begins here has ${what}; give ${right}.`,
    })
  }
}

const matrixKinds: Record<Exclude<SectionName, 'heights' | 'weights'>, MatrixKind> &
  Record<string, MatrixKind> = {
  vertices: 'points',
  points: 'points',
  lifted: 'lifted points',
  simplices: 'simplices',
  triangles: 'triangles',
}

/** What a block without a heading is. */
function sectionOfShape(rows: readonly (readonly number[])[]): SectionName | undefined {
  const [height, width] = [rows.length, rows[0].length]
  if (height === 1 || width === 1) return 'heights'
  if (width === 3) return 'triangles'
  if (width === 4 || height === 4) return 'vertices'
  return width === 5 ? 'simplices' : undefined
}

function shifted(triangulation: GivenTriangulation, indexFrom: number): GivenTriangulation {
  if (indexFrom === 0 || !('rows' in triangulation)) return triangulation
  return { ...triangulation, rows: triangulation.rows.map((row) => row.map((index) => index - indexFrom)) }
}

const counted = (entries: number): string => `${entries} ${entries === 1 ? 'entry' : 'entries'}`
