import type { Candidate } from '../observables/candidate.ts'
import type { CostClass, Stage, ValueType } from '../observables/observable.ts'
import { OBSERVABLES } from '../observables/registry.ts'
import { checkRule } from './check.ts'
import type { CheckedRule, PlaceOnRay } from './checkedRule.ts'
import { evaluateRule } from './evaluate.ts'
import { formatExpression } from './format.ts'
import { type RuleIssue, TextPositions } from './issues.ts'
import type { Cell } from './outcome.ts'
import { parseRule } from './parse.ts'

/** An expression of the scoring language that stands alone, as a column of a table. */
export interface ExpressionColumn {
  /** The name given, as in `smallest = ...`, or the expression itself. */
  readonly name: string
  /** The expression in the formatter's words, without name and comments. */
  readonly expression: string
  readonly type: ValueType
  readonly stage: Stage
  readonly cost: CostClass
  /** Of an expression that is one observable; null for others, whose unit their author knows. */
  readonly unit: string | null
  /**
   * The rule whose only report column it is: what `scoringHash` is taken of, and what a worker evaluates. It says
   * nothing of the name, nor of the place on the ray where the place is of no account.
   */
  readonly rule: CheckedRule
}

export type ColumnCheck =
  | { readonly ok: true; readonly column: ExpressionColumn; readonly issues: readonly RuleIssue[] }
  | { readonly ok: false; readonly issues: readonly RuleIssue[] }

const referencePoint: PlaceOnRay = { kind: 'scale', value: 1 }

/**
 * What stands before a column's text to make a rule of it; completion and hover look at the two together. Scoring
 * zero makes every candidate feasible, so that the report is filled for all of them.
 */
export const columnLead = 'score 0\nreport '
const reportWord = 'report '

const placed = ({ kind, value }: PlaceOnRay): string =>
  kind === 'scale' && value === 1 ? '' : `at ${kind} ${value}\n`

/**
 * Checks one expression, with a name before it or not, by the checker of rules. Issues are located in `text`.
 *
 * @param at where on the ray through the reference point it is taken
 */
export function checkColumn(text: string, at: PlaceOnRay = referencePoint): ColumnCheck {
  if (text.replace(/#.*/g, '').trim() === '') {
    const message = 'a column is an expression; this one is empty'
    return { ok: false, issues: [located(text, 'empty-column', message, 0)] }
  }
  const before = `${placed(at)}${columnLead}`
  const more = restOf(before, text)
  if (more !== null) {
    const message = 'a column is one expression; from here on this text says something else'
    return { ok: false, issues: [located(text, 'not-one-expression', message, more)] }
  }
  const check = checkRule(`${before}${text}`)
  const issues = moved(check.issues, before, text)
  if (!check.ok) return { ok: false, issues }
  const [report] = check.rule.report
  const tree = check.rule.tree.statements.find((statement) => statement.kind === 'report')
  if (tree?.kind !== 'report') throw new Error('a checked column has lost its report')
  const expression = formatExpression(tree.columns[0].value)
  // The same without the name, and without a place where the stage comes before the ray.
  const early = report.stage === 'polytope' || report.stage === 'topology'
  const plain = checkRule(`${early ? '' : placed(at)}${columnLead}${expression}`)
  if (!plain.ok) throw new Error('a column does not read back as it was formatted')
  const { rule } = plain
  const observable = OBSERVABLES.find((entry) => entry.kind === 'scalar' && entry.name === expression)
  const column: ExpressionColumn = {
    name: report.name,
    expression,
    type: report.type,
    stage: report.stage,
    cost: rule.cost,
    unit: observable?.unit ?? null,
    rule,
  }
  return { ok: true, column, issues }
}

/** The column's value of a candidate. Stages that were computed for another column are not computed again. */
export function evaluateColumn({ rule }: Pick<ExpressionColumn, 'rule'>, candidate: Candidate): Cell {
  const outcome = evaluateRule(rule, candidate)
  if (outcome.kind !== 'feasible') throw new Error('a column has a rule that can fail')
  const cell = outcome.report[rule.report[0].name]
  if (cell.value !== null) return cell
  // The place that a reason names is one in the rule; the expression stands in a line of its own there.
  const inExpression = (_: string, column: string): string => `(column ${Number(column) - reportWord.length})`
  return { value: null, reason: cell.reason.replace(/\(line \d+, column (\d+)\)$/, inExpression) }
}

/** Where something begins that is no part of the first column, or null; null too while the text does not parse. */
function restOf(before: string, text: string): number | null {
  const { rule } = parseRule(`${before}${text}`)
  if (!rule) return null
  const statements = rule.statements.filter(({ from }) => from >= before.length - reportWord.length)
  const [first, next] = statements
  if (first.kind === 'report' && first.columns.length > 1) return first.columns[1].from - before.length
  return next === undefined ? null : next.from - before.length
}

function located(text: string, code: string, message: string, from: number): RuleIssue {
  const place = new TextPositions(text).locate(from)
  return { code, message, from, to: text.length, severity: 'error', ...place }
}

/** Issues of the whole as issues of the text; warnings about the words before it are not meant for anybody. */
function moved(issues: readonly RuleIssue[], before: string, text: string): RuleIssue[] {
  const positions = new TextPositions(text)
  const shift = before.length
  return issues
    .filter(({ from, severity }) => from >= shift || severity === 'error')
    .map((issue) => {
      const { suggestion } = issue
      const from = Math.max(0, issue.from - shift)
      return {
        ...issue,
        ...positions.locate(from),
        from,
        to: Math.max(from, issue.to - shift),
        ...(suggestion
          ? { suggestion: { ...suggestion, from: suggestion.from - shift, to: suggestion.to - shift } }
          : {}),
      }
    })
}
