/** A JSON value with the line on which each of its lists and objects begins. */
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

class Fault extends Error {
  constructor(
    readonly code: JsonTextProblem['code'],
    readonly at: number,
    message: string,
  ) {
    super(message)
  }
}

/**
 * Reads one JSON value or several, one after the other (JSON Lines). Unlike `JSON.parse` it says where: every list
 * and object has its line, a mistake its line and column. After a mistake reading goes on with the next line that
 * begins an object at its left margin, so that one bad line does not spoil the others.
 */
export function readJsonText(text: string): JsonTextReading {
  return new JsonReader(text.replace(/^\uFEFF/, '')).read()
}

class JsonReader {
  private at = 0
  private line = 1
  private lineStart = 0
  private readonly lines = new WeakMap<object, number>()

  constructor(private readonly text: string) {}

  read(): JsonTextReading {
    const values: LocatedJson[] = []
    const problems: JsonTextProblem[] = []
    for (;;) {
      this.blanks()
      if (this.at >= this.text.length) break
      const line = this.line
      const start = this.at
      try {
        values.push({ value: this.value(0), line })
      } catch (error) {
        if (!(error instanceof Fault)) throw error
        this.moveTo(error.at)
        const column = error.at - this.lineStart + 1
        const message = `${error.message} (line ${this.line}, column ${column}).`
        problems.push({ line: this.line, column, code: error.code, message })
        const next = /\r?\n\s?\{/g
        next.lastIndex = Math.max(error.at, start)
        const found = next.exec(this.text)
        if (found === null) break
        this.moveTo(found.index + found[0].length - 1)
      }
    }
    return {
      values,
      problems,
      lineOf: (value) => (typeof value === 'object' && value !== null ? this.lines.get(value) : undefined),
    }
  }

  private moveTo(at: number): void {
    while (this.at < at) this.step()
  }

  private step(): void {
    if (this.text[this.at] === '\n') {
      this.line++
      this.lineStart = this.at + 1
    }
    this.at++
  }

  private blanks(): void {
    while (this.at < this.text.length && ' \t\r\n'.includes(this.text[this.at])) this.step()
  }

  private value(depth: number): unknown {
    if (depth > depthLimit) {
      throw new Fault('json.too-deep', this.at, `The JSON is nested more than ${depthLimit} deep`)
    }
    this.blanks()
    const first = this.text[this.at]
    if (first === undefined) throw this.truncated('a value')
    if (first === '{') return this.object(depth)
    if (first === '[') return this.list(depth)
    if (first === '"') return this.string()
    return this.scalar()
  }

  private object(depth: number): unknown {
    const entries: [string, unknown][] = []
    const line = this.line
    this.at++
    this.blanks()
    if (this.text[this.at] !== '}') {
      for (;;) {
        this.blanks()
        if (this.text[this.at] !== '"') throw this.unexpected('a name in double quotes')
        const name = this.string()
        this.blanks()
        if (this.text[this.at] !== ':') throw this.unexpected('":"')
        this.at++
        entries.push([name, this.value(depth + 1)])
        if (!this.another('}')) break
      }
    }
    this.at++
    // fromEntries defines properties, so that even the name __proto__ is plain data.
    const object = Object.fromEntries(entries)
    this.lines.set(object, line)
    return object
  }

  private list(depth: number): unknown {
    const list: unknown[] = []
    this.lines.set(list, this.line)
    this.at++
    this.blanks()
    if (this.text[this.at] !== ']') {
      for (;;) {
        list.push(this.value(depth + 1))
        if (!this.another(']')) break
      }
    }
    this.at++
    return list
  }

  /** True after a comma; false at the closing sign, which stays. */
  private another(closing: string): boolean {
    this.blanks()
    const sign = this.text[this.at]
    if (sign === closing) return false
    if (sign !== ',') throw this.unexpected(`"," or "${closing}"`)
    this.at++
    return true
  }

  private string(): string {
    const pattern = /"[^"\\\n\r]*(?:\\.[^"\\\n\r]*)*"/y
    pattern.lastIndex = this.at
    const found = pattern.exec(this.text)
    if (found === null) {
      if (!this.text.slice(this.at + 1).match(/["\n]/)) throw this.truncated('the end of a text')
      throw this.unexpected('a text that is closed on its line')
    }
    try {
      const value = JSON.parse(found[0]) as string
      this.at += found[0].length
      return value
    } catch {
      throw this.unexpected('a text with valid escapes')
    }
  }

  private scalar(): unknown {
    const pattern = /true|false|null|-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y
    pattern.lastIndex = this.at
    const found = pattern.exec(this.text)
    if (found === null || /[\w.+-]/.test(this.text[this.at + found[0].length] ?? '')) {
      const rest = this.text.slice(this.at)
      if (/^(-|t|tr|tru|f|fa|fal|fals|n|nu|nul)$/.test(rest)) throw this.truncated('a value')
      throw this.unexpected('a value')
    }
    this.at += found[0].length
    return JSON.parse(found[0])
  }

  private truncated(expected: string): Fault {
    return new Fault('json.truncated', this.text.length, `The JSON ends where ${expected} should stand`)
  }

  private unexpected(expected: string): Fault {
    if (this.at >= this.text.length) return this.truncated(expected)
    const found = /^[\w.+-]+|^./s.exec(this.text.slice(this.at, this.at + 24))?.[0] ?? ''
    const shown = found === '\n' || found === '\r' ? 'the end of the line' : `"${found}"`
    return new Fault('json.invalid', this.at, `Expected ${expected}, found ${shown}`)
  }
}
