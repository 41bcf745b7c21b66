import { printParseErrorCode, visit } from 'jsonc-parser'

/** A JSON value with the line on which it begins. */
export interface LocatedJson {
  readonly value: unknown
  readonly line: number
}

export interface JsonTextProblem {
  readonly line: number
  readonly column: number
  readonly code: 'json.invalid' | 'json.truncated' | 'json.too-deep'
  readonly message: string
}

export interface JsonTextReading {
  readonly values: readonly LocatedJson[]
  readonly problems: readonly JsonTextProblem[]
  /** Line of a list or object inside a value, counted from 1. */
  lineOf(value: unknown): number | undefined
}

const depthLimit = 40

/** Ends the reading of one value. Offsets count from its beginning. */
class Fault extends Error {
  constructor(
    readonly code: JsonTextProblem['code'],
    readonly at: number,
    message: string,
  ) {
    super(message)
  }
}

/** The value is complete, and another begins at this offset. */
class Another extends Error {
  constructor(readonly at: number) {
    super()
  }
}

/**
 * Reads one JSON value or several, one after the other (JSON Lines). Unlike `JSON.parse` it says where: every list
 * and object has its line, a mistake its line and column. After a mistake reading goes on with the next line that
 * begins an object at its left margin, so that one bad line does not spoil the others.
 */
export function readJsonText(given: string): JsonTextReading {
  const text = given.replace(/^\uFEFF/, '')
  const lines = new WeakMap<object, number>()
  const values: LocatedJson[] = []
  const problems: JsonTextProblem[] = []
  const place = new Place(text)
  let at = afterBlanks(text, 0)
  while (at < text.length) {
    const builder = new Builder(place.to(at).line, lines)
    try {
      readOne(text.slice(at), builder)
      values.push({ value: builder.value, line: place.line })
      break
    } catch (error) {
      if (error instanceof Another) {
        values.push({ value: builder.value, line: place.line })
        at += error.at
      } else if (error instanceof Fault) {
        const { line, column } = place.to(at + error.at)
        const message = `${error.message} (line ${line}, column ${column}).`
        problems.push({ line, column, code: error.code, message })
        const next = /\r?\n\s?\{/g
        next.lastIndex = at + error.at
        const found = next.exec(text)
        if (found === null) break
        at = found.index + found[0].length - 1
      } else throw error
    }
  }
  return {
    values,
    problems,
    lineOf: (value) => (typeof value === 'object' && value !== null ? lines.get(value) : undefined),
  }
}

/** A place in a text that only moves forwards. */
class Place {
  line = 1
  column = 1
  private at = 0

  constructor(private readonly text: string) {}

  to(at: number): this {
    for (; this.at < at; this.at++) {
      if (this.text[this.at] === '\n') {
        this.line++
        this.column = 1
      } else this.column++
    }
    return this
  }
}

type Container = unknown[] | Record<string, unknown>

/** Puts the value together as its parts are met. */
class Builder {
  value: unknown
  private readonly open: Container[] = []
  private name: string | undefined

  constructor(
    private readonly firstLine: number,
    private readonly lines: WeakMap<object, number>,
  ) {}

  begin(container: Container, at: number, line: number): void {
    if (this.open.length > depthLimit) {
      throw new Fault('json.too-deep', at, `The JSON is nested more than ${depthLimit} deep`)
    }
    this.lines.set(container, this.firstLine + line)
    this.add(container)
    this.open.push(container)
  }

  end(): void {
    this.open.pop()
  }

  property(name: string): void {
    this.name = name
  }

  add(value: unknown): void {
    const container = this.open.at(-1)
    if (container === undefined) this.value = value
    else if (Array.isArray(container)) container.push(value)
    else {
      // Defined, not assigned, so that even the name __proto__ is plain data.
      const data = { value, enumerable: true, configurable: true, writable: true }
      Object.defineProperty(container, this.name ?? '', data)
    }
  }
}

/** @throws Fault at the first mistake; Another when the text goes on behind the value */
function readOne(text: string, builder: Builder): void {
  visit(
    text,
    {
      onObjectBegin: (at, _length, line) => builder.begin({}, at, line),
      onObjectProperty: (name) => builder.property(name),
      onObjectEnd: () => builder.end(),
      onArrayBegin: (at, _length, line) => builder.begin([], at, line),
      onArrayEnd: () => builder.end(),
      onLiteralValue: (value) => builder.add(value),
      onError: (error, at, length) => {
        const reason = printParseErrorCode(error)
        if (reason === 'EndOfFileExpected') throw new Another(at)
        throw faultOf(text, reason, at, length)
      },
    },
    { disallowComments: true, allowTrailingComma: false },
  )
}

const expected: Partial<Record<string, string>> = {
  PropertyNameExpected: 'a name in double quotes',
  ColonExpected: '":"',
  CommaExpected: '"," or the end of the list or object',
  CloseBraceExpected: '"," or "}"',
  CloseBracketExpected: '"," or "]"',
  UnexpectedEndOfString: 'a text that is closed on its line',
  InvalidEscapeCharacter: 'a text with valid escapes',
  InvalidUnicode: 'a text with valid escapes',
  InvalidCharacter: 'a text without control characters',
}

function faultOf(text: string, reason: string, at: number, length: number): Fault {
  const right = expected[reason] ?? 'a value'
  const rest = text.slice(at)
  // What is cut off may look like a mistake of its own: half a word, or a text without its closing quote.
  const isCut =
    afterBlanks(text, at) >= text.length ||
    /^(-|t|tr|tru|f|fa|fal|fals|n|nu|nul)$/.test(rest) ||
    (reason === 'UnexpectedEndOfString' && at + length >= text.length)
  if (isCut) return new Fault('json.truncated', text.length, `The JSON ends where ${right} should stand`)
  const found = /^[\w.+-]+|^./s.exec(rest.slice(0, 24))?.[0] ?? ''
  const shown = found === '\n' || found === '\r' ? 'the end of the line' : `"${found}"`
  return new Fault('json.invalid', at, `Expected ${right}, found ${shown}`)
}

function afterBlanks(text: string, from: number): number {
  const blanks = /[ \t\r\n]*/y
  blanks.lastIndex = from
  return from + (blanks.exec(text)?.[0].length ?? 0)
}
