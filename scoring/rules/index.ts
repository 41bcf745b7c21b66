/** The scoring language: reading, checking, formatting, evaluating and explaining rules. */
export type { Expression, RuleTree, Span, Statement } from './ast.ts'
export { checkRule, type RuleCheck } from './check.ts'
export type { CheckedColumn, CheckedRequire, CheckedRule, PlaceOnRay } from './checkedRule.ts'
export { completions, type Completion, type CompletionResult } from './completions.ts'
export {
  evaluatePolytopeStage,
  evaluateRequires,
  evaluateRule,
  type EvaluationOptions,
  type RequireResult,
} from './evaluate.ts'
export {
  checkColumn,
  columnLead,
  evaluateColumn,
  type ColumnCheck,
  type ExpressionColumn,
} from './expressionColumn.ts'
export { canonicalText, formatExpression, formatRule } from './format.ts'
export { parser as ruleParser } from './generated/parser.ts'
export { scoringHash } from './hash.ts'
export { ruleHighlighting } from './highlight.ts'
export { hoverAt, type HoverResult } from './hover.ts'
export type { RuleIssue, RuleSuggestion } from './issues.ts'
export { RULE_LIMITS } from './limits.ts'
export {
  type Cell,
  compareOutcomes,
  type Feasible,
  type Infeasible,
  type Outcome,
  type Undefined,
} from './outcome.ts'
export { type OwnName, ownNames } from './ownNames.ts'
export { parseRule } from './parse.ts'
export type { Places } from './places.ts'
export { nameAt, nameProblem, type RenamableName } from './rename.ts'
export { reportOnRule, type RuleReport, type SoundReport } from './ruleReport.ts'
export { referenceEntries, type ReferenceEntry, type ReferenceKind } from './reference.ts'
