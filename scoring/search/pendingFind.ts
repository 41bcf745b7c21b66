import type { CanonicalClass } from '../geometry/classKey.ts'
import type { Outcome } from '../rules/outcome.ts'
import type { KeptFind } from './find.ts'
import { codeOfHeights } from './heightsCode.ts'

/** What a candidate on the list of the best can still be asked for. */
export interface PendingParts {
  canonical(): CanonicalClass
  /** With the report. */
  outcome(): Outcome
  /** Witness of the canonical class. */
  heights(): Float64Array
}

/**
 * A candidate on the list of the best of which only the outcome is known so far: most are pushed out again before
 * anybody asks for their key and heights, which take much longer.
 */
export class PendingFind implements KeptFind {
  /** @param outcome may lack the report */
  constructor(
    readonly polytopeKey: string,
    readonly outcome: Outcome,
    private readonly parts: PendingParts,
  ) {}

  get classKey(): string {
    return this.parts.canonical().key
  }

  get heights(): string {
    return codeOfHeights(this.parts.heights())
  }

  /** The same as plain data. */
  settled(): KeptFind {
    const { polytopeKey, classKey, heights } = this
    return { polytopeKey, classKey, outcome: this.parts.outcome(), heights }
  }
}
