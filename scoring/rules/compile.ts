import type { Span } from './ast.ts'
import { compileArithmetic, negate } from './compileArithmetic.ts'
import { compileComparison } from './compileComparison.ts'
import { compileFold } from './compileFold.ts'
import type { Frame, Reason, ReasonMaker, Resource } from './frame.ts'
import { load, type Loadable } from './resources.ts'
import type { TypedExpression, TypedFold } from './typed.ts'

/** A compiled expression: its value in a frame. See `Frame` for how values are held. */
export type Evaluate = (frame: Frame) => number

/** Compiles a fold in another way than `compileFold`; undefined: not this one. */
export type FoldCompiler = (compiler: Compiler, expression: TypedFold) => Evaluate | undefined

/** Compiles the expressions of one rule into closures. */
export class Compiler {
  private readonly entries: Loadable[] = []
  private readonly indices = new Map<Loadable, number>()
  private memoCount: number
  private depth = 0

  constructor(
    private readonly reasons: ReasonMaker,
    private readonly lets: readonly TypedExpression[],
    private readonly otherFold: FoldCompiler = () => undefined,
  ) {
    this.memoCount = lets.length
    this.letBodies = new Array<Evaluate | undefined>(lets.length).fill(undefined)
  }

  private readonly letBodies: (Evaluate | undefined)[]
  private readonly letVariants = new Map<string, Evaluate>()

  get memos(): number {
    return this.memoCount
  }

  /** What expressions load from a candidate, by their index in the frame's resources. */
  get loadables(): readonly Loadable[] {
    return this.entries
  }

  reason(span: Span, text: string): Reason {
    return this.reasons.at(span, text)
  }

  /** Index of an entry in the frame's resources, and how to get it there. */
  resource(entry: Loadable): (frame: Frame) => Resource {
    let index = this.indices.get(entry)
    if (index === undefined) {
      index = this.entries.length
      this.entries.push(entry)
      this.indices.set(entry, index)
    }
    const at = index
    return (frame) => frame.resources[at] ?? load(entry, frame, at)
  }

  /** Marks what a failed resource makes undefined. */
  failed(span: Span, entry: Loadable): (frame: Frame, resource: Resource) => number {
    return (frame, resource) =>
      frame.undefinedBecause(
        this.reason(
          span,
          `the ${entry.stage} stage failed: ${resource.kind === 'failed' ? resource.message : 'no value'}`,
        ),
      )
  }

  /** Compiles a fold's parts one level deeper. */
  inside<T>(compileParts: () => T): T {
    this.depth++
    const result = compileParts()
    this.depth--
    return result
  }

  compile(expression: TypedExpression): Evaluate {
    switch (expression.kind) {
      case 'constant': {
        const { value } = expression
        return () => value
      }
      case 'scalar':
        return this.scalar(expression)
      case 'let':
        return this.memo(expression.index, this.letBody(expression.index))
      case 'element': {
        const { slot } = expression
        return (frame) => frame.slots[slot]
      }
      case 'item':
        return this.item(expression)
      case 'field':
        return this.field(expression)
      case 'negation':
        return negate(this.compile(expression.operand))
      case 'not': {
        const operand = this.compile(expression.operand)
        return (frame) => 1 - operand(frame)
      }
      case 'arithmetic':
        return compileArithmetic(this, expression)
      case 'comparison':
        return compileComparison(this, expression)
      case 'logic':
        return this.logic(expression)
      case 'fallback': {
        const value = this.compile(expression.value)
        const otherwise = this.compile(expression.otherwise)
        return (frame) => {
          const result = value(frame)
          return result === result ? result : otherwise(frame)
        }
      }
      case 'function':
        return this.function(expression)
      case 'relation':
        return this.relation(expression)
      case 'fold': {
        const evaluate = this.otherFold(this, expression) ?? compileFold(this, expression)
        return this.depth > 0 && !expression.open ? this.memo(this.memoCount++, () => evaluate) : evaluate
      }
      case 'unknown':
        throw new Error('a rule with errors is not compiled')
    }
  }

  /** A value of a `let` other than its own, compiled and computed once for each `variant`. */
  forLet(index: number, variant: string, compileVariant: () => Evaluate): Evaluate {
    const key = `${variant} ${index}`
    let evaluate = this.letVariants.get(key)
    if (!evaluate) {
      evaluate = this.memo(this.memoCount++, compileVariant)
      this.letVariants.set(key, evaluate)
    }
    return evaluate
  }

  private letBody(index: number): () => Evaluate {
    return () => (this.letBodies[index] ??= this.compile(this.lets[index]))
  }

