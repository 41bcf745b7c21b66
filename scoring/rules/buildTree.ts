import type { SyntaxNode } from '@lezer/common'
import type {
  ArithmeticOperator,
  Binder,
  ComparisonOperator,
  Expression,
  Layout,
  NameNode,
  PathExpression,
  ReportColumn,
  Statement,
} from './ast.ts'
import type { IssueDraft } from './issues.ts'
import { RULE_LIMITS } from './limits.ts'

/** Thrown inside this module only, when a tree outgrows its limits. */
class TooLarge extends Error {
  constructor(readonly draft: IssueDraft) {
    super(draft.message)
  }
}

/** Turns the nodes of an error-free syntax tree into our own tree. One builder serves one text: it counts nodes. */
export class TreeBuilder {
  private nodes = 0
  private readonly text: string
  /** Where the parsed piece starts in the text. */
  private offset = 0

  constructor(text: string) {
    this.text = text
  }

  /** The statement under `node`, parsed from `text` at `offset`, or an issue when a limit is passed. */
  statement(node: SyntaxNode, offset: number, layout: Layout): Statement | IssueDraft {
    this.offset = offset
    try {
      return { ...this.buildStatement(node), ...this.span(node), layout }
    } catch (error) {
      if (error instanceof TooLarge) return error.draft
      throw error
    }
  }

  private span(node: SyntaxNode): { from: number; to: number } {
    return { from: node.from + this.offset, to: node.to + this.offset }
  }

  private textOf(node: SyntaxNode): string {
    return this.text.slice(node.from + this.offset, node.to + this.offset)
  }

  private name(node: SyntaxNode): NameNode {
    return { text: this.textOf(node), ...this.span(node) }
  }

  private buildStatement(node: SyntaxNode) {
    switch (node.name) {
      case 'At': {
        const valueNode = node.getChild('AtValue') as SyntaxNode
        return {
          kind: 'at' as const,
          words: node.getChildren('Name').map((word) => this.name(word)),
          value: Number(this.textOf(valueNode).replace(/\s/g, '')),
          valueSpan: this.span(valueNode),
        }
      }
      case 'Require': {
        const condition = this.expression(operands(node)[0], 0)
        const label = node.getChild('String')
        if (!label) return { kind: 'require' as const, condition }
        const text = this.textOf(label).slice(1, -1).replace(/\\(.)/g, '$1')
        return { kind: 'require' as const, condition, label: { text, ...this.span(label) } }
      }
      case 'Let': {
        const name = this.name(node.getChild('Definition') as SyntaxNode)
        return { kind: 'let' as const, name, value: this.expression(operands(node)[0], 0) }
      }
      case 'Score':
        return { kind: 'score' as const, value: this.expression(operands(node)[0], 0) }
      case 'Report':
        return {
          kind: 'report' as const,
          columns: node.getChildren('Column').map((column) => this.column(column)),
        }
      default:
        return { kind: 'hit' as const, condition: this.expression(operands(node)[0], 0) }
    }
  }

  private column(node: SyntaxNode): ReportColumn {
    const name = node.getChild('ColumnName')
    const value = this.expression(operands(node)[0], 0)
    return name ? { name: this.name(name), value, ...this.span(node) } : { value, ...this.span(node) }
  }

  private count(node: SyntaxNode, depth: number): void {
    if (++this.nodes > RULE_LIMITS.nodes)
      throw new TooLarge({
        code: 'too-many-nodes',
        message: `the rule has more than ${RULE_LIMITS.nodes.toLocaleString('en')} names, numbers and operators, the limit for one rule`,
        ...this.span(node),
      })
    if (depth > RULE_LIMITS.nesting)
      throw new TooLarge({
        code: 'too-deep',
        message: `more than ${RULE_LIMITS.nesting} brackets, calls and signs stand inside each other, the limit for one rule; \`let\` can name an inner part`,
        ...this.span(node),
      })
  }

  private expression(node: SyntaxNode, depth: number): Expression {
    if (node.name === 'Parenthesised') {
      let inner = node
      let level = depth
      while (inner.name === 'Parenthesised') {
        this.count(inner, ++level)
        inner = operands(inner)[0]
      }
      return this.expression(inner, level)
    }
    if (isLeftGrouping(node)) return this.leftGrouping(node, depth)
    this.count(node, depth)
    const span = this.span(node)
    switch (node.name) {
      case 'Number': {
        const text = this.textOf(node)
        return { kind: 'number', value: Number(text), integer: /^[0-9]+$/.test(text), ...span }
      }
      case 'Truth':
        return { kind: 'truth', value: this.textOf(node) === 'true', ...span }
      case 'Path':
        return this.path(node)
      case 'Call':
        return this.call(node, depth)
      case 'Negation':
        return { kind: 'negation', operand: this.expression(operands(node)[0], depth + 1), ...span }
      case 'Not':
        return { kind: 'not', operand: this.expression(operands(node)[0], depth + 1), ...span }
      case 'Power': {
        const [left, right] = operands(node)
        return {
          kind: 'arithmetic',
          operator: '^',
          left: this.expression(left, depth + 1),
          right: this.expression(right, depth + 1),
          ...span,
        }
      }
      case 'Fallback': {
        const [value, otherwise] = operands(node)
        return {
          kind: 'fallback',
          value: this.expression(value, depth + 1),
          otherwise: this.expression(otherwise, depth + 1),
          ...span,
        }
      }
      default:
        throw new Error(`no expression is made from a ${node.name} node`)
    }
  }

