import type { Stage, ValueType } from '../observables/observable.ts'
import type { NameNode, ReportColumn, Statement } from './ast.ts'
import { ExpressionChecker } from './checkExpression.ts'
import type { CheckedRule, PlaceOnRay } from './checkedRule.ts'
import { canonicalText, formatExpression, quoted } from './format.ts'
import { type IssueDraft, locateIssues, type RuleIssue, TextPositions, writing } from './issues.ts'
import { RULE_LIMITS } from './limits.ts'
import { dearest, mentionsOf } from './mentions.ts'
import { nearestName } from './nearest.ts'
import { definedAbove, withoutStatement } from './statementRepairs.ts'
import { later } from './node.ts'
import { type BrokenStatement, type Reading, readRule } from './parse.ts'
import { compileProgram } from './program.ts'
import { Scope } from './scope.ts'
import { isNumeric, type TypedExpression, typeName } from './typed.ts'
import { findBasisDependence, withoutBasis } from './warnings.ts'

/** What checking a text gives: a rule ready to run with its warnings, or the errors (and warnings) found. */
export type RuleCheck =
  | { readonly ok: true; readonly rule: CheckedRule; readonly issues: readonly RuleIssue[] }
  | { readonly ok: false; readonly issues: readonly RuleIssue[] }

const PLACES = ['scale', 'volume', 'smallest divisor'] as const

interface Column {
  readonly name: string
  readonly value: TypedExpression
}

/** Checks one rule, statement by statement. */
class RuleChecker {
  readonly drafts: IssueDraft[] = []
  readonly scope = new Scope()
  readonly lets: TypedExpression[] = []
  readonly requires: { label: string; condition: TypedExpression }[] = []
  readonly columns: Column[] = []
  place: PlaceOnRay = { kind: 'scale', value: 1 }
  score: TypedExpression | undefined
  hit: TypedExpression | undefined
  private readonly first = new Map<string, { from: number }>()
  private readonly expressions = new ExpressionChecker(this.scope, (draft) => this.drafts.push(draft))
  private readonly positions: TextPositions

  constructor(private readonly text: string) {
    this.positions = new TextPositions(text)
  }

  run(statements: readonly (Statement | BrokenStatement)[]): void {
    for (const statement of statements) {
      const name = statement.kind === 'let' || statement.kind === 'broken' ? statement.name : undefined
      if (name && !this.scope.later.has(name.text)) this.scope.later.set(name.text, name)
    }
    for (const statement of statements) this.statement(statement)
    if (!this.first.has('score')) {
      const end = this.text.trimEnd().length
      this.issue({ from: end, to: end }, 'no-score', 'a rule has exactly one `score`; this one has none', {
        expected: 'score expression',
      })
    }
    if (statements.some((statement) => statement.kind === 'broken')) return
    for (const entry of this.scope.lets.values())
      if (!entry.used && entry.definition)
        this.drafts.push({
          code: 'unused-name',
          message: `\`${entry.name.text}\` is never used`,
          from: entry.name.from,
          to: entry.name.to,
          severity: 'warning',
          ...withoutStatement(this.text, statements, entry.name),
        })
    this.drafts.forEach((draft, at) => {
      if (draft.code === 'used-before-definition')
        this.drafts[at] = { ...draft, ...definedAbove(this.text, statements, draft) }
    })
  }

  private issue(
    span: { from: number; to: number },
    code: string,
    message: string,
    more: Pick<IssueDraft, 'expected' | 'suggestion'> = {},
  ): void {
    this.drafts.push({ code, message, from: span.from, to: span.to, ...more })
  }

  /** True for the first statement of a kind that may stand only once; reports the others. */
  private once(kind: string, span: { from: number; to: number }, rule: string): boolean {
    const earlier = this.first.get(kind)
    if (earlier) {
      const { line } = this.positions.locate(earlier.from)
      this.issue(
        { from: span.from, to: span.from + kind.length },
        `second-${kind}`,
        `${rule}; the first is in line ${line}`,
        withoutStatement(this.text, [span], span),
      )
      return false
    }
    this.first.set(kind, span)
    return true
  }

