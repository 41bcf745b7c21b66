import type { CostClass, Described } from '../observables/observable.ts'
import { findField, recordSet } from '../observables/registry.ts'
import { findObservable } from '../observables/registry.ts'
import type { PlaceOnRay } from './checkedRule.ts'
import type { TypedExpression } from './typed.ts'

/** The observables and fields that expressions read, by their full names. */
export type Mentions = ReadonlyMap<string, Described>

/** Collects what `expressions` read, through `let`s too, and what the place on the ray needs. */
export function mentionsOf(expressions: readonly TypedExpression[], at: PlaceOnRay): Mentions {
  const mentions = new Map<string, Described>()
  const seen = new Set<TypedExpression>()
  expressions.forEach(visit)
  const scaled = [...mentions.values()].some((entry) => entry.scaling !== 0)
  if (scaled && at.kind === 'volume') mentions.set('volume', findObservable('volume') as Described)
  if (scaled && at.kind === 'smallest divisor')
    mentions.set('divisors.volume', findField(recordSet('divisors'), 'volume') as Described)
  return new Map([...mentions].sort(([a], [b]) => (a < b ? -1 : 1)))

  function visit(expression: TypedExpression): void {
    if (seen.has(expression)) return
    seen.add(expression)
    switch (expression.kind) {
      case 'scalar':
        mentions.set(expression.observable.name, expression.observable)
        return
      case 'let':
        return visit(expression.definition)
      case 'item':
        mentions.set(expression.set.name, expression.set)
        return
      case 'field':
        mentions.set(`${expression.set.name}.${expression.field.name}`, expression.field)
        return visit(expression.target)
      case 'negation':
      case 'not':
        return visit(expression.operand)
      case 'arithmetic':
      case 'logic':
        visit(expression.left)
        return visit(expression.right)
      case 'fallback':
        visit(expression.value)
        return visit(expression.otherwise)
      case 'relation':
        mentions.set(expression.relation.name, expression.relation)
        return expression.operands.forEach(visit)
      case 'comparison':
      case 'function':
        return expression.operands.forEach(visit)
      case 'fold': {
        const { source, order, condition, body } = expression
        mentions.set(source.set.name, source.set)
        if (source.kind === 'members') {
          mentions.set(`${source.set.name}.${source.field.name}`, source.field)
          visit(source.target)
        }
        if (order) visit(order)
        if (condition) visit(condition)
        return visit(body)
      }
    }
  }
}

const COSTS: readonly CostClass[] = ['free', 'cheap', 'moderate', 'dear']

/** The dearest of what is read. */
export const dearest = (mentions: Mentions): CostClass =>
  COSTS[Math.max(0, ...[...mentions.values()].map((entry) => COSTS.indexOf(entry.cost)))]
