import type { ComparisonOperator } from './ast.ts'
import type { Compiler, Evaluate } from './compile.ts'
import type { TypedComparison } from './typed.ts'

/** The truth of one comparison of defined values. */
export const HOLDS: Record<ComparisonOperator, (a: number, b: number) => boolean> = {
  '<': (a, b) => a < b,
  '<=': (a, b) => a <= b,
  '>': (a, b) => a > b,
  '>=': (a, b) => a >= b,
  '==': (a, b) => a === b,
  '!=': (a, b) => a !== b,
}

function single(left: Evaluate, right: Evaluate, operator: ComparisonOperator): Evaluate {
  const holds = HOLDS[operator]
  return (frame) => {
    const a = left(frame)
    if (a !== a) return a
    const b = right(frame)
    if (b !== b) return b
    return holds(a, b) ? 1 : 0
  }
}

/** A comparison, or a chain of them: the conjunction of its links, each operand computed once. */
export function compileComparison(compiler: Compiler, expression: TypedComparison): Evaluate {
  const operands = expression.operands.map((operand) => compiler.compile(operand))
  const { operators } = expression
  if (operands.length === 2) return single(operands[0], operands[1], operators[0])
  return (frame) => {
    let result = 1
    let why = frame.reason
    let before = operands[0](frame)
    if (before !== before) why = frame.reason
    for (let at = 0; at < operators.length; at++) {
      const next = operands[at + 1](frame)
      if (next !== next && result === result) why = frame.reason
      if (before !== before || next !== next) result = NaN
      else if (!HOLDS[operators[at]](before, next)) return 0
      before = next
    }
    if (result !== result) frame.reason = why
    return result
  }
}
