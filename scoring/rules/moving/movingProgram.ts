import type { MovingNumbers } from '../../geometry/moving/movingNumbers.ts'
import type { Candidate } from '../../observables/candidate.ts'
import type { Compiler, Evaluate } from '../compile.ts'
import { compileFold, compileSource } from '../compileFold.ts'
import { Frame } from '../frame.ts'
import { RULE_LIMITS } from '../limits.ts'
import { compileProgram, type Program } from '../program.ts'
import type { TypedExpression, TypedFold } from '../typed.ts'
import { alignments, type Alignment } from './alignment.ts'
import { isLocal } from './liveColumn.ts'
import { LiveFold, type ElementParts, type LiveFoldName } from './liveFold.ts'
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

const known = new WeakMap<Program, MovingProgram>()

/** The moving form of a program, without the report; compiled once. */
export function movingProgram(program: Program): MovingProgram {
  let moving = known.get(program)
  if (moving === undefined) {
    const followed: FollowedFold[] = []
    const compiled = compileProgram({ ...program.source, columns: [] }, (compiler, expression) =>
      isFollowed(expression) ? follow(compiler, expression, followed) : undefined,
    )
    moving = { ...compiled, followed }
    known.set(program, moving)
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
    for (const fold of this.folds) fold?.exchanged(this.moving, this)
  }
}

function follow(compiler: Compiler, expression: TypedFold, followed: FollowedFold[]): Evaluate {
  const { slot, condition, body, source } = expression
  const index = followed.length
  const { open, parts } = compiler.inside(() => ({
    // Counts the steps as if the elements were visited, so that the limit is the same.
    open: compileSource(compiler, expression),
    parts: {
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
 * A fold over one of the sets that exchanges rearrange, whose condition and body depend on the element's own numbers
 * and on the polytope only, and which does not depend on the order of the elements.
 */
function isFollowed({ fold, source, open, slot, condition, body }: TypedFold): boolean {
  if (open || source.kind !== 'set' || !alignments.has(source.set.name) || fold.name === 'quantile')
    return false
  if ((fold.name === 'sum' || fold.name === 'mean') && body.type !== 'integer') return false
  return isOwn(body, slot) && (condition === undefined || isOwn(condition, slot))
}

function isOwn(expression: TypedExpression, slot: number): boolean {
  switch (expression.kind) {
    case 'constant':
      return true
    case 'element':
      return expression.slot === slot
    case 'field': {
      const { field, target } = expression
      const ofElement = target.kind === 'element' && isLocal(field)
      return (ofElement || field.stage === 'polytope') && isOwn(target, slot)
    }
    case 'negation':
    case 'not':
    case 'arithmetic':
    case 'logic':
    case 'fallback':
    case 'comparison':
    case 'function':
      return partsOf(expression).every((part) => isOwn(part, slot))
    default:
      return !expression.open && expression.stage === 'polytope'
  }
}
