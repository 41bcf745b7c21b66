import type { SyntaxNode } from '@lezer/common'
import type { Layout, NameNode, RuleTree, Statement, StatementKind } from './ast.ts'
import { TreeBuilder } from './buildTree.ts'
import { parser } from './generated/parser.ts'
import { type IssueDraft, locateIssues, type RuleIssue } from './issues.ts'
import { RULE_LIMITS } from './limits.ts'
import { nearestName } from './nearest.ts'
import { cutIntoSegments, type Segment } from './segments.ts'
import { explainSyntaxError } from './syntaxErrors.ts'
import { statementTooLarge } from './size.ts'
import { STATEMENT_KEYWORDS } from './words.ts'

/** A statement that could not be read. A `let` still declares its name, so that its uses bring no second error. */
export interface BrokenStatement {
  readonly kind: 'broken'
  readonly keyword: StatementKind
  readonly from: number
  readonly to: number
  readonly name?: NameNode
}

/** Everything that could be read from a text, for the checker. */
export interface Reading {
  readonly statements: readonly (Statement | BrokenStatement)[]
  readonly closing: readonly string[]
  readonly drafts: readonly IssueDraft[]
}

const commentText = (token: { readonly text: string }): string => token.text.slice(1).trim()

function opening(text: string, segment: Segment): IssueDraft | undefined {
  const first = segment.tokens[0]
  if (segment.keyword !== undefined || first === undefined) return undefined
  const words = STATEMENT_KEYWORDS.map((keyword) => keyword.word)
  const near = first.kind === 'word' ? nearestName(first.text, words) : undefined
  const end = text.indexOf('\n', first.from)
  return {
    code: 'no-statement',
    message: near
      ? `a statement starts with ${words.join(', ')}; did you mean \`${near}\`?`
      : `a statement starts with ${words.join(', ')}`,
    from: first.from,
    to: near ? first.to : Math.min(segment.to, end < 0 ? text.length : end),
    expected: words.join(', '),
    found: first.text.slice(0, 30),
    suggestion: near ? { label: `write ${near}`, from: first.from, to: first.to, insert: near } : undefined,
  }
}

/** Reads a text as far as it can be read. Never throws on what a person typed. */
export function readRule(text: string): Reading {
  if (text.length > RULE_LIMITS.textLength) {
    const limit = RULE_LIMITS.textLength.toLocaleString('en')
    const message = `the rule has ${text.length.toLocaleString('en')} characters; the limit is ${limit}`
    return {
      statements: [],
      closing: [],
      drafts: [{ code: 'too-long', message, from: RULE_LIMITS.textLength, to: text.length }],
    }
  }
  const segments = cutIntoSegments(text)
  const builder = new TreeBuilder(text)
  const statements: (Statement | BrokenStatement)[] = []
  const drafts: IssueDraft[] = []
  const stray = opening(text, segments[0])
  if (stray) drafts.push(stray)

  let waiting: string[] = segments[0].after.concat(segments[0].inner).map(commentText)
  let previousEnd = segments[0].to
  let spoilt = false
  segments.slice(1).forEach((segment, index) => {
    const next = segments[index + 2]
    const gapEnd = segments[index].after[0]?.from ?? segment.from
    const lineEnd = lineEndAfter(text, segment.to)
    const trailing = segment.after.filter((comment) => comment.from < lineEnd)
    const layout: Layout = {
      comments: [...waiting, ...segment.inner.map(commentText)],
      ...(trailing.length > 0 ? { trailing: trailing.map(commentText).join(' ') } : {}),
      blankBefore:
        statements.length > 0 && /\n\s*\n/.test(text.slice(previousEnd, Math.max(gapEnd, segment.from))),
    }
    waiting = segment.after.filter((comment) => comment.from >= lineEnd).map(commentText)
    previousEnd = trailing[0]?.to ?? segment.to
    const keyword = segment.keyword as StatementKind
    const tooLarge = statementTooLarge(segment)
    if (tooLarge) {
      drafts.push(tooLarge)
      statements.push(broken(segment, keyword))
      return
    }
    const tree = parser.parse(text.slice(segment.from, segment.to))
    const finding = explainSyntaxError(text, segment, tree, next, drafts.length < RULE_LIMITS.issues)
    if (finding || spoilt) {
      if (!spoilt) {
        if (finding?.issue) drafts.push(finding.issue)
        statements.push(broken(segment, keyword))
      }
      spoilt = finding?.spoilsNext ?? false
      return
    }
    const built = builder.statement(tree.topNode.firstChild as SyntaxNode, segment.from, layout)
    if ('kind' in built) statements.push(built)
    else {
      drafts.push(built)
      statements.push(broken(segment, keyword))
    }
  })
  return { statements, closing: waiting, drafts }
}

function broken(segment: Segment, keyword: StatementKind): BrokenStatement {
  const name = segment.tokens[1]
  const base = { kind: 'broken' as const, keyword, from: segment.from, to: segment.to }
  return keyword === 'let' && name?.kind === 'word' ? { ...base, name } : base
}

function lineEndAfter(text: string, offset: number): number {
  const end = text.indexOf('\n', offset)
  return end < 0 ? text.length : end
}

/**
 * Reads the text of a rule. `rule` is there exactly when the text has no syntax error; names and types are the
 * business of `checkRule`.
 */
export function parseRule(text: string): { readonly rule?: RuleTree; readonly issues: readonly RuleIssue[] } {
  const { statements, closing, drafts } = readRule(text)
  const issues = locateIssues(text, drafts, RULE_LIMITS.issues)
  const whole = statements.filter((statement): statement is Statement => statement.kind !== 'broken')
  if (issues.length > 0) return { issues }
  return { rule: { statements: whole, closing }, issues }
}
