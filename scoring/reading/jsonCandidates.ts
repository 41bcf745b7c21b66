import type { CandidateReading, GivenCandidate } from './given.ts'
import { JsonPlaces, within, type JsonNode } from './jsonPlaces.ts'
import {
  candidateListShape,
  certificateShape,
  evaluationShape,
  finalLineShape,
  findShape,
  shortlistShape,
} from './jsonShapes.ts'
import { readJsonText, type JsonTextReading } from './jsonText.ts'
import { addressed, ownJsonCandidate } from './ownJsonCandidate.ts'

const schemas = {
  'tessellary.candidates/1': 'list of candidates',
  'tessellary.evaluation/1': 'evaluation',
  'tessellary.search/1': 'search',
  'tessellary.shortlist/1': 'shortlist',
  'tessellary.shortlist/2': 'shortlist',
  'tessellary.certificate/1': 'certificate',
} as const
type SchemaName = keyof typeof schemas

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
  private readonly formats = new Set<string>()
  /** Finds that were read, since the final line of a search repeats them. */
  private readonly found = new Set<string>()
  private readonly places: JsonPlaces

  constructor(private readonly json: JsonTextReading) {
    this.places = new JsonPlaces(json)
  }

  reading(): CandidateReading {
    const { values } = this.json
    for (const { value, line } of values) this.node({ value, line, path: '' })
    const inText = this.json.problems.map(({ line, code, message }) => ({ line, entry: '', code, message }))
    const problems = [...inText, ...this.places.problems].sort((a, b) => a.line - b.line)
    const names = [...this.formats]
    const shape = values.length > 1 ? 'JSON Lines' : 'JSON'
    return {
      format: names.length === 0 ? shape : `${names.join(', ')}, ${shape}`,
      candidates: this.candidates,
      problems,
      skipped: [],
      ambiguous: [],
    }
  }

  private node(at: JsonNode): void {
    const { value } = at
    if (Array.isArray(value)) this.list(at, value, at.path)
    else if (typeof value !== 'object' || value === null) {
      this.places.fail(at, 'json.no-candidate', 'A candidate is an object; see the formats for its fields.')
    } else if ('schema' in value) this.withSchema(at, value)
    else this.own(at)
  }

  private list(at: JsonNode, items: readonly unknown[], path: string): void {
    items.forEach((value, n) => this.node(this.places.part(at, value, `${path}[${n}]`)))
  }

  private withSchema(at: JsonNode, value: object & { readonly schema?: unknown }): void {
    const { schema } = value
    if (typeof schema !== 'string' || !(schema in schemas)) {
      const stem = String(schema).replace(/\/[^/]*$/, '')
      const known = Object.keys(schemas).find((name) => name.startsWith(`${stem}/`))
      const right = known
        ? `this version reads ${known}`
        : `the schemas read here are ${Object.keys(schemas).join(', ')}`
      this.places.fail(
        at,
        'json.unknown-schema',
        `The schema ${JSON.stringify(schema)} is not known; ${right}.`,
      )
      return
    }
    this.formats.add(schema)
    switch (schema as SchemaName) {
      case 'tessellary.candidates/1': {
        const list = this.places.shaped(at, candidateListShape)
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
      case 'tessellary.shortlist/2':
        this.shortlist(at)
        break
      case 'tessellary.certificate/1': {
        const given = this.places.shaped(at, certificateShape)
        if (given) this.complete(at, given)
        break
      }
    }
  }

  private searchLine(at: JsonNode, value: { readonly kind?: unknown }): void {
    if (value.kind === 'start') return
    if (value.kind !== 'final') {
      this.places.fail(
        at,
        'json.search-without-finds',
        'This is the specification of a search, which holds no candidates; give the lines that the search printed.',
      )
      return
    }
    const final = this.places.shaped(at, finalLineShape)
    if (!final) return
    final.top.forEach((find, n) => this.find(this.places.part(at, find, within(at.path, `top[${n}]`))))
  }

  private find(at: JsonNode): void {
    const given = this.places.shaped(at, findShape)
    if (!given || this.found.has(given.classKey)) return
    this.found.add(given.classKey)
    this.normal(at, { ...given, candidateKey: given.classKey })
  }

  /** Heights that refer to the points of the polytope in normal form, in its own order, as stored ones do. */
  private normal(
    at: JsonNode,
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
      places: this.places.placesOf(at, { vertices, heights }),
    })
  }

  private evaluation(at: JsonNode): void {
    const given = this.places.shaped(at, evaluationShape)
    if (!given) return
    const { polytopeKey, classKey, fine, points, heights } = given
    if (!fine || classKey === null) {
      this.places.fail(
        at,
        'heights.not-fine',
        'The evaluation says that its heights are not fine ("fine": false): they give no candidate.',
      )
      return
    }
    this.complete(at, { polytopeKey, candidateKey: classKey, vertices: points, points, heights })
  }

  private shortlist(at: JsonNode): void {
    const given = this.places.shaped(at, shortlistShape)
    if (!given) return
    const { name, rows } = given.shortlist
    const full = new Map((given.candidates ?? []).map((one) => [one.candidateKey, one]))
    rows.forEach((row, n) => {
      const node = this.places.part(at, row, within(at.path, `shortlist.rows[${n}]`))
      const candidate = full.get(row.candidateKey)
      const title = `${name}, rank ${row.rank}`
      if (candidate) this.normal(node, candidate, title)
      else this.candidates.push(addressed(node, title, row.polytopeKey, row.candidateKey))
    })
  }

  /** A candidate with its points and heights, and the keys it is said to have. */
  private complete(
    at: JsonNode,
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
      places: this.places.placesOf(at, { vertices, points, heights }),
    })
  }

  /** Our own form, the input of a headless evaluation, or a line of a search between its first and its last. */
  private own(at: JsonNode): void {
    const { kind } = at.value as { kind?: unknown }
    if (kind === 'progress') return
    if (kind === 'find') {
      this.formats.add('tessellary.search/1')
      this.find(at)
      return
    }
    const candidate = ownJsonCandidate(this.places, at)
    if (candidate) this.candidates.push(candidate)
  }
}