  private statement(statement: Statement | BrokenStatement): void {
    switch (statement.kind) {
      case 'broken':
        if (statement.keyword === 'score' || statement.keyword === 'hit' || statement.keyword === 'at')
          if (!this.first.has(statement.keyword)) this.first.set(statement.keyword, statement)
        if (statement.name) this.define(statement.name, undefined)
        return
      case 'at':
        if (this.once('at', statement, 'a rule has at most one `at`')) this.at(statement)
        return
      case 'require':
        return this.require(statement)
      case 'let': {
        this.scope.defining = statement.name.text
        const value = this.expressions.check(statement.value)
        this.scope.defining = undefined
        this.define(statement.name, this.plain(value, statement.value, '`let` names a value'))
        return
      }
      case 'score': {
        const value = this.expressions.numeric(statement.value, 'a score is a number')
        if (this.once('score', statement, 'a rule has exactly one `score`')) this.score = value
        return
      }
      case 'report':
        return statement.columns.forEach((column) => this.column(column))
      case 'hit': {
        const condition = this.expressions.condition(statement.condition, '`hit` takes a condition')
        if (this.once('hit', statement, 'a rule has at most one `hit`')) this.hit = condition
      }
    }
  }

  /** Elements of sets cannot leave their fold. */
  private plain(value: TypedExpression, span: { from: number; to: number }, demand: string): TypedExpression {
    if (typeof value.type !== 'object') return value
    this.issue(span, 'type', `${demand}, but this is ${typeName(value.type)}`)
    return { ...value, type: 'unknown' }
  }

  private define(name: NameNode, definition: TypedExpression | undefined): void {
    this.scope.later.delete(name.text)
    const taken = this.scope.taken(name.text)
    if (taken) {
      this.issue(name, 'shadowing', `${taken}; give this value another name`)
      return
    }
    const index = this.lets.length
    if (definition) this.lets.push(definition)
    const known = definition && definition.type !== 'unknown' ? definition : undefined
    this.scope.lets.set(name.text, {
      name,
      index,
      used: this.scope.usedEarly.has(name.text),
      ...(known ? { definition: known } : {}),
    })
  }

  private at(statement: Extract<Statement, { kind: 'at' }>): void {
    const { words, value, valueSpan } = statement
    const given = words.map((word) => word.text).join(' ')
    const kind = PLACES.find((place) => place === given)
    if (!kind) {
      const near = nearestName(given, PLACES) ?? (given === 'smallest' ? 'smallest divisor' : undefined)
      const span = words.length > 0 ? { from: words[0].from, to: words[words.length - 1].to } : valueSpan
      this.drafts.push({
        code: 'unknown-place',
        message: `\`at\` is followed by scale, volume or smallest divisor, and a number${near ? `; did you mean \`${near}\`?` : ''}`,
        from: span.from,
        to: span.to,
        expected: PLACES.join(', '),
        found: given,
        ...(near
          ? { suggestion: { label: `write ${near}`, from: span.from, to: span.to, insert: near } }
          : {}),
      })
      return
    }
    if (!(value > 0 && Number.isFinite(value))) {
      this.issue(valueSpan, 'place-not-positive', `\`at ${kind}\` takes a positive number`, {
        expected: 'a positive number',
      })
      return
    }
    this.place = { kind, value }
  }

  private require(statement: Extract<Statement, { kind: 'require' }>): void {
    const condition = this.expressions.condition(statement.condition, '`require` takes a condition')
    const { label } = statement
    if (label && label.text.length > RULE_LIMITS.label)
      this.issue(
        label,
        'label-too-long',
        `a label has at most ${RULE_LIMITS.label} characters; this one has ${label.text.length}`,
        writing(label, quoted(label.text.slice(0, RULE_LIMITS.label).trim())),
      )
    if (label && label.text.trim() === '')
      this.issue(
        label,
        'empty-label',
        'this label is empty; leave it out, or name the condition',
        writing({ from: statement.condition.to, to: label.to }, ''),
      )
    this.requires.push({ label: label?.text ?? formatExpression(statement.condition), condition })
  }

  private column(column: ReportColumn): void {
    const value = this.plain(this.expressions.check(column.value), column.value, 'a report column is a value')
    const name = column.name?.text ?? formatExpression(column.value)
    if (this.columns.some((earlier) => earlier.name === name))
      this.issue(
        column.name ?? column,
        'second-column',
        `the report already has a column \`${name}\``,
        column.name ? writing(column.name, this.freeColumn(name)) : {},
      )
    this.columns.push({ name, value })
  }

