import type { NumberSet, RecordSet } from '../observables/observable.ts'
import { findObservable } from '../observables/registry.ts'
import type { CallExpression, ComparisonExpression, Expression, Span } from './ast.ts'
import { CallChecker } from './checkCall.ts'
import { PathChecker } from './checkPath.ts'
import { formatExpression } from './format.ts'
import { nodeOf, unknownNode } from './node.ts'
import { type IssueDraft, writing } from './issues.ts'
import type { Scope } from './scope.ts'
import { isNumeric, type Type, type TypedExpression, typeName } from './typed.ts'

const short = (expression: Expression): string => {
  const text = formatExpression(expression)
  return text.length > 40 ? `${text.slice(0, 40)}…` : text
}

/** Works out the types of expressions and resolves their names, reporting every issue it meets. */
export class ExpressionChecker {
  private readonly paths: PathChecker
  private readonly calls: CallChecker

  constructor(
    readonly scope: Scope,
    readonly report: (draft: IssueDraft) => void,
  ) {
    this.paths = new PathChecker(scope, report)
    this.calls = new CallChecker(this, this.paths)
  }

  /** The typed form of an expression. Its type is 'unknown' where an issue was reported. */
  check(expression: Expression): TypedExpression {
    switch (expression.kind) {
      case 'number':
        return this.number(expression)
      case 'truth':
        return { ...nodeOf(expression, 'truth', []), kind: 'constant', value: expression.value ? 1 : 0 }
      case 'path':
        return this.paths.value(expression)
      case 'negation': {
        const operand = this.numeric(expression.operand, '`-` takes a number')
        return { ...nodeOf(expression, operand.type, [operand]), kind: 'negation', operand }
      }
      case 'not': {
        const operand = this.condition(expression.operand, '`not` takes a condition')
        return { ...nodeOf(expression, 'truth', [operand]), kind: 'not', operand }
      }
      case 'arithmetic':
        return this.arithmetic(expression)
      case 'comparison':
        return this.comparison(expression)
      case 'logic': {
        const joins = `\`${expression.operator}\` joins conditions`
        const left = this.condition(expression.left, joins)
        const right = this.condition(expression.right, joins)
        return {
          ...nodeOf(expression, 'truth', [left, right]),
          kind: 'logic',
          operator: expression.operator,
          left,
          right,
        }
      }
      case 'fallback':
        return this.fallback(expression)
      case 'call':
        return this.call(expression)
    }
  }

  /** An expression that must be a number or an integer; `demand` opens the message when it is not. */
  numeric(expression: Expression, demand: string): TypedExpression {
    const typed = this.check(expression)
    if (isNumeric(typed.type)) return typed
    const hint =
      typed.type === 'truth' ? `; \`indicator(${short(expression)})\` is 1 or 0` : fieldsHint(typed.type)
    const field = typeof typed.type === 'object' ? fieldOf(typed.type.of.name) : undefined
    const insert =
      typed.type === 'truth'
        ? `indicator(${formatExpression(expression)})`
        : expression.kind === 'path' && field !== undefined
          ? `${formatExpression(expression)}.${field}`
          : undefined
    this.wrongType(expression, typed.type, 'a number', demand, hint, insert)
    return unknownNode(expression)
  }

  /** An expression that must be a truth value. */
  condition(expression: Expression, demand: string): TypedExpression {
    const typed = this.check(expression)
    if (typed.type === 'truth' || typed.type === 'unknown') return typed
    const hint = isNumeric(typed.type)
      ? `; compare it, as in \`${short(expression)} > 0\``
      : fieldsHint(typed.type)
    const operand = formatExpression(expression)
    const insert = expression.kind === 'fallback' ? `(${operand}) > 0` : `${operand} > 0`
    this.wrongType(
      expression,
      typed.type,
      'a truth value',
      demand,
      hint,
      isNumeric(typed.type) ? insert : undefined,
    )
    return unknownNode(expression)
  }

  /** An expression that must be an element of a set. */
  element(expression: Expression, set: RecordSet, demand: string): TypedExpression {
    const typed = this.check(expression)
    if (typed.type === 'unknown' || (typeof typed.type === 'object' && typed.type.of === set)) return typed
    this.wrongType(expression, typed.type, `an element of ${set.name}`, demand, '')
    return unknownNode(expression)
  }

  /** An expression that must be an integer. */
  integer(expression: Expression, demand: string): TypedExpression {
    const typed = this.numeric(expression, demand)
    if (typed.type !== 'number') return typed
    this.wrongType(
      expression,
      typed.type,
      'an integer',
      demand,
      '; `floor`, `ceil` and `round` make integers',
      `round(${formatExpression(expression)})`,
    )
    return unknownNode(expression)
  }

  private wrongType(
    span: Span,
    found: Type,
    expected: string,
    demand: string,
    hint: string,
    insert?: string,
  ): void {
    this.report({
      code: 'type',
      message: `${demand}, but this is ${typeName(found)}${hint}`,
      from: span.from,
      to: span.to,
      expected,
      found: typeName(found),
      ...writing(span, insert),
    })
  }

  private number(expression: Extract<Expression, { kind: 'number' }>): TypedExpression {
    const { value, integer, from, to } = expression
    if (integer && value > Number.MAX_SAFE_INTEGER)
      this.report({
        code: 'integer-too-large',
        message:
          'integers are exact up to 9007199254740991 (2^53 - 1); write a point, as in `1e16`, for a rounded number',
        from,
        to,
        ...writing({ from, to }, `${value.toExponential()}`),
      })
    else if (!Number.isFinite(value))
      this.report({ code: 'number-too-large', message: 'numbers go up to about 1.8e308', from, to })
    else return { ...nodeOf(expression, integer ? 'integer' : 'number', []), kind: 'constant', value }
    return unknownNode(expression)
  }

