import { InputError } from '../errors.ts'
import { ruleOfInput } from '../evaluation/input.ts'
import type { Hodge } from '../geometry/polytope.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import type { Outcome } from '../rules/outcome.ts'
import { advance, type Segment, startState, type SegmentOptions } from './advance.ts'
import { OutcomeMemo } from './memo.ts'
import { isMethodName, methodNames } from './methods.ts'
import { nullProblem, nullSummary, type NullSummary } from './nullSample.ts'
import { FormCache, polytopeSource, type PolytopeEntry, type PolytopeSource } from './polytopeSource.ts'
import type { SearchProblem } from './problem.ts'
import { searchSettingsSchema, type SearchSettings } from './settings.ts'
import type { GivenStart } from './givenStarts.ts'
import { CandidateCache, type TimedEvaluation } from './candidateCache.ts'
import type { Clock, StageCosts } from './stageClock.ts'
import { stateShape, type SearchState } from './state.ts'

/** Why a job could not be done; for people (`rule.*`, `state.*`, ...) or a bug of ours (`engine.failed`). */
export interface JobError {
  readonly code: string
  readonly message: string
  /** For the log, when it is a bug. */
  readonly stack?: string
}

/** One segment of one island, as plain data: what a worker thread or a queue carries. */
export interface SegmentInput {
  readonly polytopes: readonly PolytopeEntry[]
  readonly ruleText: string
  readonly method: string
  readonly settings: Partial<SearchSettings> & Pick<SearchSettings, 'budget'>
  /** See `SearchProblem`. */
  readonly starts?: readonly GivenStart[]
  readonly extensions?: readonly number[]
  /** Null: begin, with this seed and island. */
  readonly state: SearchState | null
  readonly seed: number
  readonly island: number
  /** Evaluations of this segment. */
  readonly evaluations: number
  /** Proposals after which the segment ends in any case. */
  readonly proposals?: number
  /** Also give the rows that entered the uniform sample, with their heights. */
  readonly sampled?: boolean
}

export type SegmentOutput = Segment | { readonly error: JobError }

/** One portion of a preview or null sample, as plain data. */
export interface PreviewInput {
  readonly polytopes: readonly PolytopeEntry[]
  readonly ruleText: string
  /** Candidates of the whole sample. */
  readonly size: number
  readonly seed: number
  readonly state: SearchState | null
  /** Candidates of this portion. */
  readonly count: number
}

/** A candidate of a preview, with what each stage of it cost in the clock's unit. */
export interface PreviewRow extends Pick<Hodge, 'h11' | 'h21'> {
  readonly polytopeKey: string
  readonly classKey: string
  readonly outcome: Outcome
  /** As in `Find`. */
  readonly heights: readonly number[]
  readonly costs: StageCosts
}

export type PreviewOutput =
  | { readonly state: SearchState; readonly rows: readonly PreviewRow[]; readonly summary: NullSummary }
  | { readonly error: JobError }

/**
 * What a worker keeps from one job to the next: polytopes already built, the rule already read, outcomes already
 * known. It spares time and alters no result; a job without it gives the same output.
 */
export class JobSession {
  private readonly forms = new FormCache()
  private readonly sources = new WeakMap<readonly PolytopeEntry[], PolytopeSource>()
  private rule: { readonly text: string; readonly rule: CheckedRule; readonly memo: OutcomeMemo } | undefined

  /** The source of a list of entries; the same for the same list (the same array, not changed in between). */
  sourceOf(entries: readonly PolytopeEntry[]): PolytopeSource {
    let source = this.sources.get(entries)
    if (source === undefined) {
      source = polytopeSource(entries, this.forms)
      this.sources.set(entries, source)
    }
    return source
  }

  /** @throws InputError with the first error of the rule */
  ruleOf(text: string): { readonly rule: CheckedRule; readonly memo: OutcomeMemo } {
    if (this.rule?.text !== text) this.rule = { text, rule: ruleOfInput(text), memo: new OutcomeMemo() }
    return this.rule
  }
}

/** Settings with their defaults. @throws InputError naming the first that is wrong */
export function checkedSettings(settings: unknown): SearchSettings {
  const parsed = searchSettingsSchema.safeParse(settings)
  if (parsed.success) return parsed.data
  const [issue] = parsed.error.issues
  const path = issue.path.map(String).join('.')
  throw new InputError('search.settings', `settings.${path}: ${issue.message}`, `settings.${path}`)
}

/** Carries one island on by one segment, of the length that `enough` gives; `session` only spares time. */
export function segmentJob(
  input: SegmentInput,
  session = new JobSession(),
  enough?: SegmentOptions['enough'],
): SegmentOutput {
  return guarded(() => {
    if (!isMethodName(input.method)) {
      throw new InputError(
        'search.method',
        `There is no method ${JSON.stringify(input.method)}; use one of ${methodNames.join(', ')}.`,
        'method',
        input.method,
      )
    }
    const { rule, memo } = session.ruleOf(input.ruleText)
    const problem: SearchProblem = {
      polytopes: session.sourceOf(input.polytopes),
      rule,
      method: input.method,
      settings: checkedSettings(input.settings),
      starts: input.starts ?? [],
      extensions: input.extensions ?? [],
    }
    const state =
      input.state === null ? startState(problem, input.seed, input.island) : checkedState(input.state)
    const { evaluations, proposals, sampled } = input
    return advance(problem, state, evaluations, { memo, proposals, sampled, enough })
  })
}

/**
 * Evaluates the next candidates of a preview: the null sample's own run, candidate by candidate.
 * @param clock times the stages; without one all costs are 0
 * @param candidates keeps stages for the next rule
 */
export function previewChunk(
  input: PreviewInput,
  session = new JobSession(),
  clock: Clock = () => 0,
  enough?: SegmentOptions['enough'],
  candidates = new CandidateCache(0),
): PreviewOutput {
  return guarded(() => {
    const { rule, memo } = session.ruleOf(input.ruleText)
    const problem = nullProblem({ polytopes: session.sourceOf(input.polytopes), rule }, input.size)
    const rows: PreviewRow[] = []
    let timed: TimedEvaluation | undefined
    const before = input.state === null ? startState(problem, input.seed) : checkedState(input.state)
    const { state } = advance(problem, before, input.count, {
      memo,
      enough,
      instrument: (candidate) => {
        timed = candidates.timed(candidate, clock)
        return timed.candidate
      },
      observe: ({ form, classKey, outcome, heights }) => {
        const { h11, h21 } = form.polytope.hodge
        const costs = timed?.costs() ?? {}
        rows.push({ polytopeKey: form.key, classKey, h11, h21, outcome, heights: [...heights()], costs })
        timed = undefined
      },
    })
    return { state, rows, summary: nullSummary(state, rule) }
  })
}

function checkedState(state: SearchState): SearchState {
  const parsed = stateShape.safeParse(state)
  if (parsed.success) return state
  throw new InputError('state.damaged', 'This is no search state of this version.', 'state')
}

function guarded<T>(run: () => T): T | { readonly error: JobError } {
  try {
    return run()
  } catch (error) {
    if (error instanceof InputError) return { error: { code: error.code, message: error.message } }
    if (!(error instanceof Error)) return { error: { code: 'engine.failed', message: String(error) } }
    return { error: { code: 'engine.failed', message: error.message, stack: error.stack } }
  }
}
