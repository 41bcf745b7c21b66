import type { Outcome } from '../rules/outcome.ts'
import { withStep, type Curve } from './curve.ts'
import { Histogram } from './histogram.ts'
import type { SearchState } from './state.ts'

/** Reasons of undefined candidates that are kept apart. */
const mostReasons = 20

type TallyState = Pick<
  SearchState,
  | 'feasible'
  | 'infeasible'
  | 'undefined'
  | 'hits'
  | 'hitsUndefined'
  | 'reasons'
  | 'failures'
  | 'curve'
  | 'histogram'
>

/** What the evaluations of an island came to: outcomes by kind, hits, scores, and why there was none. */
export class Tally {
  private feasible: number
  private infeasible: number
  private undefined: number
  private hits: number
  private hitsUndefined: number
  private readonly reasons: Map<string, number>
  private readonly failures: Map<string, number>
  private curve: Curve
  private readonly histogram: Histogram

  constructor(state: TallyState) {
    this.feasible = state.feasible
    this.infeasible = state.infeasible
    this.undefined = state.undefined
    this.hits = state.hits
    this.hitsUndefined = state.hitsUndefined
    this.reasons = new Map(state.reasons)
    this.failures = new Map(state.failures)
    this.curve = state.curve
    this.histogram = new Histogram(state.histogram)
  }

  state(): TallyState {
    return {
      feasible: this.feasible,
      infeasible: this.infeasible,
      undefined: this.undefined,
      hits: this.hits,
      hitsUndefined: this.hitsUndefined,
      reasons: [...this.reasons],
      failures: [...this.failures],
      curve: this.curve,
      histogram: this.histogram.state(),
    }
  }

  /**
   * @param evaluations how many there are with this one
   * @param isGiven the run was given the candidate: it is no find, so it counts neither as a hit nor among the scores
   */
  count(outcome: Outcome, evaluations: number, isGiven: boolean): void {
    switch (outcome.kind) {
      case 'feasible':
        this.feasible++
        if (outcome.hit === true && !isGiven) this.hits++
        if (outcome.hitUndefined !== undefined) this.hitsUndefined++
        if (!isGiven) this.histogram.add(outcome.score)
        if (this.curve.length === 0 || outcome.score > this.curve[this.curve.length - 1][1])
          this.curve = withStep(this.curve, evaluations, outcome.score)
        break
      case 'infeasible':
        this.infeasible++
        for (const { label } of outcome.failed) this.failures.set(label, (this.failures.get(label) ?? 0) + 1)
        break
      case 'undefined':
        this.undefined++
        if (this.reasons.has(outcome.reason) || this.reasons.size < mostReasons)
          this.reasons.set(outcome.reason, (this.reasons.get(outcome.reason) ?? 0) + 1)
    }
  }
}
