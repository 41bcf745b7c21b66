import { findOf, type Find } from './find.ts'
import { nextExtension, requireSameExtensions } from './extensions.ts'
import { emptyHistogram } from './histogram.ts'
import { Island, type IslandHooks } from './island.ts'
import { methods } from './methods.ts'
import { problemDigest, requireSameProblem, type SearchProblem } from './problem.ts'
import { progressOf, type IslandProgress } from './progress.ts'
import { seededState } from './randomStream.ts'
import { SeenTable } from './seenTable.ts'
import { islandBudget, seenCapacity } from './settings.ts'
import { requireSoundStarts } from './givenStarts.ts'
import type { SampledRow, SearchState } from './state.ts'

/** The state of an island before its first step. Islands of one seed have unrelated random streams. */
export function startState(problem: SearchProblem, seed: number, island = 0): SearchState {
  const { settings, polytopes, starts = [] } = problem
  requireSoundStarts(starts, polytopes.keys)
  return {
    schema: 'tessellary.state/1',
    problem: problemDigest(problem),
    method: problem.method,
    seed,
    island,
    budget: islandBudget(settings, island),
    evaluations: 0,
    proposals: 0,
    accepted: 0,
    restarts: 0,
    feasible: 0,
    infeasible: 0,
    undefined: 0,
    hits: 0,
    hitsUndefined: 0,
    generator: seededState(seed, island),
    stalled: 0,
    ended: null,
    reasons: [],
    failures: [],
    curve: [],
    histogram: emptyHistogram,
    sample: { capacity: settings.sample, offered: 0, rows: [] },
    top: [],
    seen: new SeenTable(slotsFor(problem, islandBudget(settings, island))).state(),
    surrogate: null,
    chain: null,
  }
}

/** Slots of the table of classes seen, for a budget. */
function slotsFor({ method, settings, polytopes }: SearchProblem, budget: number): number {
  // Room is reckoned with the largest polytope that occurs; a scope of many is only looked at where it begins.
  const pointCount = polytopes.count === 1 ? polytopes.at(0).polytope.pointCount : 500
  return seenCapacity(methods[method].repeats === false ? 0 : 2 * budget, settings, pointCount)
}

/** The state with every extension taken in that is due, and room for the classes to come. */
function extended(problem: SearchProblem, state: SearchState): SearchState {
  let next = state
  for (;;) {
    const longer = nextExtension(next, problem.extensions ?? [], problem.settings)
    if (longer === null) return next
    next = { ...longer, seen: SeenTable.restore(longer.seen).grown(slotsFor(problem, longer.budget)).state() }
  }
}

export interface SegmentOptions extends IslandHooks {
  /** End the segment after so many proposals too, whether or not they were new. */
  readonly proposals?: number
  /**
   * Asked after each step: end the segment here? Evaluations of one rule differ in cost by orders of magnitude, so
   * whoever wants segments of some length of time measures it. Where a run is cut never changes its result.
   */
  readonly enough?: () => boolean
}

export interface Segment {
  readonly state: SearchState
  /** Candidates that entered the list of the best in this segment and are still on it, best first. */
  readonly finds: readonly Find[]
  readonly progress: IslandProgress
  /** With the option `sampled`: rows that entered the uniform sample in this segment and are still in it. */
  readonly sampled: readonly SampledRow[]
}

/**
 * Carries one island on: at most `evaluations` more classes are scored, never beyond the island's share of the
 * budget. Pure and deterministic; the generator's state is in the state. Cutting a run into segments, of
 * whatever sizes, and passing the state through JSON in between give the same final state to the bit.
 *
 * Where the budget is used up and the problem holds an extension, it takes effect: see `extensionsSchema`.
 *
 * @throws InputError when the state belongs to another problem, or was extended otherwise
 */
export function advance(
  problem: SearchProblem,
  state: SearchState,
  evaluations: number,
  options: SegmentOptions = {},
): Segment {
  requireSameProblem(state, problemDigest(problem))
  requireSameExtensions(state, problem.extensions ?? [])
  const lastEvaluation = state.evaluations + evaluations
  const lastProposal = state.proposals + (options.proposals ?? Infinity)
  const newcomers = new Set<string>()
  const sampled = new Map<number, SampledRow>()
  let next = state
  let from: SearchState
  let enough = false
  // An extension is taken in between two openings, so that it makes no difference whether a segment ends there.
  do {
    from = extended(problem, next)
    const island = new Island(problem, from, options)
    while (
      island.ended === null &&
      island.evaluations < Math.min(island.budget, lastEvaluation) &&
      island.proposals < lastProposal
    ) {
      island.chain.step()
      enough = options.enough?.() ?? false
      if (enough) break
    }
    next = island.state()
    for (const key of island.newcomers) newcomers.add(key)
    for (const row of island.sampled()) sampled.set(row.place, row)
  } while (
    !enough &&
    next.evaluations < lastEvaluation &&
    next.proposals < lastProposal &&
    nextExtension(next, problem.extensions ?? [], problem.settings) !== null
  )
  const finds = next.top
    .filter((row) => newcomers.has(row.classKey))
    .map((row) => findOf(row, problem.polytopes))
  return {
    state: next,
    finds,
    progress: progressOf(next, problem),
    sampled: [...sampled.values()].sort((a, b) => a.place - b.place),
  }
}
