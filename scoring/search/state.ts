import { z } from 'zod'
import type { KeptFind } from './find.ts'
import type { Curve } from './curve.ts'
import type { ExtendedState } from './extensions.ts'
import type { HistogramState } from './histogram.ts'
import type { GeneratorState } from './randomStream.ts'
import type { ReservoirState } from './reservoir.ts'
import type { SurrogateState } from './surrogate/surrogate.ts'
import type { SeenTableState } from './seenTable.ts'
import type { GivenState } from './givenStarts.ts'

/** Any plain JSON value. */
export type Json = string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json }

/** Why a run ended before its budget was used. */
export type RunEnd =
  /** No new class in as many proposals in a row as `patience` says, on every polytope of the scope. */
  | 'space-exhausted'
  /** The rule's requirements on the polytope turn every polytope of the scope away. */
  | 'no-polytope-passes'

/** One row of the uniform sample of evaluations. */
export interface SampleRow {
  readonly polytopeKey: string
  readonly classKey: string
  /** See `Merit`. */
  readonly kind: number
  readonly value: number
}

/**
 * The same on its way out of a segment, with heights that give the canonical class (see `codeOfHeights`). They are
 * no part of a state: at h11 = 491 those of 256 rows would take a third of it.
 */
export interface SampledRow extends SampleRow {
  /** Which row of the sample this is; a later row of the same place has taken its place. */
  readonly place: number
  readonly heights: string
}

/** What a run has counted. */
export interface SearchCounts {
  /** Classes scored, distinct as far as the table of classes seen knows. */
  readonly evaluations: number
  /** Classes looked at, known ones included. */
  readonly proposals: number
  /** Moves taken. */
  readonly accepted: number
  /** Fresh starts after the first. */
  readonly restarts: number
  readonly feasible: number
  readonly infeasible: number
  readonly undefined: number
  /** Candidates that the rule's own `hit` holds for, given ones left out, and those it is undefined for. */
  readonly hits: number
  readonly hitsUndefined: number
}

/** One island's whole state: plain JSON. The same problem and state always continue in the same way. */
export interface SearchState extends SearchCounts {
  readonly schema: 'tessellary.state/1'
  /** See `problemDigest`. */
  readonly problem: string
  readonly method: string
  readonly seed: number
  readonly island: number
  /** This island's share of the budget. */
  readonly budget: number
  readonly generator: GeneratorState
  /** Proposals in a row without a new class. */
  readonly stalled: number
  readonly ended: RunEnd | null
  /** Reasons of undefined candidates, the first 20 that came up, with how many had each. */
  readonly reasons: readonly (readonly [string, number])[]
  /** How many infeasible candidates failed at each requirement, by label. */
  readonly failures: readonly (readonly [string, number])[]
  readonly curve: Curve
  readonly histogram: HistogramState
  /** Uniform over the evaluations, given candidates left out. */
  readonly sample: ReservoirState<SampleRow>
  readonly top: readonly KeptFind[]
  readonly seen: SeenTableState
  /** What the surrogate has learnt; null where the run has none. */
  readonly surrogate: SurrogateState | null
  /** The method's own. */
  readonly chain: Json
  /** Absent where the search was given no candidates. */
  readonly given?: GivenState
  /** Absent until an extension takes effect. */
  readonly extended?: ExtendedState
}

/** Enough to refuse what is no state; its problem is compared by digest. */
export const stateShape = z.looseObject({
  schema: z.literal('tessellary.state/1'),
  problem: z.string(),
  generator: z.tuple([z.number(), z.number(), z.number(), z.number()]),
})
