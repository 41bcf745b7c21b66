import type { ComparisonOperator } from './ast.ts'
import type { Compiler, Evaluate } from './compile.ts'
import { compileSource } from './compileFold.ts'
import { HOLDS } from './compileComparison.ts'
import { isNumeric, type TypedComparison, type TypedExpression, type TypedFold } from './typed.ts'

const OPPOSITE: Record<ComparisonOperator, ComparisonOperator> = {
  '<': '>=',
  '<=': '>',
  '>': '<=',
  '>=': '<',
  '==': '!=',
  '!=': '==',
}

/** A comparison that just fails still falls short by this much. */
const LEAST = 1e-9

/** |a - b| / max(1, |a|, |b|), at least 1e-9. */
const gap = (a: number, b: number): number =>
  Math.max(LEAST, Math.abs(a - b) / Math.max(1, Math.abs(a), Math.abs(b)))

/**
 * How far a condition is from holding: 0 when it holds. `wanted` false asks for its negation, so that `not` is
 * pushed inward. A false a >= b falls short by max(1e-9, (b - a) / max(1, |a|, |b|)), other comparisons
 * likewise; a bare truth value, `!=` and anything undefined by 1. `and` adds, `or` takes the least, `all` the
 * mean over the elements, `any` the least; `where W` counts as `W and` under `any`, `not W or` under `all`.
 */
export function compileShortfall(compiler: Compiler, expression: TypedExpression, wanted = true): Evaluate {
  switch (expression.kind) {
    case 'not':
      return compileShortfall(compiler, expression.operand, !wanted)
    case 'let':
      return compiler.forLet(expression.index, wanted ? 'shortfall' : 'shortfall of not', () =>
        compileShortfall(compiler, expression.definition, wanted),
      )
    case 'logic': {
      const left = compileShortfall(compiler, expression.left, wanted)
      const right = compileShortfall(compiler, expression.right, wanted)
      return (expression.operator === 'and') === wanted
        ? (frame) => left(frame) + right(frame)
        : (frame) => Math.min(left(frame), right(frame))
    }
    case 'comparison':
      return comparisonShortfall(compiler, expression, wanted)
    case 'fold':
      if (expression.fold.name === 'any' || expression.fold.name === 'all')
        return quantifierShortfall(compiler, expression, wanted)
  }
  const truth = compiler.compile(expression)
  const holds = wanted ? 1 : 0
  return (frame) => (truth(frame) === holds ? 0 : 1)
}

function comparisonShortfall(compiler: Compiler, expression: TypedComparison, wanted: boolean): Evaluate {
  const operands = expression.operands.map((operand) => compiler.compile(operand))
  const links = expression.operators.map((written) => {
    const operator = wanted ? written : OPPOSITE[written]
    const holds = HOLDS[operator]
    const measured = operator !== '!=' && isNumeric(expression.operands[0].type)
    return (a: number, b: number): number =>
      a !== a || b !== b ? 1 : holds(a, b) ? 0 : measured ? gap(a, b) : 1
  })
  return (frame) => {
    let result = wanted ? 0 : Infinity
    let before = operands[0](frame)
    for (let at = 0; at < links.length; at++) {
      const next = operands[at + 1](frame)
      const short = links[at](before, next)
      result = wanted ? result + short : Math.min(result, short)
      before = next
    }
    return result
  }
}

function quantifierShortfall(compiler: Compiler, expression: TypedFold, wanted: boolean): Evaluate {
  const someElement = (expression.fold.name === 'any') === wanted
  const { slot } = expression
  const { open, kept, body } = compiler.inside(() => ({
    open: compileSource(compiler, expression),
    kept: expression.condition && compileShortfall(compiler, expression.condition, someElement),
    body: compileShortfall(compiler, expression.body, wanted),
  }))
  return (frame) => {
    if (!open(frame)) return 1
    const { start, end, items, slots } = frame
    let least = Infinity
    let total = 0
    for (let at = start; at < end; at++) {
      slots[slot] = items === null ? at : items[at]
      const inside = body(frame)
      if (someElement) least = Math.min(least, inside + (kept ? kept(frame) : 0))
      else total += kept ? Math.min(kept(frame), inside) : inside
    }
    if (someElement) return end > start ? least : 1
    return end > start ? total / (end - start) : 0
  }
}
