import type { Compiler, Evaluate } from './compile.ts'
import type { Reason } from './frame.ts'
import type { TypedExpression } from './typed.ts'

type Arithmetic = Extract<TypedExpression, { kind: 'arithmetic' }>

/** -x, without a negative zero. */
export const negate =
  (operand: Evaluate): Evaluate =>
  (frame) =>
    0 - operand(frame)

/** Integer power by repeated squaring, exact as long as it is safe; NaN beyond. */
function integerPower(base: number, exponent: number): number {
  if (Math.abs(base) <= 1) return exponent === 0 ? 1 : base === -1 && exponent % 2 === 0 ? 1 : base
  let result = 1
  for (let count = 0; count < exponent; count++) {
    result *= base
    if (!Number.isSafeInteger(result)) return NaN
  }
  return result
}

const TOO_LARGE_INTEGER =
  'this integer goes beyond 2^53 and would no longer be exact; a factor 1.0 makes it a rounded number'
const TOO_LARGE = 'this number goes beyond the largest one'

/** Finishes an operation whose operands are defined. */
function withLimit(
  left: Evaluate,
  right: Evaluate,
  exact: boolean,
  reason: Reason,
  apply: (a: number, b: number) => number,
): Evaluate {
  return (frame) => {
    const a = left(frame)
    if (a !== a) return a
    const b = right(frame)
    if (b !== b) return b
    const result = apply(a, b)
    return (exact ? Number.isSafeInteger(result) : Number.isFinite(result))
      ? result
      : frame.undefinedBecause(reason)
  }
}

/** +, -, *, / and ^. Integers stay exact or become undefined; numbers stay finite or become undefined. */
export function compileArithmetic(compiler: Compiler, expression: Arithmetic): Evaluate {
  const left = compiler.compile(expression.left)
  const right = compiler.compile(expression.right)
  const exact = expression.type === 'integer'
  const reason = compiler.reason(expression, exact ? TOO_LARGE_INTEGER : TOO_LARGE)
  switch (expression.operator) {
    case '+':
      return withLimit(left, right, exact, reason, (a, b) => a + b)
    case '-':
      return withLimit(left, right, exact, reason, (a, b) => a - b)
    case '*':
      return withLimit(left, right, exact, reason, (a, b) => a * b)
    case '/': {
      const byZero = compiler.reason(expression, 'division by zero')
      return (frame) => {
        const a = left(frame)
        if (a !== a) return a
        const b = right(frame)
        if (b !== b) return b
        if (b === 0) return frame.undefinedBecause(byZero)
        const result = a / b
        return Number.isFinite(result) ? result : frame.undefinedBecause(reason)
      }
    }
    case '^': {
      if (exact) return withLimit(left, right, true, reason, integerPower)
      const noPower = compiler.reason(expression, 'this power is not a finite number')
      return withLimit(left, right, false, noPower, (a, b) => a ** b)
    }
  }
}
