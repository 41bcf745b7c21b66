import type { Span, Statement } from './ast.ts'
import { type IssueDraft, writing } from './issues.ts'
import type { BrokenStatement } from './parse.ts'
import { tokenise } from './segments.ts'

type Repair = Pick<IssueDraft, 'suggestion'>

/** Leaves out the statement around `span`, with the line break before it. */
export function withoutStatement(text: string, statements: readonly Span[], span: Span): Repair {
  const statement = statements.find(({ from, to }) => from <= span.from && span.to <= to)
  if (!statement) return {}
  const lineStart = text.lastIndexOf('\n', statement.from - 1)
  const alone = text.slice(lineStart + 1, statement.from).trim() === ''
  const from = alone ? Math.max(0, lineStart) : statement.from
  return writing({ from, to: statement.to }, '')
}

/**
 * Moves the definition of the name at `use` above the statement that uses it. Nothing where that is the definition
 * itself, or where the definition needs names that are given in between.
 */
export function definedAbove(
  text: string,
  statements: readonly (Statement | BrokenStatement)[],
  use: Span,
): Repair {
  const name = text.slice(use.from, use.to)
  const user = statements.findIndex(({ from, to }) => from <= use.from && use.to <= to)
  const given = statements.findIndex((one, at) => at > user && one.kind === 'let' && one.name.text === name)
  if (user < 0 || given < 0) return {}
  const definition = statements[given]
  const needed = new Set(
    tokenise(text.slice(definition.from, definition.to)).flatMap(({ kind, text: word }) =>
      kind === 'word' ? [word] : [],
    ),
  )
  const between = statements.slice(user, given)
  if (between.some((one) => one.kind === 'let' && needed.has(one.name.text))) return {}
  const moved = text.slice(definition.from, definition.to)
  const rest = text.slice(statements[user].from, definition.from).trimEnd()
  return {
    suggestion: {
      label: `move its let above`,
      from: statements[user].from,
      to: definition.to,
      insert: `${moved}\n${rest}`,
    },
  }
}
