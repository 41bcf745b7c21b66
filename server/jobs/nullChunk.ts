import type { NullSummary } from '../../shared/nullSamples.ts'
import type { ProblemPolytope } from './searchProblem.ts'

export interface NullProblem {
  readonly rule: string
  readonly polytopes: readonly ProblemPolytope[]
  readonly seed: number
  readonly size: number
}

/** A piece of a null sample; the cut never changes the sample. */
export interface NullChunkInput {
  readonly problem: NullProblem
  /** JSON text of the state after the piece before; null at the beginning. */
  readonly state: string | null
  readonly evaluations: number
}

export interface NullChunkOutput {
  readonly state: string
  readonly summary: NullSummary
  readonly done: boolean
  readonly milliseconds: number
}
