import {
  CandidateCache,
  facetGenericHeights,
  InputError,
  JobSession,
  previewChunk as previewJob,
  segmentJob,
  type Find,
  type GivenStart,
  type PolytopeEntry,
  type PolytopeSource,
  type SearchState,
} from '../../../scoring/index.ts'
import type { NullChunkInput, NullChunkOutput, PreviewChunkOutput } from '../nullChunk.ts'
import type { SegmentFind, SegmentInput, SegmentOutput } from '../segment.ts'
import { outcomeView } from './outcomeView.ts'
import { pieceLength } from './pieceLength.ts'

/** What this thread keeps between jobs; it spares time and alters no result. */
const session = new JobSession()
const scopes = new Map<string, readonly PolytopeEntry[]>()
const starts = new Map<string, readonly GivenStart[]>()

/** Carries one island of a search on. */
export function searchSegment({ problem, state, evaluations, milliseconds }: SegmentInput): SegmentOutput {
  const begun = performance.now()
  const { rule, polytopes, method, seed, island, settings, extensions } = problem
  const output = sound(
    segmentJob(
      {
        polytopes: entriesOf(polytopes),
        ruleText: rule,
        method,
        settings,
        seed,
        island,
        evaluations,
        starts: kept(starts, problem.starts),
        extensions,
        state: stateOf(state),
        sampled: true,
      },
      session,
      pieceLength(milliseconds, begun),
    ),
  )
  const { ended, done, ...progress } = output.progress
  return {
    state: JSON.stringify(output.state),
    progress: { ...progress, exhausted: ended === 'space-exhausted' },
    done,
    finds: output.finds.map(findView),
    sampled: output.sampled,
    milliseconds: performance.now() - begun,
  }
}

/** Draws the next candidates of a null sample. */
export function nullChunk(input: NullChunkInput): NullChunkOutput {
  const { state, summary, done, milliseconds } = chunk(input)
  return { state, summary, done, milliseconds }
}

/** Candidates of the previews of late, for the next rule that is tried on the same sample. */
const looked = new CandidateCache()

/** The same, with every candidate and what it cost. */
export const previewChunk = (input: NullChunkInput): PreviewChunkOutput => chunk(input, looked)

function chunk(
  { problem, state, evaluations, milliseconds }: NullChunkInput,
  candidates?: CandidateCache,
): PreviewChunkOutput {
  const begun = performance.now()
  const { rule, polytopes, seed, size } = problem
  const output = sound(
    previewJob(
      {
        polytopes: entriesOf(polytopes),
        ruleText: rule,
        size,
        seed,
        state: stateOf(state),
        count: evaluations,
      },
      session,
      () => performance.now(),
      pieceLength(milliseconds, begun),
      candidates,
    ),
  )
  const { hitLine, ...summary } = output.summary
  void hitLine
  return {
    state: JSON.stringify(output.state),
    summary: {
      ...summary,
      expectedBest: summary.expectedBest.map(([n, score]) => [n, score]),
      bestRange: summary.bestRange.map(([n, low, high]) => [n, low, high]),
      ranked: summary.ranked.map(([score, better, atLeast]) => [score, better, atLeast]),
    },
    done: summary.complete,
    milliseconds: performance.now() - begun,
    rows: output.rows.map(({ classKey, outcome, ...row }) => ({
      ...row,
      candidateKey: classKey,
      outcome: outcomeView(outcome),
    })),
  }
}

/** Candidates about to be stored, with heights that tie neither in a 2-face nor in a facet. */
export function facetGenericFinds({
  polytopes,
  finds,
}: {
  /** See `SearchProblem`. */
  readonly polytopes: string
  readonly finds: readonly SegmentFind[]
}): SegmentFind[] {
  const source = session.sourceOf(entriesOf(polytopes))
  return finds.map(({ candidateKey, polytopeKey, outcome, heights }) => {
    const { polytope } = source.at(source.keys.indexOf(polytopeKey))
    return { candidateKey, polytopeKey, outcome, heights: [...facetGenericHeights(polytope, heights)] }
  })
}

function findView({ classKey, polytopeKey, heights, outcome }: Find): SegmentFind {
  return { candidateKey: classKey, polytopeKey, heights: [...heights], outcome: outcomeView(outcome) }
}

export const stateOf = (text: string | null) => (text === null ? null : (JSON.parse(text) as SearchState))

/** The polytopes of a scope given as text, see `ScoredScope`. */
export const scopeSource = (text: string): PolytopeSource => session.sourceOf(entriesOf(text))

/** The polytopes of a scope; the last few scopes stay parsed. */
const entriesOf = (text: string): readonly PolytopeEntry[] => kept(scopes, text)

/** A list as the same array for the same text, as long as it is among the last few. */
function kept<Row>(lists: Map<string, readonly Row[]>, text: string): readonly Row[] {
  const list = lists.get(text) ?? (JSON.parse(text) as Row[])
  lists.delete(text)
  lists.set(text, list)
  for (const oldest of lists.keys()) {
    if (lists.size <= 4) break
    lists.delete(oldest)
  }
  return list
}

interface Failed {
  readonly error: { readonly code: string; readonly message: string }
}

/** Jobs report failures as values; a bug of the engine is told apart by its code. */
function sound<Output extends object>(output: Output): Exclude<Output, Failed> {
  if (!isFailed(output)) return output as Exclude<Output, Failed>
  const { code, message } = output.error
  throw code === 'engine.failed' ? new Error(message) : new InputError(code, message)
}

const isFailed = (output: object): output is Failed => 'error' in output
