import type { Compiler, Evaluate } from './compile.ts'
import { type Frame, StepLimitReached } from './frame.ts'
import { RULE_LIMITS } from './limits.ts'
import { quantileOf } from './quantile.ts'
import type { TypedFold } from './typed.ts'

/** The compiled parts of a fold. `open` finds the elements and leaves them in the frame; false when that failed. */
export interface FoldParts {
  readonly slot: number
  readonly open: (frame: Frame) => boolean
  readonly condition: Evaluate | undefined
  readonly body: Evaluate
}

/** Compiles what a fold runs through, with its steps counted before the loop starts. */
export function compileSource(compiler: Compiler, expression: TypedFold): (frame: Frame) => boolean {
  const { source, condition, body } = expression
  const cost = 1 + body.weight + (condition?.weight ?? 0)
  const tooLong = compiler.reason(
    expression,
    `this \`${expression.fold.name}\` passes the limit of ${RULE_LIMITS.steps.toLocaleString('en')} steps of one evaluation; nest less, or narrow a set with \`where\``,
  )
  const count = (frame: Frame, start: number, end: number, items: ArrayLike<number> | null): boolean => {
    frame.steps += (end - start) * cost
    if (frame.steps > frame.stepLimit) throw new StepLimitReached(tooLong)
    frame.start = start
    frame.end = end
    frame.items = items
    return true
  }
  if (source.kind === 'members') {
    const resource = compiler.resource(source.field)
    const failed = compiler.failed(expression, source.field)
    const target = compiler.compile(source.target)
    return (frame) => {
      const element = target(frame)
      if (element !== element) return false
      const loaded = resource(frame)
      if (loaded.kind === 'members')
        return count(
          frame,
          loaded.lists.starts[element],
          loaded.lists.starts[element + 1],
          loaded.lists.items,
        )
      failed(frame, loaded)
      return false
    }
  }
  const resource = compiler.resource(source.set)
  const failed = compiler.failed(expression, source.set)
  const records = source.set.kind === 'records'
  const why = source.set.kind === 'records' && source.set.undefinedWhen
  const noSet = compiler.reason(expression, `${source.set.name} is undefined${why ? `: ${why}` : ''}`)
  return (frame) => {
    const loaded = resource(frame)
    if (loaded.kind === 'values') {
      const size = records ? loaded.values[0] : loaded.values.length
      if (size === size) return count(frame, 0, size, null)
      frame.undefinedBecause(noSet)
      return false
    }
    failed(frame, loaded)
    return false
  }
}

/** Compiles a quantifier or fold. */
export function compileFold(compiler: Compiler, expression: TypedFold): Evaluate {
  const parts = compiler.inside((): FoldParts => ({
    slot: expression.slot,
    open: compileSource(compiler, expression),
    condition: expression.condition && compiler.compile(expression.condition),
    body: compiler.compile(expression.body),
  }))
  const empty = compiler.reason(expression, `\`${expression.fold.name}\` of an empty set`)
  switch (expression.fold.name) {
    case 'count':
      return count(parts)
    case 'any':
      return quantifier(parts, 1)
    case 'all':
      return quantifier(parts, 0)
    case 'sum': {
      if (expression.type !== 'integer') {
        const tooLarge = compiler.reason(expression, 'this sum goes beyond the largest number')
        return collect(parts, (frame, values) => {
          let total = 0
          for (const value of values) total += value
          return Number.isFinite(total) ? total : frame.undefinedBecause(tooLarge)
        })
      }
      const tooLarge = compiler.reason(
        expression,
        'this sum of integers goes beyond 2^53 and would no longer be exact',
      )
      return collect(parts, (frame, values) => {
        const total = exactSum(values)
        return Number.isSafeInteger(total) ? total : frame.undefinedBecause(tooLarge)
      })
    }
    case 'min':
      return collect(parts, (frame, values) => {
        if (values.length === 0) return frame.undefinedBecause(empty)
        let least = values[0]
        for (const value of values) if (value < least) least = value
        return least
      })
    case 'max':
      return collect(parts, (frame, values) => {
        if (values.length === 0) return frame.undefinedBecause(empty)
        let greatest = values[0]
        for (const value of values) if (value > greatest) greatest = value
        return greatest
      })
    case 'mean': {
      const integers = expression.body.type === 'integer'
      return collect(parts, (frame, values) => {
        if (values.length === 0) return frame.undefinedBecause(empty)
        if (integers) return exactSum(values) / values.length
        let mean = 0
        for (let at = 0; at < values.length; at++) mean += (values[at] - mean) / (at + 1)
        return mean
      })
    }
    case 'quantile': {
      const order = compiler.compile(expression.order ?? expression.body)
      const outside = compiler.reason(expression, 'the order of a quantile lies between 0 and 1')
      return collect(parts, (frame, values) => {
        if (values.length === 0) return frame.undefinedBecause(empty)
        const p = order(frame)
        if (p !== p) return p
        return p >= 0 && p <= 1 ? quantileOf(values, p) : frame.undefinedBecause(outside)
      })
    }
  }
}

