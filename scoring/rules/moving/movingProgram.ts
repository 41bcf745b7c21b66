import type { MovingNumbers } from '../../geometry/moving/movingNumbers.ts'
import type { Candidate } from '../../observables/candidate.ts'
import type { Compiler, Evaluate } from '../compile.ts'
import { compileFold, compileSource } from '../compileFold.ts'
import { Frame } from '../frame.ts'
import { RULE_LIMITS } from '../limits.ts'
import { compileProgram, type Program } from '../program.ts'
import type { TypedExpression, TypedFold } from '../typed.ts'
import { alignments, type Alignment } from './alignment.ts'
import { isHeldInPlace, isLocal } from './liveColumn.ts'
import { LiveFold, type Dependence, type ElementParts, type LiveFoldName } from './liveFold.ts'
import { partsOf } from './orderFree.ts'

/** A fold that can follow exchanges, with the closure that computes it whole. */
interface FollowedFold {
  readonly parts: ElementParts
  readonly alignment: Alignment
  readonly whole: Evaluate
}

/** The ranking part of a program, with folds that follow exchanges. Runs in a `MovingFrame` only. */
export interface MovingProgram extends Program {
  readonly followed: readonly FollowedFold[]
}

const known = { bounded: new WeakMap<Program, MovingProgram>(), other: new WeakMap<Program, MovingProgram>() }

/**
 * The moving form of a program, without the report; compiled once.
 *
 * @param bounded no candidate comes to the limit on steps: then folds with folds inside may follow, too, whose steps
 *   are not those of the usual road
 */
export function movingProgram(program: Program, bounded: boolean): MovingProgram {
  const programs = known[bounded ? 'bounded' : 'other']
  let moving = programs.get(program)
  if (moving === undefined) {
    const followed: FollowedFold[] = []
    const compiled = compileProgram({ ...program.source, columns: [] }, (compiler, expression) => {
      const dependence = dependenceOf(expression, bounded)
      return dependence && follow(compiler, expression, dependence, followed)
    })
    moving = { ...compiled, followed }
    programs.set(program, moving)
  }
  return moving
}

/** A frame that lives as long as a motion and keeps the folds that follow it. */
export class MovingFrame extends Frame {
  private readonly folds: (LiveFold | undefined)[]

  constructor(
    private readonly program: MovingProgram,
    private readonly moving: MovingNumbers,
    candidate: Candidate,
  ) {
    super(candidate, program.layout, RULE_LIMITS.steps)
    this.folds = program.followed.map(() => undefined)
  }

  fold(index: number): number {
    const { parts, alignment, whole } = this.program.followed[index]
    const fold = (this.folds[index] ??= new LiveFold(parts, alignment, this.moving, this))
    return fold.broken ? whole(this) : fold.value()
  }

  /** To be called after every exchange, when the columns have followed it. */
  exchanged(): void {
    // Folds inside others count steps here that no evaluation takes.
    this.steps = 0
    for (const fold of this.folds) fold?.exchanged(this.moving, this)
  }
}

function follow(
  compiler: Compiler,
  expression: TypedFold,
  dependence: Dependence,
  followed: FollowedFold[],
): Evaluate {
  const { slot, condition, body, source } = expression
  const index = followed.length
  const { open, parts } = compiler.inside(() => ({
    // Counts the steps as if the elements were visited, so that the limit is the same.
    open: compileSource(compiler, expression),
    parts: {
      dependence,
      name: expression.fold.name as LiveFoldName,
      slot,
      condition: condition && compiler.compile(condition),
      body: compiler.compile(body),
    },
  }))
  const alignment = alignments.get(source.set.name) as Alignment
  followed.push({ parts, alignment, whole: compileFold(compiler, expression) })
  return (frame) => (open(frame) ? (frame as MovingFrame).fold(index) : NaN)
}

/**
 * For a fold over one of the sets that exchanges rearrange, whose value does not depend on the order of the elements:
 * what condition and body depend on, beside the polytope. Undefined when that is more than can be followed.
 */
function dependenceOf(expression: TypedFold, bounded: boolean): Dependence | undefined {
  const { source, open, slot, condition, body } = expression
  if (open || source.kind !== 'set' || !alignments.has(source.set.name) || !isOrderless(expression))
    return undefined
  const parts = condition === undefined ? [body] : [condition, body]
  if (parts.every((part) => isOwn(part, slot))) return 'own'
  return bounded && parts.every((part) => isIncident(part, [slot])) ? 'incident' : undefined
}

const isOrderless = ({ fold, body }: TypedFold): boolean =>
  fold.name !== 'quantile' && !((fold.name === 'sum' || fold.name === 'mean') && body.type !== 'integer')

/** Depends on the element's own numbers only. */
function isOwn(expression: TypedExpression, slot: number): boolean {
  switch (expression.kind) {
    case 'element':
      return expression.slot === slot
    case 'field': {
      const { field, target } = expression
      const ofElement = target.kind === 'element' && isLocal(field)
      return (ofElement || field.stage === 'polytope') && isOwn(target, slot)
    }
    default:
      return isPlain(expression, (part) => isOwn(part, slot))
  }
}

/** Depends on numbers of the element and of the divisors that belong to it: its members, or ends of a pair. */
function isIncident(expression: TypedExpression, slots: readonly number[]): boolean {
  switch (expression.kind) {
    case 'element':
      return slots.includes(expression.slot)
    case 'field':
      return (
        (isLocal(expression.field) || expression.field.stage === 'polytope') &&
        isIncident(expression.target, slots)
      )
    case 'fold': {
      const { source, slot, condition, body } = expression
      if (source.kind !== 'members' || !isHeldInPlace(source.field) || !isOrderless(expression)) return false
      const parts = condition === undefined ? [source.target, body] : [source.target, condition, body]
      return parts.every((part) => isIncident(part, [...slots, slot]))
    }
    default:
      return isPlain(expression, (part) => isIncident(part, slots))
  }
}

function isPlain(expression: TypedExpression, holds: (part: TypedExpression) => boolean): boolean {
  switch (expression.kind) {
    case 'constant':
      return true
    case 'negation':
    case 'not':
    case 'arithmetic':
    case 'logic':
    case 'fallback':
    case 'comparison':
    case 'function':
      return partsOf(expression).every(holds)
    default:
      return !expression.open && expression.stage === 'polytope'
  }
}