  private arithmetic(expression: Extract<Expression, { kind: 'arithmetic' }>): TypedExpression {
    const { operator } = expression
    const demand = `\`${operator}\` takes numbers`
    const left = this.numeric(expression.left, demand)
    const right = this.numeric(expression.right, demand)
    const integers = left.type === 'integer' && right.type === 'integer'
    const wholeExponent = right.kind === 'constant' && right.type === 'integer'
    const exact = integers && (operator === '^' ? wholeExponent : operator !== '/')
    const unknown = left.type === 'unknown' || right.type === 'unknown'
    const type: Type = unknown ? 'unknown' : exact ? 'integer' : 'number'
    return { ...nodeOf(expression, type, [left, right]), kind: 'arithmetic', operator, left, right }
  }

  private fallback(expression: Extract<Expression, { kind: 'fallback' }>): TypedExpression {
    const value = this.check(expression.value)
    const otherwise = this.check(expression.otherwise)
    const parts = [value, otherwise]
    const node = (type: Type): TypedExpression => ({
      ...nodeOf(expression, type, parts),
      kind: 'fallback',
      value,
      otherwise,
    })
    if (value.type === 'unknown' || otherwise.type === 'unknown') return node('unknown')
    if (isNumeric(value.type) && isNumeric(otherwise.type))
      return node(value.type === 'integer' && otherwise.type === 'integer' ? 'integer' : 'number')
    if (value.type === 'truth' && otherwise.type === 'truth') return node('truth')
    this.report({
      code: 'type',
      message: `the two sides of \`else\` are ${typeName(value.type)} and ${typeName(otherwise.type)}; they must be two numbers or two truth values`,
      from: expression.from,
      to: expression.to,
      expected: typeName(value.type),
      found: typeName(otherwise.type),
    })
    return unknownNode(expression)
  }

  private comparison(expression: ComparisonExpression): TypedExpression {
    const { operands, operators } = expression
    const typed = operands.map((operand) => this.check(operand))
    let sound = true
    operators.forEach((_, at) => {
      const problem = this.comparisonProblem(expression, at, typed[at].type, typed[at + 1].type)
      if (problem) {
        this.report(problem)
        sound = false
      }
    })
    if (!sound) return unknownNode(expression)
    return { ...nodeOf(expression, 'truth', typed), kind: 'comparison', operands: typed, operators }
  }

  private comparisonProblem(
    expression: ComparisonExpression,
    at: number,
    left: Type,
    right: Type,
  ): IssueDraft | undefined {
    if (left === 'unknown' || right === 'unknown') return undefined
    const operator = expression.operators[at]
    const [a, b] = [expression.operands[at], expression.operands[at + 1]]
    const span = { from: a.from, to: b.to }
    const equality = operator === '==' || operator === '!='
    if (isNumeric(left) && isNumeric(right)) {
      if (!equality || (left === 'integer' && right === 'integer')) return undefined
      const insert = `abs(${formatExpression(a)} - ${formatExpression(b)}) ${operator === '==' ? '<=' : '>'} 1e-9`
      return {
        code: 'equality-of-numbers',
        message: `\`${operator}\` compares integers; these are rounded numbers, which are hardly ever equal. Write \`abs(a - b) ${operator === '==' ? '<=' : '>'} e\` with the tolerance e you mean`,
        ...span,
        expected: 'integers',
        found: 'numbers',
        suggestion: {
          label: `write ${insert}`,
          ...(expression.operators.length === 1 ? { from: expression.from, to: expression.to } : span),
          insert,
        },
      }
    }
    if (equality && left === 'truth' && right === 'truth') return undefined
    if (equality && typeof left === 'object' && typeof right === 'object' && left.of === right.of)
      return undefined
    const bare = equality && bareTruth(expression, left, right)
    return {
      code: 'type',
      ...(bare ? writing(expression, bare) : {}),
      message: equality
        ? `\`${operator}\` compares two integers, two truth values or two elements of one set, but these are ${typeName(left)} and ${typeName(right)}`
        : `\`${operator}\` compares numbers, but these are ${typeName(left)} and ${typeName(right)}`,
      ...span,
      expected: equality ? 'two of one kind' : 'numbers',
      found: `${typeName(left)} and ${typeName(right)}`,
    }
  }

  private call(expression: CallExpression): TypedExpression {
    return this.calls.check(expression)
  }
}

/** `rigid == 1` is `rigid`, `rigid == 0` and `rigid != 1` are `not rigid`; undefined for anything else. */
function bareTruth(
  { operands, operators }: ComparisonExpression,
  left: Type,
  right: Type,
): string | undefined {
  if (operands.length !== 2 || (left !== 'truth' && right !== 'truth')) return undefined
  const [condition, number] = left === 'truth' ? operands : [operands[1], operands[0]]
  if (number.kind !== 'number' || (number.value !== 0 && number.value !== 1)) return undefined
  const holds = (number.value === 1) === (operators[0] === '==')
  const text = formatExpression(condition)
  const whole = condition.kind === 'path' || condition.kind === 'call'
  return holds ? text : whole ? `not ${text}` : `not (${text})`
}

/** The first field of a set that is a number. */
function fieldOf(set: string): string | undefined {
  const observable = findObservable(set)
  if (observable?.kind !== 'records') return undefined
  return observable.fields.find((field) => field.kind === 'value' && field.type !== 'truth')?.name
}

function fieldsHint(type: Type): string {
  if (typeof type !== 'object') return ''
  const observable = findObservable(type.of.name) as RecordSet | NumberSet
  return observable.kind === 'records'
    ? `; take one of its fields, such as \`${fieldOf(observable.name) ?? observable.fields[0].name}\``
    : ''
}
