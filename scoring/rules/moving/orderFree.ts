import type { Polytope } from '../../geometry/polytope.ts'
import { RULE_LIMITS } from '../limits.ts'
import type { ProgramSource } from '../program.ts'
import type { FoldSource, TypedExpression } from '../typed.ts'

/** What of a rule a search asks for every class: all but the report. */
export const rankingParts = ({ requires, score, hit }: ProgramSource): readonly TypedExpression[] => [
  ...requires.map(({ condition }) => condition),
  score,
  ...(hit === undefined ? [] : [hit]),
]

/** The parts of an expression, `let` definitions included. */
export function partsOf(expression: TypedExpression): readonly TypedExpression[] {
  switch (expression.kind) {
    case 'let':
      return [expression.definition]
    case 'field':
      return [expression.target]
    case 'negation':
    case 'not':
      return [expression.operand]
    case 'arithmetic':
    case 'logic':
      return [expression.left, expression.right]
    case 'fallback':
      return [expression.value, expression.otherwise]
    case 'comparison':
    case 'function':
    case 'relation':
      return expression.operands
    case 'fold': {
      const { source, order, condition, body } = expression
      return [source.kind === 'members' ? source.target : undefined, order, condition, body].filter(
        (part) => part !== undefined,
      )
    }
    default:
      return []
  }
}

/** True when something holds for the expression or a part of it. */
export const somewhere = (expression: TypedExpression, holds: (part: TypedExpression) => boolean): boolean =>
  holds(expression) || partsOf(expression).some((part) => somewhere(part, holds))

/**
 * True when the ranking of a candidate of this polytope comes out the same to the bit in whatever order elements
 * are visited: no sum nor mean of rounded numbers, and no way to the limit on steps, which is reached sooner or
 * later according to which element decides. What is undefined, or falls short, is left to the usual road.
 */
export function isOrderFree(source: ProgramSource, polytope: Polytope): boolean {
  const parts = rankingParts(source)
  const rounded = parts.some((part) =>
    somewhere(
      part,
      (each) =>
        each.kind === 'fold' &&
        (each.fold.name === 'sum' || each.fold.name === 'mean') &&
        each.body.type !== 'integer',
    ),
  )
  return !rounded && isBounded(source, polytope)
}

/** True when no candidate of this polytope takes a rule's ranking to the limit on steps. */
export function isBounded(source: ProgramSource, polytope: Polytope): boolean {
  const steps = rankingParts(source).reduce((sum, part) => sum + mostSteps(part, polytope), 0)
  return steps <= RULE_LIMITS.steps
}

/** No evaluation takes more steps than this. */
function mostSteps(expression: TypedExpression, polytope: Polytope): number {
  const inside = partsOf(expression).reduce((sum, part) => sum + mostSteps(part, polytope), 0)
  if (expression.kind !== 'fold') return inside
  const { source, condition, body } = expression
  return mostElements(source, polytope) * (1 + body.weight + (condition?.weight ?? 0) + inside)
}

/** No set that a rule can run through up to the stage "topology" has more elements than this. */
function mostElements(
  { set }: FoldSource,
  { pointCount, components, twoFaces, latticePoints }: Polytope,
): number {
  const triangles = twoFaces.reduce((sum, { area }) => sum + area, 0)
  switch (set.name) {
    case 'divisors':
      return pointCount
    case 'components':
      return components.reduce((sum, count) => sum + count, 0)
    case 'triples':
    case 'triangles':
      return triangles
    case 'curves':
      return 3 * triangles
    case 'pairs':
      return 6 * triangles
    case 'faces':
      return twoFaces.length
    default:
      // Reflexive sections and fibrations on them: spanned by three lattice points at most.
      return latticePoints ** 3
  }
}
