import { type Stage, STAGES } from '../observables/observable.ts'

/** One cell of a report: a value, or nothing with a reason. */
export type Cell = { readonly value: number | boolean } | { readonly value: null; readonly reason: string }

/** All requirements hold and the score is defined. */
export interface Feasible {
  readonly kind: 'feasible'
  readonly score: number
  /** Null when the rule has no `hit`, or it is undefined here (then `hitUndefined` says why). */
  readonly hit: boolean | null
  readonly hitUndefined?: string
  readonly report: Readonly<Record<string, Cell>>
}

/** Some requirement fails; those of later stages were not looked at. */
export interface Infeasible {
  readonly kind: 'infeasible'
  /** The first stage with a failing requirement. */
  readonly stage: Stage
  /** How far its requirements are from holding, added up. */
  readonly shortfall: number
  readonly failed: readonly { readonly label: string; readonly shortfall: number }[]
}

/** A requirement or the score has no value. */
export interface Undefined {
  readonly kind: 'undefined'
  readonly reason: string
  readonly stage: Stage
}

/** What a rule says about a candidate. Plain data. */
export type Outcome = Feasible | Infeasible | Undefined

const RANK = { feasible: 0, infeasible: 1, undefined: 2 } as const

/**
 * The order of candidates, better first (negative when a is better): feasible ones by falling score; then
 * infeasible ones, a later failing stage first, then the smaller shortfall (after Deb 2000); undefined ones
 * last; ties by class key.
 */
export function compareOutcomes(a: Outcome, keyA: string, b: Outcome, keyB: string): number {
  if (a.kind !== b.kind) return RANK[a.kind] - RANK[b.kind]
  if (a.kind === 'feasible' && b.kind === 'feasible' && a.score !== b.score) return a.score > b.score ? -1 : 1
  if (a.kind === 'infeasible' && b.kind === 'infeasible') {
    if (a.stage !== b.stage) return STAGES.indexOf(b.stage) - STAGES.indexOf(a.stage)
    if (a.shortfall !== b.shortfall) return a.shortfall - b.shortfall
  }
  return keyA < keyB ? -1 : keyA > keyB ? 1 : 0
}
