import type { Binder, Expression, ReportColumn, RuleTree, Statement } from './ast.ts'

/** How tightly each form binds; a looser operand of a tighter form needs parentheses. */
enum Binding {
  fallback,
  or,
  and,
  not,
  comparison,
  sum,
  product,
  negation,
  power,
  whole,
}

function bindingOf(expression: Expression): Binding {
  switch (expression.kind) {
    case 'fallback':
      return Binding.fallback
    case 'logic':
      return expression.operator === 'or' ? Binding.or : Binding.and
    case 'not':
      return Binding.not
    case 'comparison':
      return Binding.comparison
    case 'arithmetic':
      return expression.operator === '^'
        ? Binding.power
        : expression.operator === '*' || expression.operator === '/'
          ? Binding.product
          : Binding.sum
    case 'negation':
      return Binding.negation
    default:
      return Binding.whole
  }
}

/** Text of a number that reads back as the same value of the same type. */
function numberText(value: number, integer: boolean): string {
  const text = String(value)
  return integer || /[.e]/.test(text) ? text : `${text}.0`
}

/** Text of an operand; in parentheses when it binds more loosely than `least`. */
function operand(expression: Expression, least: Binding): string {
  const text = formatExpression(expression)
  return bindingOf(expression) < least ? `(${text})` : text
}

/** Canonical text of an expression, with the parentheses it needs and no others. */
export function formatExpression(expression: Expression): string {
  switch (expression.kind) {
    case 'number':
      return numberText(expression.value, expression.integer)
    case 'truth':
      return String(expression.value)
    case 'path':
      return expression.names.map((name) => name.text).join('.')
    case 'negation':
      return `-${operand(expression.operand, Binding.negation)}`
    case 'not':
      return `not ${operand(expression.operand, Binding.not)}`
    case 'arithmetic': {
      const own = bindingOf(expression)
      const { operator, left, right } = expression
      if (operator === '^') {
        const exponent = right.kind === 'negation' ? formatExpression(right) : operand(right, Binding.power)
        return `${operand(left, Binding.whole)}^${exponent}`
      }
      return `${operand(left, own)} ${operator} ${operand(right, own + 1)}`
    }
    case 'comparison':
      return expression.operands
        .map(
          (each, at) => `${at > 0 ? ` ${expression.operators[at - 1]} ` : ''}${operand(each, Binding.sum)}`,
        )
        .join('')
    case 'logic': {
      const own = bindingOf(expression)
      return `${operand(expression.left, own)} ${expression.operator} ${operand(expression.right, own + 1)}`
    }
    case 'fallback':
      return `${operand(expression.value, Binding.or)} else ${operand(expression.otherwise, Binding.fallback)}`
    case 'call': {
      const parts = expression.operands.map(formatExpression)
      if (expression.binder) parts.push(formatBinder(expression.binder))
      return `${expression.name.text}(${parts.join(', ')})`
    }
  }
}

function formatBinder({ variable, set, condition, body }: Binder): string {
  const where = condition ? ` where ${formatExpression(condition)}` : ''
  return `${variable.text} in ${formatExpression(set)}${where} : ${formatExpression(body)}`
}

function formatColumn({ name, value }: ReportColumn): string {
  return name ? `${name.text} = ${formatExpression(value)}` : formatExpression(value)
}

/** A text in quotes, as a rule holds it. */
export const quoted = (text: string): string => `"${text.replace(/["\\]/g, '\\$&')}"`

/** Canonical text of one statement, without its comments. */
export function formatStatement(statement: Statement): string {
  switch (statement.kind) {
    case 'at':
      return `at ${[...statement.words.map((word) => word.text), String(statement.value)].join(' ')}`
    case 'require': {
      const label = statement.label ? ` label ${quoted(statement.label.text)}` : ''
      return `require ${formatExpression(statement.condition)}${label}`
    }
    case 'let':
      return `let ${statement.name.text} = ${formatExpression(statement.value)}`
    case 'score':
      return `score ${formatExpression(statement.value)}`
    case 'report':
      return `report ${statement.columns.map(formatColumn).join(', ')}`
    case 'hit':
      return `hit ${formatExpression(statement.condition)}`
  }
}

const comment = (text: string): string => (text === '' ? '#' : `# ${text}`)

/**
 * A rule laid out by the book: a statement a line, single spaces, the parentheses that are needed. Comments and
 * single blank lines stay. Reading the result gives the same tree.
 */
export function formatRule(rule: RuleTree): string {
  const lines: string[] = []
  for (const statement of rule.statements) {
    const { comments, trailing, blankBefore } = statement.layout
    if (blankBefore) lines.push('')
    lines.push(...comments.map(comment))
    lines.push(formatStatement(statement) + (trailing === undefined ? '' : `  ${comment(trailing)}`))
  }
  lines.push(...rule.closing.map(comment))
  return lines.length === 0 ? '' : `${lines.join('\n')}\n`
}

/** The text that stands for a rule's meaning: no comments, no layout. Part of the scoring hash. */
export function canonicalText(rule: RuleTree): string {
  return rule.statements.map((statement) => `${formatStatement(statement)}\n`).join('')
}
