import { type z } from 'zod'
import type { CandidateReading, GivenCandidate, GivenPolytope, ReadingProblem, Section } from './given.ts'
import { linesOf } from './given.ts'
import { complaint, deepest } from './jsonComplaint.ts'
import {
  candidateListShape,
  candidateShape,
  certificateShape,
  evaluationShape,
  finalLineShape,
  findShape,
  shortlistShape,
  type CandidateShape,
} from './jsonShapes.ts'
import { readJsonText, type JsonTextReading } from './jsonText.ts'
import { PointList } from './pointList.ts'

const schemas = {
  'tessellary.candidates/1': 'list of candidates',
  'tessellary.evaluation/1': 'evaluation',
  'tessellary.search/1': 'search',
  'tessellary.shortlist/1': 'shortlist',
  'tessellary.certificate/1': 'certificate',
} as const
type SchemaName = keyof typeof schemas

/** A value with its place. */
interface Node {
  readonly value: unknown
  readonly line: number
  /** Path from the value that its line of text holds; empty for that value itself. */
  readonly path: string
}

/**
 * Candidates in JSON: our own list, input and output of a headless evaluation, the lines of a search, a shortlist's
 * export, certificates; one value, a list of them, or a value a line.
 */
export function readJsonCandidates(text: string): CandidateReading {
  const reader = new Reader(readJsonText(text))
  return reader.reading()
}

class Reader {
  private readonly candidates: GivenCandidate[] = []
  private readonly problems: ReadingProblem[] = []
  private readonly formats = new Set<string>()
  /** Finds that were read, since the final line of a search repeats them. */
  private readonly found = new Set<string>()

  constructor(private readonly json: JsonTextReading) {}

  reading(): CandidateReading {
    const { values, problems } = this.json
    for (const { line, code, message } of problems) this.problems.push({ line, entry: '', code, message })
    for (const { value, line } of values) this.node({ value, line, path: '' })
    this.problems.sort((a, b) => a.line - b.line)
    const names = [...this.formats]
    const shape = values.length > 1 ? 'JSON Lines' : 'JSON'
    return {
      format: names.length === 0 ? shape : `${names.join(', ')}, ${shape}`,
      candidates: this.candidates,
      problems: this.problems,
      skipped: [],
      ambiguous: [],
    }
  }

  private fail(at: Node, code: string, message: string): void {
    this.problems.push({ line: at.line, entry: at.path, code, message })
  }

  private node(at: Node): void {
    const { value } = at
    if (Array.isArray(value)) this.list(at, value, at.path)
    else if (typeof value !== 'object' || value === null) {
      this.fail(at, 'json.no-candidate', 'A candidate is an object; see the formats for its fields.')
    } else if ('schema' in value) this.withSchema(at, value)
    else this.own(at)
  }

  private list(at: Node, items: readonly unknown[], path: string): void {
    items.forEach((value, n) =>
      this.node({ value, line: this.json.lineOf(value) ?? at.line, path: `${path}[${n}]` }),
    )
  }

  private withSchema(at: Node, value: object & { readonly schema?: unknown }): void {
    const { schema } = value
    if (typeof schema !== 'string' || !(schema in schemas)) {
      const stem = String(schema).replace(/\/[^/]*$/, '')
      const known = Object.keys(schemas).find((name) => name.startsWith(`${stem}/`))
      const right = known
        ? `this version reads ${known}`
        : `the schemas read here are ${Object.keys(schemas).join(', ')}`
      this.fail(at, 'json.unknown-schema', `The schema ${JSON.stringify(schema)} is not known; ${right}.`)
      return
    }
    this.formats.add(schema)
    switch (schema as SchemaName) {
      case 'tessellary.candidates/1': {
        const list = this.shaped(at, candidateListShape)
        if (list) this.list(at, list.candidates, within(at.path, 'candidates'))
        break
      }
      case 'tessellary.evaluation/1':
        this.evaluation(at)
        break
      case 'tessellary.search/1':
        this.searchLine(at, value as { kind?: unknown })
        break
      case 'tessellary.shortlist/1':
        this.shortlist(at)
        break
      case 'tessellary.certificate/1': {
        const given = this.shaped(at, certificateShape)
        if (given) this.complete(at, given)
        break
      }
    }
  }

  private searchLine(at: Node, value: { readonly kind?: unknown }): void {
    if (value.kind === 'start') return
    if (value.kind !== 'final') {
      this.fail(
        at,
        'json.search-without-finds',
        'This is the specification of a search, which holds no candidates; give the lines that the search printed.',
      )
      return
    }
    const final = this.shaped(at, finalLineShape)
    if (!final) return
    final.top.forEach((find, n) =>
      this.find({ value: find, line: this.json.lineOf(find) ?? at.line, path: within(at.path, `top[${n}]`) }),
    )
  }

  private find(at: Node): void {
    const given = this.shaped(at, findShape)
    if (!given || this.found.has(given.classKey)) return
    this.found.add(given.classKey)
    this.normal(at, { ...given, candidateKey: given.classKey })
  }

