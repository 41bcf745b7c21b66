import { feasibleKind, undefinedKind, type Merit } from './merit.ts'

/** Temperatures of one moment: of scores, and of shortfalls. */
export interface Temperatures {
  readonly score: number
  readonly shortfall: number
}

/**
 * Metropolis' rule on the combined order of candidates. A step that is not worse is always taken. A worse one
 * costs: between feasible ones, the loss of score in units of its temperature; between infeasible ones of the
 * same stage, the growth of the shortfall in units of its own; towards an earlier failing stage (from feasible to
 * infeasible, too), one per stage and the new shortfall, in the same units. It is taken with probability
 * exp(-cost). From a defined candidate to an undefined one: never.
 *
 * @param draw uniform in [0, 1)
 */
export function isAccepted(
  current: Merit,
  proposed: Merit,
  temperatures: Temperatures,
  draw: number,
): boolean {
  return draw < Math.exp(-stepCost(current, proposed, temperatures))
}

/** The cost of a step; 0 for one that is not worse. */
export function stepCost(current: Merit, proposed: Merit, { score, shortfall }: Temperatures): number {
  if (proposed.kind > current.kind) return 0
  if (proposed.kind === current.kind) {
    const loss = current.value - proposed.value
    if (loss <= 0) return 0
    return loss / (current.kind === feasibleKind ? score : shortfall)
  }
  if (proposed.kind === undefinedKind) return Infinity
  return (current.kind - proposed.kind - proposed.value) / shortfall
}
