import { compareOutcomes, type Outcome } from '../rules/outcome.ts'

/** A candidate of the merged runs, once. */
export interface Contender {
  /** Key of the candidate. */
  readonly key: string
  readonly polytopeKey: string
  /** Under the rule by which the list is ranked; its report plays no part in the order. */
  readonly outcome: Outcome
  /** Key of its basis-independent integers; undefined while they are not known. */
  readonly invariantKey?: string
  /** Values of the columns whose fronts are taken, in their order; null: undefined. */
  readonly columns?: readonly (number | null)[]
}

/** The order of the scoring language; equal scores are ordered by key, so that it is total. */
export function compareContenders(a: Contender, b: Contender): number {
  return compareOutcomes(a.outcome, a.key, b.outcome, b.key)
}

/**
 * Every candidate once, best first. One that several runs found has one value, so which of its entries is kept makes
 * no difference to the order; it is the first in the order given.
 */
export function distinctBest<C extends Contender>(contenders: readonly C[]): C[] {
  const distinct = new Map<string, C>()
  for (const contender of contenders) {
    if (!distinct.has(contender.key)) distinct.set(contender.key, contender)
  }
  return [...distinct.values()].sort(compareContenders)
}