  /** Heights that refer to the points of the polytope in normal form, in its own order, as stored ones do. */
  private normal(
    at: Node,
    given: {
      readonly polytopeKey: string
      readonly candidateKey: string
      readonly vertices?: number[][]
      readonly heights: number[]
    },
    name: string | null = null,
  ): void {
    const { polytopeKey, candidateKey, vertices, heights } = given
    this.candidates.push({
      line: at.line,
      entry: at.path,
      name,
      polytope: { kind: 'key', key: polytopeKey, ...(vertices && { vertices }) },
      points: null,
      triangulation: { kind: 'heights', values: heights },
      naming: 0,
      claims: { polytopeKey, candidateKey },
      places: this.placesOf(at, { vertices, heights }),
    })
  }

  private evaluation(at: Node): void {
    const given = this.shaped(at, evaluationShape)
    if (!given) return
    const { polytopeKey, classKey, fine, points, heights } = given
    if (!fine || classKey === null) {
      this.fail(
        at,
        'heights.not-fine',
        'The evaluation says that its heights are not fine ("fine": false): they give no candidate.',
      )
      return
    }
    this.complete(at, { polytopeKey, candidateKey: classKey, vertices: points, points, heights })
  }

  private shortlist(at: Node): void {
    const given = this.shaped(at, shortlistShape)
    if (!given) return
    const { name, rows } = given.shortlist
    const full = new Map((given.candidates ?? []).map((one) => [one.candidateKey, one]))
    rows.forEach((row, n) => {
      const node = {
        value: row,
        line: this.json.lineOf(row) ?? at.line,
        path: within(at.path, `shortlist.rows[${n}]`),
      }
      const candidate = full.get(row.candidateKey)
      const title = `${name}, rank ${row.rank}`
      if (candidate) this.normal(node, candidate, title)
      else {
        this.candidates.push({
          line: node.line,
          entry: node.path,
          name: title,
          polytope: { kind: 'key', key: row.polytopeKey },
          points: null,
          triangulation: { kind: 'address' },
          naming: 0,
          claims: { polytopeKey: row.polytopeKey, candidateKey: row.candidateKey },
          places: {},
        })
      }
    })
  }

  /** A candidate with its points and heights, and the keys it is said to have. */
  private complete(
    at: Node,
    given: {
      readonly polytopeKey: string
      readonly candidateKey: string
      readonly vertices: number[][]
      readonly points: number[][]
      readonly heights: number[]
    },
  ): void {
    const { polytopeKey, candidateKey, vertices, points, heights } = given
    this.candidates.push({
      line: at.line,
      entry: at.path,
      name: null,
      polytope: { kind: 'points', rows: vertices },
      points,
      triangulation: { kind: 'heights', values: heights },
      naming: 0,
      claims: { polytopeKey, candidateKey },
      places: this.placesOf(at, { vertices, points, heights }),
    })
  }

  /** Our own form, or the input of a headless evaluation. */
  private own(at: Node): void {
    if ('kind' in (at.value as object)) {
      const { kind } = at.value as { kind: unknown }
      // Lines of a search between its first and its last.
      if (kind === 'progress') return
      if (kind === 'find') {
        this.formats.add('tessellary.search/1')
        this.find(at)
        return
      }
    }
    const given = this.shaped(at, candidateShape)
    if (!given) return
    const polytope = this.polytopeOf(at, given)
    if (!polytope) return
    const ways = (['heights', 'simplices', 'triangles'] as const).filter((way) => given[way] !== undefined)
    if (ways.length !== 1) {
      if (ways.length === 0 && given.candidate !== undefined && polytope.kind === 'key') {
        this.address(at, given.name ?? null, polytope.key, given.candidate)
        return
      }
      if (ways.length === 0) {
        const message = 'There is no triangulation; give one of "heights", "simplices" and "triangles".'
        this.fail(at, 'candidate.no-triangulation', message)
      } else {
        const message = `The triangulation is given as ${ways.join(' and as ')}; give one of them.`
        this.fail(at, 'candidate.two-triangulations', message)
      }
      return
    }
    const list = new PointList(given.points ?? (polytope.kind === 'points' ? polytope.rows : []))
    const stated = list.rows.length > 0
    const { heights } = given
    const from = given.indexFrom ?? 0
    const indices = (rows: NonNullable<CandidateShape['simplices']>): number[][] =>
      rows.map((row) =>
        row.map((corner) => (typeof corner === 'number' ? corner - from : list.indexOfPoint(corner))),
      )
    const base = {
      line: at.line,
      entry: at.path,
      name: given.name ?? null,
      polytope,
      naming: from as GivenCandidate['naming'],
      claims: { candidateKey: given.candidate },
    }
    if (heights !== undefined) {
      const values = Array.isArray(heights) ? heights : 'values' in heights ? heights.values : undefined
      const points = !Array.isArray(heights) && 'points' in heights ? heights.points : given.points
      this.candidates.push({
        ...base,
        points: points ?? null,
        triangulation:
          values === undefined
            ? { kind: 'quadratic', ...(heights as { seed?: number; noise?: number }) }
            : { kind: 'heights', values },
        places: this.placesOf(at, { ...given, points, heights: values }),
      })
      return
    }
    const kind = given.simplices !== undefined ? 'simplices' : 'triangles'
    const corners = given[kind] ?? []
    const byPoint = corners.flat().filter((corner) => typeof corner !== 'number').length
    if (byPoint > 0 && byPoint < corners.flat().length && !stated) {
      this.fail(
        at,
        'json.mixed-corners',
        `Some corners of the ${kind} are points and others indices; indices need a list of "points" to refer to.`,
      )
      return
    }
    const rows = indices(corners)
    this.candidates.push({
      ...base,
      ...(byPoint > 0 && { naming: 'coordinates' as const }),
      points: stated || list.rows.length > 0 ? list.rows : null,
      triangulation: { kind, rows },
      places: this.placesOf(at, { ...given, heights: undefined }),
    })
  }

