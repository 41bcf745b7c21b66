import type { Expression, RuleTree, Span } from './ast.ts'
import { TextPositions } from './issues.ts'

/** Line and column of one text by those of another, both written `line:column` and counted from 1. */
export type Places = Readonly<Record<string, string>>

/**
 * Where the expressions of one text stand in another of the same meaning. Values are kept under a rule's canonical
 * text, and reasons name places in it; people want them in the text they wrote.
 *
 * @param from, to trees of equal shape, such as those of a text and of its canonical form
 */
export function correspondingPlaces(
  from: { readonly text: string; readonly tree: RuleTree },
  to: { readonly text: string; readonly tree: RuleTree },
): Places {
  const [there, here] = [new TextPositions(from.text), new TextPositions(to.text)]
  const targets = spansOf(to.tree)
  const places: Record<string, string> = {}
  spansOf(from.tree).forEach((span, at) => {
    const a = there.locate(span.from)
    const b = here.locate(targets[at].from)
    places[`${a.line}:${a.column}`] ??= `${b.line}:${b.column}`
  })
  return places
}

/** Outermost expressions first, in the order of the text. */
function spansOf({ statements }: RuleTree): Span[] {
  const spans: Span[] = []
  const visit = (expression: Expression): void => {
    spans.push(expression)
    switch (expression.kind) {
      case 'path':
        spans.push(...expression.names)
        return
      case 'negation':
      case 'not':
        return visit(expression.operand)
      case 'arithmetic':
      case 'logic':
        visit(expression.left)
        return visit(expression.right)
      case 'fallback':
        visit(expression.value)
        return visit(expression.otherwise)
      case 'comparison':
        return expression.operands.forEach(visit)
      case 'call': {
        expression.operands.forEach(visit)
        const { binder } = expression
        if (!binder) return
        visit(binder.set)
        if (binder.condition) visit(binder.condition)
        return visit(binder.body)
      }
    }
  }
  for (const statement of statements) {
    spans.push(statement)
    if (statement.kind === 'report') statement.columns.forEach(({ value }) => visit(value))
    else if (statement.kind === 'require' || statement.kind === 'hit') visit(statement.condition)
    else if (statement.kind !== 'at') visit(statement.value)
  }
  return spans
}
