import { findObservable } from '../observables/registry.ts'
import type { TypedExpression } from './typed.ts'

/**
 * The innermost part of an expression that depends on a choice of basis, without looking into `let`s, so that a
 * warning points at the place where such a value enters.
 */
export function findBasisDependence(expression: TypedExpression): TypedExpression | undefined {
  if (!expression.basisDependent) return undefined
  for (const part of partsOf(expression)) {
    const found = findBasisDependence(part)
    if (found) return found
  }
  return expression
}

/** The same quantity of the divisor spectrum, where there is one. */
export function withoutBasis(found: TypedExpression): string | undefined {
  if (found.kind !== 'scalar') return undefined
  const name = found.observable.name.replace('metric.basis.', 'metric.divisor.')
  return name !== found.observable.name && findObservable(name)?.kind === 'scalar' ? name : undefined
}

function partsOf(expression: TypedExpression): readonly TypedExpression[] {
  switch (expression.kind) {
    case 'negation':
    case 'not':
      return [expression.operand]
    case 'arithmetic':
    case 'logic':
      return [expression.left, expression.right]
    case 'fallback':
      return [expression.value, expression.otherwise]
    case 'comparison':
    case 'function':
    case 'relation':
      return expression.operands
    case 'field':
      return [expression.target]
    case 'fold':
      return [expression.order, expression.condition, expression.body].filter((part) => part !== undefined)
    default:
      return []
  }
}