  private freeColumn(name: string): string {
    let count = 2
    while (this.columns.some((earlier) => earlier.name === `${name}_${count}`)) count += 1
    return `${name}_${count}`
  }

  /** Warnings about rules that are right but hardly meant. */
  warn(): void {
    const ranked: { word: string; value: TypedExpression }[] = this.requires.map((entry) => ({
      word: 'a condition',
      value: entry.condition,
    }))
    if (this.score) ranked.push({ word: 'the score', value: this.score })
    if (this.hit) ranked.push({ word: '`hit`', value: this.hit })
    for (const { word, value } of ranked) {
      const found = findBasisDependence(value)
      if (found)
        this.drafts.push({
          code: 'basis-dependent',
          message: `${word} uses metric.basis, which depends on the choice of a lattice basis; use metric.divisor, and keep metric.basis for reports`,
          from: found.from,
          to: found.to,
          severity: 'warning',
          ...writing(found, withoutBasis(found)),
        })
    }
    if (this.score?.stage === 'polytope')
      this.drafts.push({
        code: 'score-of-polytope',
        message:
          'this score is the same for all triangulations of a polytope; only a scope of several polytopes gives a search something to do',
        from: this.score.from,
        to: this.score.to,
        severity: 'warning',
      })
  }
}

const valueType = (expression: TypedExpression): ValueType =>
  expression.type === 'truth' || expression.type === 'integer' ? expression.type : 'number'

/** A text as the checker leaves it, sound or not. */
export function checkedText(text: string): { readonly reading: Reading; readonly checker: Checked } {
  const reading = readRule(text)
  const checker = new RuleChecker(text)
  checker.drafts.push(...reading.drafts)
  if (!reading.drafts.some((draft) => draft.code === 'too-long')) checker.run(reading.statements)
  return { reading, checker }
}

/** What the checker knows after its run. */
export type Checked = Pick<
  RuleChecker,
  'drafts' | 'scope' | 'lets' | 'requires' | 'columns' | 'place' | 'score' | 'hit' | 'warn'
>

/**
 * Reads and checks the text of a rule: names, types, limits, the rules of `let`, and that there is exactly one
 * score. Mistakes come back as located issues, several at once; nothing a person types makes it throw.
 */
export function checkRule(text: string): RuleCheck {
  return ruleCheck(text, checkedText(text))
}

/** The outcome of a check that was made. */
export function ruleCheck(text: string, { reading, checker }: ReturnType<typeof checkedText>): RuleCheck {
  const { statements, closing } = reading
  const { score, hit, requires, columns, place, scope, lets } = checker
  const sound = checker.drafts.every((draft) => draft.severity === 'warning')
  if (sound) checker.warn()
  const issues = locateIssues(text, checker.drafts, RULE_LIMITS.issues)
  if (!sound || !score) return { ok: false, issues }

  const tree = {
    statements: statements.filter((statement): statement is Statement => statement.kind !== 'broken'),
    closing,
  }
  const all = [
    ...requires.map((entry) => entry.condition),
    score,
    ...(hit ? [hit] : []),
    ...columns.map((entry) => entry.value),
  ]
  const mentions = mentionsOf(all, place)
  const rule: CheckedRule = {
    text,
    canonical: canonicalText(tree),
    tree,
    at: place,
    requires: requires.map(({ label, condition }) => ({ label, stage: condition.stage })),
    score: {
      type: isNumeric(score.type) && score.type === 'integer' ? 'integer' : 'number',
      stage: score.stage,
    },
    hit: hit ? { stage: hit.stage } : null,
    report: columns.map(({ name, value }) => ({ name, type: valueType(value), stage: value.stage })),
    observables: [...mentions.keys()],
    versions: [...mentions].map(([name, { version }]) => `${name}@${version}`),
    stage: all.reduce<Stage>((latest, expression) => later(latest, expression.stage), 'polytope'),
    cost: dearest(mentions),
    program: compileProgram({ text, place, lets, slotCount: scope.slotCount, requires, score, hit, columns }),
  }
  return { ok: true, rule, issues }
}
