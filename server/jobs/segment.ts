import type { HistogramState, SampledRow, SurrogateReport } from '../../scoring/index.ts'
import type { OutcomeView } from '../../shared/outcomes.ts'
import type { SearchProblem } from './searchProblem.ts'

/** A piece of one island's run. How a run is cut into segments never changes its result. */
export interface SegmentInput {
  readonly problem: SearchProblem
  /** JSON text of the state after the segment before; null at the beginning. */
  readonly state: string | null
  /** Evaluations to make at most, and the time after which no other is begun. */
  readonly evaluations: number
  readonly milliseconds: number
}

export interface SegmentFind {
  readonly candidateKey: string
  readonly polytopeKey: string
  readonly heights: readonly number[]
  readonly outcome: OutcomeView
}

/** What is known of one island after a segment. */
export interface IslandProgress {
  /** Evaluations that the island is going to make at most; absent in progress stored by earlier versions. */
  readonly budget?: number
  /** Evaluations of candidates that the search was given; absent in progress stored by earlier versions. */
  readonly given?: number
  readonly evaluations: number
  readonly proposals: number
  readonly accepted: number
  readonly restarts: number
  readonly feasible: number
  readonly infeasible: number
  readonly undefined: number
  /** Candidates that the rule's own hit line holds for; absent in progress stored by earlier versions. */
  readonly hits?: number
  readonly best: number | null
  readonly bestKey: string | null
  /** Best so far over this island's evaluations. */
  readonly curve: readonly (readonly [number, number])[]
  readonly exhausted: boolean
  /** Null where the search has none; absent in progress stored by earlier versions. */
  readonly surrogate?: SurrogateReport | null
  /** Scores of the feasible candidates; absent in progress stored by earlier versions. */
  readonly histogram?: HistogramState
}

export interface SegmentOutput {
  readonly state: string
  readonly progress: IslandProgress
  readonly done: boolean
  /** Candidates that entered the island's list of the best in this segment and are still on it, best first. */
  readonly finds: readonly SegmentFind[]
  /** Rows that entered the island's uniform sample of evaluations in this segment and are still in it. */
  readonly sampled: readonly SampledRow[]
  /** Time the segment took on its thread. */
  readonly milliseconds: number
}
