import type { NullSummary } from '../../shared/nullSamples.ts'
import type { ScoredRow } from '../../shared/outcomes.ts'
import type { NullProblem } from './searchProblem.ts'

/** A piece of a null sample; the cut never changes the sample. */
export interface NullChunkInput {
  readonly problem: NullProblem
  /** JSON text of the state after the piece before; null at the beginning. */
  readonly state: string | null
  /** Candidates of this piece at most, and the time after which no other is begun. */
  readonly evaluations: number
  readonly milliseconds: number
}

export interface NullChunkOutput {
  readonly state: string
  readonly summary: NullSummary
  readonly done: boolean
  /** Time the piece took on its thread. */
  readonly milliseconds: number
}

/** One candidate of a preview. */
export interface PreviewRow extends ScoredRow {
  readonly heights: readonly number[]
  /** Milliseconds per stage. */
  readonly costs: Readonly<Record<string, number>>
}

/** A piece of a null sample with its candidates one by one. */
export interface PreviewChunkOutput extends NullChunkOutput {
  readonly rows: readonly PreviewRow[]
}
