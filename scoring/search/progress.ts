import { interleaved, type Curve } from './curve.ts'
import { pendingShares } from './extensions.ts'
import type { HistogramState } from './histogram.ts'
import type { SearchProblem } from './problem.ts'
import { mergedSurrogate, type SurrogateReport } from './surrogate/report.ts'
import type { RunEnd, SearchCounts, SearchState } from './state.ts'

/** How far an island is. */
export interface IslandProgress extends SearchCounts {
  readonly island: number
  /** With the extensions that are still to come. */
  readonly budget: number
  /** Evaluations of candidates that the search was given; they count in `evaluations`, not in `hits`. */
  readonly given: number
  readonly best: number | null
  readonly bestKey: string | null
  readonly curve: Curve
  /** Scores of the feasible candidates. */
  readonly histogram: HistogramState
  readonly surrogate: SurrogateReport | null
  readonly ended: RunEnd | null
  /** Budget used up, or ended before. */
  readonly done: boolean
}

/** Budget that was added to a search, and over how many islands. */
type Extended = Pick<SearchProblem, 'extensions'> & {
  readonly settings: Pick<SearchProblem['settings'], 'islands'>
}

export function progressOf(state: SearchState, problem?: Extended): IslandProgress {
  const best = bestOf(state)
  const pending = problem ? pendingShares(state, problem.extensions ?? [], problem.settings.islands) : []
  const budget =
    state.ended === null ? pending.reduce((sum, share) => sum + share, state.budget) : state.budget
  return {
    island: state.island,
    budget,
    given: state.given?.evaluations ?? 0,
    evaluations: state.evaluations,
    proposals: state.proposals,
    accepted: state.accepted,
    restarts: state.restarts,
    feasible: state.feasible,
    infeasible: state.infeasible,
    undefined: state.undefined,
    hits: state.hits,
    hitsUndefined: state.hitsUndefined,
    best: best?.score ?? null,
    bestKey: best?.key ?? null,
    curve: state.curve,
    surrogate: surrogateOf(state),
    histogram: state.histogram,
    ended: state.ended,
    done: state.ended !== null || state.evaluations >= budget,
  }
}

/** Without the lessons: they are many, and for the next segment only. */
function surrogateOf({ surrogate }: Partial<Pick<SearchState, 'surrogate'>>): SurrogateReport | null {
  if (!surrogate) return null
  const { skill, predictions, aside, offered, chosen } = surrogate
  return { skill, predictions, aside, offered, chosen }
}

/** Score and key of the best feasible candidate. */
function bestOf(state: SearchState): { score: number; key: string } | null {
  const [first] = state.top
  return first?.outcome.kind === 'feasible' ? { score: first.outcome.score, key: first.classKey } : null
}

/** Islands as one search. */
export interface SearchProgressReport extends SearchCounts {
  readonly budget: number
  readonly given: number
  readonly best: number | null
  readonly bestKey: string | null
  /** Best so far over the evaluations of all islands, taken in turn. */
  readonly curve: Curve
  readonly surrogate: SurrogateReport | null
  readonly islands: readonly Pick<
    IslandProgress,
    'island' | 'evaluations' | 'given' | 'hits' | 'best' | 'ended' | 'done'
  >[]
  readonly done: boolean
  /** Every island ended because the space holds nothing new. */
  readonly exhausted: boolean
}

/** @param islands one state per island, in order */
export function mergedProgress(islands: readonly SearchState[], problem?: Extended): SearchProgressReport {
  const parts = islands.map((state) => progressOf(state, problem))
  const total = (pick: (part: IslandProgress) => number): number =>
    parts.reduce((sum, part) => sum + pick(part), 0)
  const leader = parts.reduce<IslandProgress | null>(
    (best, part) =>
      part.best !== null && (best === null || best.best === null || part.best > best.best) ? part : best,
    null,
  )
  return {
    budget: total((part) => part.budget),
    given: total((part) => part.given),
    evaluations: total((part) => part.evaluations),
    proposals: total((part) => part.proposals),
    accepted: total((part) => part.accepted),
    restarts: total((part) => part.restarts),
    feasible: total((part) => part.feasible),
    infeasible: total((part) => part.infeasible),
    undefined: total((part) => part.undefined),
    hits: total((part) => part.hits),
    hitsUndefined: total((part) => part.hitsUndefined),
    best: leader?.best ?? null,
    bestKey: leader?.bestKey ?? null,
    curve: interleaved(parts),
    surrogate: mergedSurrogate(parts.map((part) => part.surrogate)),
    islands: parts.map(({ island, evaluations, given, hits, best, ended, done }) => ({
      island,
      evaluations,
      given,
      hits,
      best,
      ended,
      done,
    })),
    done: parts.every((part) => part.done),
    exhausted: parts.length > 0 && parts.every((part) => part.ended === 'space-exhausted'),
  }
}
