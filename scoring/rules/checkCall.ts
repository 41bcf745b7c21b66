import { dependsOnBasis } from '../observables/metric.ts'
import { findObservable, recordSet } from '../observables/registry.ts'
import type { Relation } from '../observables/observable.ts'
import type { Binder, CallExpression } from './ast.ts'
import type { ExpressionChecker } from './checkExpression.ts'
import type { PathChecker } from './checkPath.ts'
import { type Fold, findFold } from './folds.ts'
import { findFunction } from './functions/registry.ts'
import type { RuleFunction } from './functions/ruleFunction.ts'
import { writing } from './issues.ts'
import { RULE_LIMITS } from './limits.ts'
import { nearestName } from './nearest.ts'
import { later, nodeOf, unknownNode } from './node.ts'
import { isNumeric, type Type, type TypedExpression, type TypedNode } from './typed.ts'

const plural = (count: number, word: string): string => `${count} ${word}${count === 1 ? '' : 's'}`

/** Checks functions, relations and folds. */
export class CallChecker {
  constructor(
    private readonly expressions: ExpressionChecker,
    private readonly paths: PathChecker,
  ) {}

  check(call: CallExpression): TypedExpression {
    const name = call.name.text
    const fold = findFold(name)
    const definition = findFunction(name)
    const observable = findObservable(name)
    if (call.binder && fold) return this.fold(call, call.binder, fold)
    if (call.binder && (definition || observable?.kind === 'relation')) {
      this.issue(call.binder, 'no-fold', `\`${name}\` takes values and does not run through a set`)
      return unknownNode(call)
    }
    if (definition) return this.function(call, definition)
    if (observable?.kind === 'relation') return this.relation(call, observable)
    if (fold) {
      const order = fold.ordered ? 'p, ' : ''
      const body = fold.body === 'truth' ? 'condition' : 'expression'
      this.issue(
        call,
        'fold-without-set',
        `\`${name}\` runs through a set: \`${name}(${order}x in divisors : ${body})\``,
      )
      return unknownNode(call)
    }
    this.unknownFunction(call)
    return unknownNode(call)
  }

  private issue(span: { from: number; to: number }, code: string, message: string): void {
    this.expressions.report({ code, message, from: span.from, to: span.to })
  }

  private function(call: CallExpression, definition: RuleFunction): TypedExpression {
    const { parameters, variadic } = definition
    const given = call.operands.length
    if (given < parameters.length || (given > parameters.length && !variadic)) {
      const form = `${definition.name}(${parameters.map((parameter) => parameter.name).join(', ')}${variadic ? ', …' : ''})`
      const fold = findFold(definition.name)
      const also = fold ? `; to run through a set write \`${fold.name}(x in set : expression)\`` : ''
      const wanted = `${variadic ? 'at least ' : ''}${plural(parameters.length, 'operand')}`
      this.issue(
        call,
        'operand-count',
        `\`${form}\` takes ${wanted}, but ${given} ${given === 1 ? 'is' : 'are'} given${also}`,
      )
      return unknownNode(call)
    }
    const operands = call.operands.map((operand, at) => {
      const parameter = parameters[Math.min(at, parameters.length - 1)]
      const article =
        parameter.type === 'integer' ? 'an integer' : parameter.type === 'truth' ? 'a condition' : 'a number'
      const demand = `\`${definition.name}\` takes ${article}`
      if (parameter.type === 'truth') return this.expressions.condition(operand, demand)
      return parameter.type === 'integer'
        ? this.expressions.integer(operand, demand)
        : this.expressions.numeric(operand, demand)
    })
    if (operands.some((operand) => operand.type === 'unknown')) return unknownNode(call)
    const common: Type = operands.every((operand) => operand.type === 'integer') ? 'integer' : 'number'
    const type = definition.result === 'common' ? common : definition.result
    return { ...nodeOf(call, type, operands), kind: 'function', definition, operands }
  }

  private relation(call: CallExpression, relation: Relation): TypedExpression {
    const { name, parameters } = relation
    if (call.operands.length !== parameters.length) {
      const form = `${name}(${parameters.map((parameter) => parameter.name).join(', ')})`
      this.issue(
        call,
        'operand-count',
        `\`${form}\` takes ${plural(parameters.length, 'operand')}, but ${call.operands.length} ${call.operands.length === 1 ? 'is' : 'are'} given`,
      )
      return unknownNode(call)
    }
    const operands = call.operands.map((operand, at) =>
      this.expressions.element(
        operand,
        recordSet(parameters[at].of),
        `\`${name}\` takes elements of ${parameters[at].of}`,
      ),
    )
    if (operands.some((operand) => operand.type === 'unknown')) return unknownNode(call)
    return { ...nodeOf(call, relation.type, operands, relation.stage), kind: 'relation', relation, operands }
  }