  /** Sums, products, comparisons, `and`, `or`: their left spine may be long, so it is walked, not recursed into. */
  private leftGrouping(node: SyntaxNode, depth: number): Expression {
    const spine: SyntaxNode[] = []
    let first = node
    while (isLeftGrouping(first)) {
      this.count(first, depth)
      spine.push(first)
      first = operands(first)[0]
    }
    let left = this.expression(first, depth + 1)
    let chain: { node: SyntaxNode } | undefined
    for (const level of spine.reverse()) {
      const right = this.expression(operands(level)[1], depth + 1)
      const span = this.span(level)
      if (level.name === 'Comparison') {
        const operator = this.textOf(level.getChild('CompareOperator') as SyntaxNode) as ComparisonOperator
        left =
          chain && left.kind === 'comparison'
            ? {
                kind: 'comparison',
                operands: [...left.operands, right],
                operators: [...left.operators, operator],
                ...span,
              }
            : { kind: 'comparison', operands: [left, right], operators: [operator], ...span }
        chain = { node: level }
        continue
      }
      chain = undefined
      if (level.name === 'And' || level.name === 'Or')
        left = { kind: 'logic', operator: level.name === 'And' ? 'and' : 'or', left, right, ...span }
      else {
        const sign = level.getChild('PlusOperator') ?? (level.getChild('TimesOperator') as SyntaxNode)
        left = { kind: 'arithmetic', operator: this.textOf(sign) as ArithmeticOperator, left, right, ...span }
      }
    }
    return left
  }

  private path(node: SyntaxNode): PathExpression {
    return {
      kind: 'path',
      names: node.getChildren('Name').map((part) => this.name(part)),
      ...this.span(node),
    }
  }

  private call(node: SyntaxNode, depth: number): Expression {
    const name = this.name(node.getChild('FunctionName') as SyntaxNode)
    const binderNodes = node.getChildren('Binder')
    const built = operands(node).map((operand) => this.expression(operand, depth + 1))
    const span = this.span(node)
    if (binderNodes.length === 0) return { kind: 'call', name, operands: built, ...span }
    const last = operands(node, true)
    if (binderNodes.length > 1 || last[last.length - 1].name !== 'Binder')
      throw new TooLarge({
        code: 'binder-not-last',
        message: 'a fold runs through one set, and `x in set : expression` is its last argument',
        ...this.span(binderNodes[binderNodes.length > 1 ? 1 : 0]),
      })
    return { kind: 'call', name, operands: built, binder: this.binder(binderNodes[0], depth), ...span }
  }

  private binder(node: SyntaxNode, depth: number): Binder {
    this.count(node, depth)
    const parts = operands(node)
    const set = this.path(parts[0])
    const variable = this.name(node.getChild('Variable') as SyntaxNode)
    const body = this.expression(parts[parts.length - 1], depth + 1)
    const span = this.span(node)
    if (parts.length === 2) return { variable, set, body, ...span }
    return { variable, set, condition: this.expression(parts[1], depth + 1), body, ...span }
  }
}

const EXPRESSIONS = new Set([
  'Number',
  'Truth',
  'Path',
  'Call',
  'Parenthesised',
  'Negation',
  'Power',
  'Product',
  'Sum',
  'Comparison',
  'Not',
  'And',
  'Or',
  'Fallback',
])

const isLeftGrouping = (node: SyntaxNode): boolean =>
  node.name === 'Sum' ||
  node.name === 'Product' ||
  node.name === 'Comparison' ||
  node.name === 'And' ||
  node.name === 'Or'

/** The children of a node that are expressions (and binders, when asked for), in order. */
function operands(node: SyntaxNode, withBinders = false): SyntaxNode[] {
  const found: SyntaxNode[] = []
  for (let child = node.firstChild; child; child = child.nextSibling)
    if (EXPRESSIONS.has(child.name) || (withBinders && child.name === 'Binder')) found.push(child)
  return found
}