/** Sum of safe integers, exact whatever the order; not a safe integer when it passes the limit. */
function exactSum(values: readonly number[]): number {
  let total = 0
  for (let at = 0; at < values.length; at++) {
    const next = total + values[at]
    if (!Number.isSafeInteger(next)) {
      let rest = BigInt(total)
      for (; at < values.length; at++) rest += BigInt(values[at])
      return Number(rest)
    }
    total = next
  }
  return total
}

/** Elements for which condition and body both hold. */
function count({ slot, open, condition, body }: FoldParts): Evaluate {
  return (frame) => {
    if (!open(frame)) return NaN
    const { start, end, items, slots } = frame
    let found = 0
    for (let at = start; at < end; at++) {
      slots[slot] = items === null ? at : items[at]
      const kept = condition === undefined ? 1 : condition(frame)
      if (kept === 0) continue
      const why = frame.reason
      const holds = body(frame)
      if (holds === 0) continue
      if (kept !== kept) frame.reason = why
      if (kept !== kept || holds !== holds) return NaN
      found++
    }
    return found
  }
}

/**
 * `any` (decisive value 1) and `all` (decisive value 0). `where W` turns `any` into any(W and E), `all` into
 * all(not W or E). One decisive element settles it, even when others are undefined.
 */
function quantifier({ slot, open, condition, body }: FoldParts, decisive: 0 | 1): Evaluate {
  return (frame) => {
    if (!open(frame)) return NaN
    const { start, end, items, slots } = frame
    let result: number = 1 - decisive
    let why = frame.reason
    for (let at = start; at < end; at++) {
      slots[slot] = items === null ? at : items[at]
      const kept = condition === undefined ? 1 : condition(frame)
      if (kept === 0) continue
      if (kept !== kept && result === result) why = frame.reason
      const holds = body(frame)
      if (holds === 1 - decisive) continue
      if (kept === 1 && holds === decisive) return decisive
      if (kept === kept && result === result) why = frame.reason
      result = NaN
    }
    if (result !== result) frame.reason = why
    return result
  }
}

/** Folds over the values of all kept elements; undefined as soon as one is. */
function collect(
  { slot, open, condition, body }: FoldParts,
  finish: (frame: Frame, values: readonly number[]) => number,
): Evaluate {
  return (frame) => {
    if (!open(frame)) return NaN
    const { start, end, items, slots } = frame
    const values: number[] = []
    for (let at = start; at < end; at++) {
      slots[slot] = items === null ? at : items[at]
      if (condition !== undefined) {
        const kept = condition(frame)
        if (kept === 0) continue
        if (kept !== kept) return kept
      }
      const value = body(frame)
      if (value !== value) return value
      values.push(value)
    }
    return finish(frame, values)
  }
}
