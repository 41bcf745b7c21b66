import type { Outcome } from '../rules/outcome.ts'
import { heightsOfCode } from './heightsCode.ts'

/** A candidate that a search keeps. */
export interface Find {
  readonly polytopeKey: string
  readonly classKey: string
  readonly outcome: Outcome
  /**
   * Integer heights that give exactly the canonical class (every circuit of a 2-face positive), one per point of
   * the polytope in normal form.
   */
  readonly heights: readonly number[]
}

/** The same inside a state, heights in short. */
export interface KeptFind {
  readonly polytopeKey: string
  readonly classKey: string
  readonly outcome: Outcome
  readonly heights: string
}

export function findOf({ polytopeKey, classKey, outcome, heights }: KeptFind): Find {
  return { polytopeKey, classKey, outcome, heights: [...heightsOfCode(heights)] }
}
