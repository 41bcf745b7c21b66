import type { TypedExpression } from './typed.ts'

/** Unit of a pure number, as the registry writes it. */
const pure = '1'

/**
 * The unit of an expression where it follows from those of the observables in it: sums and comparisons of one unit,
 * multiples, ratios, folds. Null where it does not, as for a product of two units, and for conditions.
 */
export function unitOf(expression: TypedExpression): string | null {
  if (expression.type === 'truth' || typeof expression.type === 'object') return null
  switch (expression.kind) {
    case 'constant':
      return pure
    case 'scalar':
      return expression.observable.unit
    case 'item':
      return expression.set.unit
    case 'field':
      return expression.field.unit
    case 'relation':
      return expression.relation.unit
    case 'let':
      return unitOf(expression.definition)
    case 'negation':
      return unitOf(expression.operand)
    case 'fallback':
      return common([expression.value, expression.otherwise])
    case 'fold':
      return expression.fold.body === 'truth' ? pure : unitOf(expression.body)
    case 'function':
      return unitOfFunction(expression.definition.name, expression.operands)
    case 'arithmetic':
      return unitOfArithmetic(expression)
    default:
      return null
  }
}

/** The one unit of all, numbers written out left aside: `volume + 1` is a volume. */
function common(parts: readonly TypedExpression[]): string | null {
  const units = new Set(parts.filter(({ kind }) => kind !== 'constant').map(unitOf))
  if (units.size === 0) return pure
  const [unit] = units
  return units.size === 1 ? unit : null
}

const keeping = new Set(['abs', 'min', 'max', 'floor', 'ceil', 'round', 'mod', 'gcd'])

/** Logarithms and the like are numbers whatever they are taken of. */
function unitOfFunction(name: string, operands: readonly TypedExpression[]): string | null {
  if (keeping.has(name)) return common(operands)
  return name === 'sqrt' && unitOf(operands[0]) !== pure ? null : pure
}

function unitOfArithmetic({
  operator,
  left,
  right,
}: Extract<TypedExpression, { kind: 'arithmetic' }>): string | null {
  if (operator === '+' || operator === '-') return common([left, right])
  const [a, b] = [unitOf(left), unitOf(right)]
  if (operator === '*') return a === pure ? b : b === pure ? a : null
  if (operator === '/') return b === pure ? a : a !== null && a === b ? pure : null
  return a === pure && b === pure ? pure : null
}