  /** A value computed once per evaluation and kept, its reason too when it is undefined. */
  private memo(index: number, body: () => Evaluate): Evaluate {
    const evaluate = body()
    return (frame) => {
      if (frame.memoKnown[index] === 1) {
        const kept = frame.memos[index]
        if (kept !== kept) frame.reason = frame.memoReasons[index]
        return kept
      }
      const value = evaluate(frame)
      frame.memos[index] = value
      frame.memoKnown[index] = 1
      if (value !== value) frame.memoReasons[index] = frame.reason
      return value
    }
  }

  private scalar(expression: Extract<TypedExpression, { kind: 'scalar' }>): Evaluate {
    const { observable } = expression
    const resource = this.resource(observable)
    const failed = this.failed(expression, observable)
    const reason = this.reason(
      expression,
      `${observable.name} is undefined${observable.undefinedWhen ? `: ${observable.undefinedWhen}` : ''}`,
    )
    return (frame) => {
      const loaded = resource(frame)
      if (loaded.kind !== 'values') return failed(frame, loaded)
      const value = loaded.values[0]
      return Number.isFinite(value) ? value : frame.undefinedBecause(reason)
    }
  }

  private item(expression: Extract<TypedExpression, { kind: 'item' }>): Evaluate {
    const { set, slot } = expression
    const resource = this.resource(set)
    const failed = this.failed(expression, set)
    const reason = this.reason(expression, `a value of ${set.name} is undefined`)
    return (frame) => {
      const loaded = resource(frame)
      if (loaded.kind !== 'values') return failed(frame, loaded)
      const value = loaded.values[frame.slots[slot]]
      return Number.isFinite(value) ? value : frame.undefinedBecause(reason)
    }
  }

  private field(expression: Extract<TypedExpression, { kind: 'field' }>): Evaluate {
    const { field, set } = expression
    const target = this.compile(expression.target)
    const resource = this.resource(field)
    const failed = this.failed(expression, field)
    const why = field.kind === 'value' && field.undefinedWhen ? `: ${field.undefinedWhen}` : ''
    const reason = this.reason(expression, `${field.name} of an element of ${set.name} is undefined${why}`)
    return (frame) => {
      const element = target(frame)
      if (element !== element) return element
      const loaded = resource(frame)
      if (loaded.kind !== 'values') return failed(frame, loaded)
      const value = loaded.values[element]
      return Number.isFinite(value) ? value : frame.undefinedBecause(reason)
    }
  }

  /** Three-valued: a false side decides `and`, a true side `or`, whatever the other is and wherever it stands. */
  private logic(expression: Extract<TypedExpression, { kind: 'logic' }>): Evaluate {
    const left = this.compile(expression.left)
    const right = this.compile(expression.right)
    const decisive = expression.operator === 'and' ? 0 : 1
    return (frame) => {
      const a = left(frame)
      if (a === decisive) return a
      const why = frame.reason
      const b = right(frame)
      if (a === a || b === decisive) return b
      frame.reason = why
      return a
    }
  }

  private function(expression: Extract<TypedExpression, { kind: 'function' }>): Evaluate {
    const { definition } = expression
    const { apply } = definition
    const reason = this.reason(
      expression,
      `${definition.name} ${definition.undefinedWhen ?? 'goes beyond the largest number'}`,
    )
    const operands = expression.operands.map((operand) => this.compile(operand))
    if (operands.length === 1) {
      const [only] = operands
      return (frame) => {
        const x = only(frame)
        if (x !== x) return x
        const result = apply(x)
        return Number.isFinite(result) ? result : frame.undefinedBecause(reason)
      }
    }
    return (frame) => {
      const values: number[] = []
      for (const operand of operands) {
        const value = operand(frame)
        if (value !== value) return value
        values.push(value)
      }
      const result = apply(...values)
      return Number.isFinite(result) ? result : frame.undefinedBecause(reason)
    }
  }

  private relation(expression: Extract<TypedExpression, { kind: 'relation' }>): Evaluate {
    const { relation } = expression
    const resource = this.resource(relation)
    const failed = this.failed(expression, relation)
    const operands = expression.operands.map((operand) => this.compile(operand))
    return (frame) => {
      const loaded = resource(frame)
      if (loaded.kind !== 'lookup') return failed(frame, loaded)
      const elements: number[] = []
      for (const operand of operands) {
        const element = operand(frame)
        if (element !== element) return element
        elements.push(element)
      }
      return loaded.lookup(...elements)
    }
  }
}
