import type { z } from 'zod'
import { linesOf, type ReadingProblem, type Section } from './given.ts'
import { complaint, deepest } from './jsonComplaint.ts'
import { candidateShape } from './jsonShapes.ts'
import type { JsonTextReading } from './jsonText.ts'

/** A JSON value with its place. */
export interface JsonNode {
  readonly value: unknown
  readonly line: number
  /** Path from the value that its line of text holds; empty for that value itself. */
  readonly path: string
}

export const within = (path: string, name: string): string => (path === '' ? name : `${path}.${name}`)

/** Values checked against shapes; what is wrong is noted with its line and path. */
export class JsonPlaces {
  readonly problems: ReadingProblem[] = []

  constructor(private readonly json: JsonTextReading) {}

  /** A part of a node, with its own line where it is a list or an object. */
  part(at: JsonNode, value: unknown, path: string): JsonNode {
    return { value, line: this.json.lineOf(value) ?? at.line, path }
  }

  fail(at: JsonNode, code: string, message: string): void {
    this.problems.push({ line: at.line, entry: at.path, code, message })
  }

  /** The value in the given shape; undefined, and a problem noted, when it has another. */
  shaped<T>(at: JsonNode, shape: z.ZodType<T>): T | undefined {
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

  /**
   * Lines of the rows of each section. The parsed data are copies without lines, so they are looked up in the value.
   */
  placesOf(
    at: JsonNode,
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

  /** Line of the innermost list or object on the way. */
  private lineAt(at: JsonNode, path: readonly PropertyKey[]): number {
    let line = at.line
    let value = at.value
    for (const part of path) {
      if (typeof value !== 'object' || value === null) break
      value = (value as Record<PropertyKey, unknown>)[part]
      line = this.json.lineOf(value) ?? line
    }
    return line
  }
}
