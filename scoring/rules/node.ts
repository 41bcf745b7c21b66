import { type Stage, STAGES } from '../observables/observable.ts'
import type { Span } from './ast.ts'
import type { Type, TypedExpression, TypedNode } from './typed.ts'

/** The later of two stages. */
export const later = (a: Stage, b: Stage): Stage => (STAGES.indexOf(a) >= STAGES.indexOf(b) ? a : b)

/** What a node inherits from its parts. */
export function nodeOf(
  span: Span,
  type: Type,
  parts: readonly TypedExpression[],
  stage: Stage = 'polytope',
): TypedNode {
  return {
    from: span.from,
    to: span.to,
    type,
    stage: parts.reduce<Stage>((latest, part) => later(latest, part.stage), stage),
    weight: parts.reduce((weight, part) => weight + part.weight, 1),
    open: parts.some((part) => part.open),
    basisDependent: parts.some((part) => part.basisDependent),
  }
}

/** Stands for an expression with an error that has been reported. */
export const unknownNode = (span: Span): TypedExpression => ({
  ...nodeOf(span, 'unknown', []),
  kind: 'unknown',
})
