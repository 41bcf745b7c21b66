import { STAGES } from '../observables/observable.ts'
import type { Outcome } from '../rules/outcome.ts'

/**
 * What orders candidates, in two numbers: first `kind`, then `value`, larger is better. Kind 1 is undefined,
 * 2 + n infeasible at stage n (value: minus the shortfall), `feasibleKind` feasible (value: the score).
 */
export interface Merit {
  readonly kind: number
  readonly value: number
}

export const undefinedKind = 1
export const feasibleKind = 2 + STAGES.length

/** In the table of classes seen only: the class is not regular, hence no candidate. */
export const irregularKind = 255

export function meritOf(outcome: Outcome): Merit {
  switch (outcome.kind) {
    case 'feasible':
      return { kind: feasibleKind, value: outcome.score }
    case 'infeasible':
      return { kind: 2 + STAGES.indexOf(outcome.stage), value: -outcome.shortfall }
    case 'undefined':
      return { kind: undefinedKind, value: 0 }
  }
}

/** Negative when a is better. */
export function compareMerits(a: Merit, b: Merit): number {
  return b.kind - a.kind || (a.value === b.value ? 0 : a.value > b.value ? -1 : 1)
}