  private address(at: Node, name: string | null, polytopeKey: string, candidateKey: string): void {
    this.candidates.push({
      line: at.line,
      entry: at.path,
      name,
      polytope: { kind: 'key', key: polytopeKey },
      points: null,
      triangulation: { kind: 'address' },
      naming: 0,
      claims: { polytopeKey, candidateKey },
      places: {},
    })
  }

  private polytopeOf(at: Node, given: CandidateShape): GivenPolytope | undefined {
    const { polytope, vertices, weights, side } = given
    const points = given.points ?? (Array.isArray(given.heights) ? undefined : pointsOf(given.heights))
    const ways = Object.entries({ polytope, vertices, weights })
      .filter(([, way]) => way !== undefined)
      .map(([name]) => name)
    if (ways.length > 1) {
      this.fail(at, 'candidate.two-polytopes', `The polytope is given as ${ways.join(' and as ')}; give one.`)
    } else if (polytope !== undefined) return { kind: 'key', key: polytope }
    else if (vertices !== undefined) return { kind: 'points', rows: vertices }
    else if (weights !== undefined) {
      if (side !== undefined) return { kind: 'weights', weights, side }
      this.fail(
        at,
        'input.no-side',
        'Weights need a side: "fan" (the weighted hypersurface) or "newton" (its mirror).',
      )
    } else if (points !== undefined) return { kind: 'points', rows: points }
    else {
      this.fail(
        at,
        'candidate.no-polytope',
        'There is no polytope; give "vertices", "points", "weights" with a "side", or the key of a known "polytope".',
      )
    }
    return undefined
  }

  private shaped<T>(at: Node, shape: z.ZodType<T>): T | undefined {
    const parsed = shape.safeParse(at.value)
    if (parsed.success) return parsed.data
    const issue = deepest(parsed.error.issues[0])
    const path = issue.path.reduce<string>(
      (words, part) => (typeof part === 'number' ? `${words}[${part}]` : within(words, String(part))),
      '',
    )
    const line = this.lineAt(at, issue.path)
    const entry = path === '' ? at.path : path.startsWith('[') ? `${at.path}${path}` : within(at.path, path)
    if (issue.code === 'unrecognized_keys') {
      const names = issue.keys.map((name) => JSON.stringify(name)).join(', ')
      this.problems.push({
        line,
        entry,
        code: 'json.unknown-field',
        message: `There is no field ${names}; the fields are ${Object.keys(candidateShape.shape).slice(0, 11).join(', ')}.`,
      })
    } else {
      const message = complaint(issue, at.value, path)
      this.problems.push({ line, entry, code: 'json.wrong-type', message })
    }
    return undefined
  }

  /** Line of the innermost list or object on the way. */
  private lineAt(at: Node, path: readonly PropertyKey[]): number {
    let line = at.line
    let value = at.value
    for (const part of path) {
      if (typeof value !== 'object' || value === null) break
      value = (value as Record<PropertyKey, unknown>)[part]
      line = this.json.lineOf(value) ?? line
    }
    return line
  }

  /**
   * Lines of the rows of each section. The parsed data are copies without lines, so they are looked up in the value.
   */
  private placesOf(
    at: Node,
    sections: Partial<Record<Section, unknown>>,
  ): Readonly<Partial<Record<Section, readonly number[]>>> {
    const places: Partial<Record<Section, readonly number[]>> = {}
    const source = at.value as Record<string, unknown>
    for (const section of ['vertices', 'weights', 'points', 'heights', 'simplices', 'triangles'] as const) {
      if (sections[section] === undefined) continue
      let value = source[section]
      const nested = source.heights as { points?: unknown; values?: unknown } | undefined
      if (section === 'points' && value === undefined) value = nested?.points
      if (section === 'heights' && !Array.isArray(value)) value = nested?.values
      const own = this.json.lineOf(value)
      if (!Array.isArray(value) || own === undefined) continue
      places[section] = linesOf(value.map((row) => this.json.lineOf(row) ?? own))
    }
    return places
  }
}

const pointsOf = (heights: CandidateShape['heights']): number[][] | undefined =>
  heights !== undefined && 'points' in heights ? (heights as { points: number[][] }).points : undefined

const within = (path: string, name: string): string => (path === '' ? name : `${path}.${name}`)
