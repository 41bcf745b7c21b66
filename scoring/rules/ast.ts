/** Offsets into the text of a rule; the end is exclusive. */
export interface Span {
  readonly from: number
  readonly to: number
}

/** A name where it is written. */
export interface NameNode extends Span {
  readonly text: string
}

export type ArithmeticOperator = '+' | '-' | '*' | '/' | '^'
export type ComparisonOperator = '<' | '<=' | '>' | '>=' | '==' | '!='

/** `x in set where condition : body`, the last argument of a quantifier or fold. */
export interface Binder extends Span {
  readonly variable: NameNode
  readonly set: Extract<Expression, { kind: 'path' }>
  readonly condition?: Expression
  readonly body: Expression
}

/**
 * An expression. Parentheses leave no trace: the formatter puts back those that are needed. A chain of
 * comparisons `a < b <= c` is one node with three operands.
 */
export type Expression = Span &
  (
    | { readonly kind: 'number'; readonly value: number; readonly integer: boolean }
    | { readonly kind: 'truth'; readonly value: boolean }
    | { readonly kind: 'path'; readonly names: readonly NameNode[] }
    | { readonly kind: 'negation'; readonly operand: Expression }
    | { readonly kind: 'not'; readonly operand: Expression }
    | {
        readonly kind: 'arithmetic'
        readonly operator: ArithmeticOperator
        readonly left: Expression
        readonly right: Expression
      }
    | {
        readonly kind: 'comparison'
        readonly operands: readonly Expression[]
        readonly operators: readonly ComparisonOperator[]
      }
    | {
        readonly kind: 'logic'
        readonly operator: 'and' | 'or'
        readonly left: Expression
        readonly right: Expression
      }
    | { readonly kind: 'fallback'; readonly value: Expression; readonly otherwise: Expression }
    | {
        readonly kind: 'call'
        readonly name: NameNode
        readonly operands: readonly Expression[]
        readonly binder?: Binder
      }
  )

export type PathExpression = Extract<Expression, { kind: 'path' }>
export type CallExpression = Extract<Expression, { kind: 'call' }>
export type ComparisonExpression = Extract<Expression, { kind: 'comparison' }>

/** A column of a report: `name = expression`, or an expression that names itself. */
export interface ReportColumn extends Span {
  readonly name?: NameNode
  readonly value: Expression
}

/** Comments and blank lines that belong to a statement; the formatter keeps them. */
export interface Layout {
  /** Comments before the statement (or inside it), without `#` and outer blanks. */
  readonly comments: readonly string[]
  /** A comment on the statement's last line, after it. */
  readonly trailing?: string
  /** A blank line stands before the statement (or its comments). */
  readonly blankBefore: boolean
}

export type Statement = Span & { readonly layout: Layout } & (
    | {
        readonly kind: 'at'
        readonly words: readonly NameNode[]
        readonly value: number
        readonly valueSpan: Span
      }
    | {
        readonly kind: 'require'
        readonly condition: Expression
        readonly label?: { readonly text: string } & Span
      }
    | { readonly kind: 'let'; readonly name: NameNode; readonly value: Expression }
    | { readonly kind: 'score'; readonly value: Expression }
    | { readonly kind: 'report'; readonly columns: readonly ReportColumn[] }
    | { readonly kind: 'hit'; readonly condition: Expression }
  )

export type StatementKind = Statement['kind']

/** A whole rule, in the order it is written. */
export interface RuleTree {
  readonly statements: readonly Statement[]
  /** Comments after the last statement. */
  readonly closing: readonly string[]
}