  private fold(call: CallExpression, binder: Binder, fold: Fold): TypedExpression {
    const { scope } = this.expressions
    const order = this.order(call, fold)
    if (order === 'wrong') return unknownNode(call)
    const taken = scope.taken(binder.variable.text)
    if (taken) this.issue(binder.variable, 'shadowing', `${taken}; give this variable another name`)
    if (scope.bound.length >= RULE_LIMITS.folds) {
      this.issue(
        call,
        'folds-too-deep',
        `folds stand inside each other at most ${RULE_LIMITS.folds} deep; this is one too many`,
      )
      return unknownNode(call)
    }
    const found = this.paths.source(binder.set)
    if (!found) return unknownNode(call)
    const { source, set } = found
    const slot = scope.newSlot()
    scope.bound.push({ name: binder.variable.text, slot, set })
    const condition =
      binder.condition && this.expressions.condition(binder.condition, '`where` takes a condition')
    const demand = `\`${fold.name}\` takes ${fold.body === 'truth' ? 'a condition' : 'a number'} for each element`
    const body =
      fold.body === 'truth'
        ? this.expressions.condition(binder.body, demand)
        : this.expressions.numeric(binder.body, demand)
    scope.bound.pop()
    const inner = condition ? [condition, body] : [body]
    if (inner.some((part) => part.type === 'unknown')) return unknownNode(call)
    const type: Type = fold.result === 'common' ? body.type : fold.result
    const target = source.kind === 'members' ? [source.target] : []
    const stage = source.kind === 'members' ? later(set.stage, source.field.stage) : set.stage
    const around = new Set(scope.bound.map((variable) => variable.slot))
    const node: TypedNode = {
      ...nodeOf(call, type, [...inner, ...target, ...(order ? [order] : [])], stage),
      open: [...inner, ...target, ...(order ? [order] : [])].some((part) => usesAny(part, around)),
    }
    const basis = node.basisDependent || dependsOnBasis(set.name)
    return { ...node, basisDependent: basis, kind: 'fold', fold, order, slot, source, condition, body }
  }

  private order(call: CallExpression, fold: Fold): TypedExpression | undefined | 'wrong' {
    const wanted = fold.ordered ? 1 : 0
    if (call.operands.length !== wanted) {
      const order = fold.ordered ? 'p, ' : ''
      const message = fold.ordered
        ? 'a quantile needs its order p between 0 and 1 first'
        : `\`${fold.name}\` takes nothing before its variable`
      this.issue(call, 'operand-count', `${message}: \`${fold.name}(${order}x in set : expression)\``)
      return 'wrong'
    }
    if (!fold.ordered) return undefined
    const order = this.expressions.numeric(call.operands[0], 'the order of a quantile is a number')
    if (order.kind === 'constant' && (order.value < 0 || order.value > 1)) {
      const percent = order.value > 1 && order.value <= 100 ? String(order.value / 100) : undefined
      this.expressions.report({
        code: 'quantile-order',
        message: 'the order of a quantile lies between 0 and 1',
        from: order.from,
        to: order.to,
        ...writing(order, percent),
      })
      return 'wrong'
    }
    return isNumeric(order.type) && order.type !== 'unknown' ? order : 'wrong'
  }

  private unknownFunction(call: CallExpression): void {
    const name = call.name.text
    const near = nearestName(name, this.expressions.scope.callNames())
    const observable = findObservable(name)
    const message = observable
      ? `\`${name}\` is ${observable.kind === 'scalar' ? 'an observable' : 'a set'} and takes no operands`
      : `there is no function \`${name.slice(0, 60)}\`${near ? `; did you mean \`${near}\`?` : ''}`
    this.expressions.report({
      code: observable ? 'not-a-function' : 'unknown-function',
      message,
      from: call.name.from,
      to: call.name.to,
      found: name,
      ...(observable?.kind === 'scalar' ? writing(call, name) : {}),
      ...(observable ? {} : writing(call.name, near)),
    })
  }
}

/** Does an expression use a variable of the given slots? */
function usesAny(expression: TypedExpression, slots: ReadonlySet<number>): boolean {
  if (!expression.open || slots.size === 0) return false
  switch (expression.kind) {
    case 'element':
    case 'item':
      return slots.has(expression.slot)
    case 'field':
      return usesAny(expression.target, slots)
    case 'negation':
    case 'not':
      return usesAny(expression.operand, slots)
    case 'arithmetic':
    case 'logic':
      return usesAny(expression.left, slots) || usesAny(expression.right, slots)
    case 'comparison':
    case 'function':
    case 'relation':
      return expression.operands.some((operand) => usesAny(operand, slots))
    case 'fallback':
      return usesAny(expression.value, slots) || usesAny(expression.otherwise, slots)
    case 'fold': {
      const { source, condition, body, order } = expression
      return (
        usesAny(body, slots) ||
        (condition !== undefined && usesAny(condition, slots)) ||
        (order !== undefined && usesAny(order, slots)) ||
        (source.kind === 'members' && usesAny(source.target, slots))
      )
    }
    default:
      return false
  }
}
