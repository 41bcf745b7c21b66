import type { MovingNumbers } from '../../geometry/moving/movingNumbers.ts'
import type { NormalForm } from '../../geometry/normalForm.ts'
import { MovingCandidate } from '../../observables/movingCandidate.ts'
import { STAGES } from '../../observables/observable.ts'
import { OBSERVABLES } from '../../observables/registry.ts'
import type { CheckedRule } from '../checkedRule.ts'
import { runProgram } from '../evaluate.ts'
import type { Outcome } from '../outcome.ts'
import type { TypedExpression } from '../typed.ts'
import { alignments } from './alignment.ts'
import { isHeldInPlace, isLocal, LiveColumn } from './liveColumn.ts'
import { MovingFrame, movingProgram, type MovingProgram } from './movingProgram.ts'
import { isBounded, isOrderFree, rankingParts } from './orderFree.ts'

/** True when classes are ranked by the stages up to "topology" alone, so that the rule can follow a motion. */
export function isTopological({ program: { source } }: CheckedRule): boolean {
  const last = STAGES.indexOf('topology')
  return rankingParts(source).every(({ stage }) => STAGES.indexOf(stage) <= last)
}

/**
 * What a rule says, all but the report, about a class in motion: columns and folds follow every exchange where they
 * depend on single elements, the rest is computed when asked for. The values are those of `evaluateRule` on the
 * canonical representative, to the bit; where this cannot be had, `outcome` is undefined and the usual road is to
 * be taken.
 *
 * When the polytope has no automorphism but the identity, the class in motion is its own canonical representative
 * and sums of rounded numbers are taken in the same order. Otherwise only rules whose ranking does not depend on
 * the order of elements are followed. What is undefined is left to the usual road (its reason may come from the first
 * element of several), and so are, with automorphisms, shortfalls of `all`, which are means of rounded numbers.
 */
export class MovingEvaluation {
  private readonly program: MovingProgram
  private readonly candidate: MovingCandidate
  private readonly frame: MovingFrame
  private readonly columns: LiveColumn[] = []
  /** 1 for resources that stay from one class to the next. */
  private readonly kept: Uint8Array
  private readonly isFollowed: boolean
  private readonly trustsShortfalls: boolean

  /** @param rule a topological one, see `isTopological` */
  constructor(
    rule: CheckedRule,
    form: NormalForm,
    private readonly moving: MovingNumbers,
  ) {
    const { source } = rule.program
    const inOrder = form.automorphisms.length === 1
    this.isFollowed = inOrder || isOrderFree(source, form.polytope)
    this.trustsShortfalls = inOrder || !source.requires.some(({ condition }) => hasQuantifier(condition))
    this.program = movingProgram(rule.program, isBounded(source, form.polytope))
    this.candidate = new MovingCandidate(form, moving)
    this.frame = new MovingFrame(this.program, moving, this.candidate)
    const { loadables } = this.program
    this.kept = new Uint8Array(loadables.length)
    for (let index = 0; index < loadables.length; index++) {
      const entry = loadables[index]
      if (entry.stage === 'polytope') this.kept[index] = 1
      if (isHeldInPlace(entry)) {
        this.frame.resources[index] = { kind: 'members', lists: entry.members(this.candidate, 1) }
        this.kept[index] = 1
      }
      const alignment = alignments.get(setOf.get(entry) ?? '')
      if (alignment === undefined || !isLocal(entry)) continue
      const column = new LiveColumn(entry, alignment, this.candidate)
      this.columns.push(column)
      this.frame.resources[index] = column.resource
      this.kept[index] = 1
    }
  }

  /** To be called after every exchange of `moving`. */
  exchanged(): void {
    this.candidate.renew()
    for (const column of this.columns) column.exchanged(this.moving, this.candidate)
    this.frame.exchanged()
  }

  /** Undefined: to be evaluated on the canonical representative. */
  outcome(): Outcome | undefined {
    if (!this.isFollowed) return undefined
    this.frame.renew(this.kept)
    const outcome = runProgram(this.program, this.frame, { report: false })
    switch (outcome.kind) {
      case 'feasible':
        return outcome.hitUndefined === undefined ? outcome : undefined
      case 'infeasible':
        return this.trustsShortfalls ? outcome : undefined
      case 'undefined':
        return undefined
    }
  }
}

/** The names of the sets that fields belong to. */
const setOf = new Map<unknown, string>(
  OBSERVABLES.flatMap((set) =>
    set.kind === 'records' ? set.fields.map((field) => [field, set.name] as const) : [],
  ),
)

/** True where a condition's shortfall may be that of an `any` or `all`. */
function hasQuantifier(condition: TypedExpression): boolean {
  switch (condition.kind) {
    case 'not':
      return hasQuantifier(condition.operand)
    case 'let':
      return hasQuantifier(condition.definition)
    case 'logic':
      return hasQuantifier(condition.left) || hasQuantifier(condition.right)
    case 'fold':
      return condition.fold.name === 'any' || condition.fold.name === 'all'
    default:
      return false
  }
}
