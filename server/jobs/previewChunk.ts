import type { Preview } from '../../shared/targets.ts'
import type { NullProblem } from './nullChunk.ts'
import type { SegmentFind } from './segment.ts'

/** A piece of a preview: a null sample of a rule that is still being written. */
export interface PreviewChunkInput {
  readonly problem: NullProblem
  readonly state: string | null
  /** Time after which the piece ends; at least one candidate is evaluated. */
  readonly milliseconds: number
}

export interface PreviewChunkOutput {
  readonly state: string
  readonly preview: Omit<Preview, 'id' | 'state' | 'message'>
  readonly done: boolean
  /** The candidates shown, so that their pages can be opened. */
  readonly shown: readonly SegmentFind[]
}
