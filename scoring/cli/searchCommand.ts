import { caution } from '../caution.ts'
import { InputError } from '../errors.ts'
import { ruleOfInput } from '../evaluation/input.ts'
import { evaluationUnits, scoreEntry } from '../evaluation.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import { scoringHash } from '../rules/hash.ts'
import type { Find } from '../search/find.ts'
import { usesStarts } from '../search/methods.ts'
import { mergeIslands } from '../search/islands.ts'
import type { SegmentInput } from '../search/jobs.ts'
import { nullSummary } from '../search/nullSample.ts'
import { polytopeSource } from '../search/polytopeSource.ts'
import { mergedProgress } from '../search/progress.ts'
import { searchStatistics } from '../search/searchStatistics.ts'
import { islandBudget } from '../search/settings.ts'
import type { SearchState } from '../search/state.ts'
import { engineVersion } from '../version.ts'
import { specOf, type SearchSpec } from './searchSpec.ts'
import type { SegmentThreads } from './threads.ts'

/** One line of a search's output. */
export type SearchLine = { readonly kind: 'start' | 'progress' | 'find' | 'final' } & Readonly<
  Record<string, unknown>
>

export interface SearchRunOptions {
  readonly threads: SegmentThreads
  /** States to go on from, one per job; null or absent: from the beginning. */
  readonly states?: readonly (SearchState | null)[] | null
  /** Told of every line as it comes. Only the `final` line is the same for every cut and every thread count. */
  readonly print: (line: SearchLine) => void
  /** Told of all states after each segment. */
  readonly save?: (states: readonly (SearchState | null)[]) => void
}

/** Proposals after which a segment ends even when few were new. */
const segmentProposals = 5000

/**
 * Runs a search to its end: its islands, and its null sample where one is asked for, segment by segment.
 * @throws InputError when the states belong to another search
 */
export async function runSearch(spec: SearchSpec, options: SearchRunOptions): Promise<void> {
  const { threads, print, save } = options
  const rule = ruleOfInput(spec.ruleText)
  const { islands } = spec.settings
  const vertices = new Map(spec.polytopes.map((entry) => [entry.key, entry.vertices]))
  const findLine = findLineOf(rule, vertices)
  const inputs = jobsOf(spec)
  const states: (SearchState | null)[] = inputs.map((_, n) => options.states?.[n] ?? null)
  for (const [n, state] of states.entries()) {
    if (state === null || inputs[n].seed === state.seed) continue
    throw new InputError(
      'state.other-problem',
      `The states are those of a search with seed ${state.seed}; this one has ${inputs[n].seed}.`,
      '--state',
      state.seed,
    )
  }
  if (options.states && options.states.length !== inputs.length) {
    throw new InputError(
      'state.other-problem',
      `The states are those of ${options.states.length} jobs; this search has ${inputs.length}.`,
      '--state',
    )
  }
  const context = {
    schema: 'tessellary.search/1',
    engineVersion,
    scoringHash: scoringHash(rule, engineVersion),
    polytopes: spec.polytopes.map(({ key }) => key),
    method: spec.method,
    seed: spec.seed,
    settings: spec.settings,
    starts: startsLine(spec),
    extensions: spec.extensions,
    units: evaluationUnits,
    caution,
  }
  print({ kind: 'start', ...context, spec: specOf(spec) })
  const started = (): SearchState[] => states.slice(0, islands).filter((state) => state !== null)
  let failed = false
  await Promise.all(
    inputs.map(async (input, n) => {
      let done = false
      while (!done && !failed) {
        const output = await threads.run({ ...input, state: states[n] })
        if ('error' in output) {
          failed = true
          if (output.error.code === 'engine.failed') throw new Error(output.error.message)
          throw new InputError(output.error.code, output.error.message)
        }
        states[n] = output.state
        done = output.progress.done
        save?.(states)
        if (n >= islands) continue
        const progress = mergedProgress(started(), spec)
        print({ kind: 'progress', island: n, ...progress })
        for (const find of output.finds) print({ kind: 'find', island: n, ...findLine(find) })
      }
    }),
  )
  const merged = mergeIslands(started(), spec.settings.keep, polytopeSource(spec.polytopes), spec)
  const sample = states.at(islands) ?? null
  print({
    kind: 'final',
    ...context,
    progress: merged.progress,
    top: merged.top.map(findLine),
    statistics: {
      ...searchStatistics(started(), sample, rule),
      histogram: merged.histogram,
      undefined: merged.reasons,
      failedRequires: merged.failures,
    },
    null: sample && nullSummary(sample, rule),
  })
}

/** A job per island, and one for the null sample. */
function jobsOf(spec: SearchSpec): SegmentInput[] {
  const { polytopes, ruleText, method, settings, seed, starts, extensions } = spec
  const jobs = Array.from({ length: settings.islands }, (_, island): SegmentInput => ({
    polytopes,
    ruleText,
    method,
    settings,
    starts,
    extensions,
    seed,
    island,
    state: null,
    evaluations: segmentLength(islandBudget(settings, island)),
    proposals: segmentProposals,
  }))
  if (spec.null === undefined) return jobs
  const { size, law } = spec.null
  return [
    ...jobs,
    {
      polytopes,
      ruleText,
      method: 'random',
      settings: { budget: size, islands: 1, keep: 20, sample: size, ...(law && { law }) },
      seed: spec.null.seed,
      island: 0,
      state: null,
      evaluations: segmentLength(size),
      proposals: segmentProposals,
    },
  ]
}

/** How many candidates the search was given, and whether its method begins from them. */
function startsLine({ starts, method }: SearchSpec): { readonly given: number; readonly used: boolean } {
  return { given: starts.length, used: starts.length > 0 && usesStarts(method) }
}

/** Some fifty segments per island, none longer than a few seconds. */
function segmentLength(budget: number): number {
  return Math.max(10, Math.min(250, Math.ceil(budget / 50)))
}

/** Heights refer to the points of the polytope in normal form, in its own order; so do the vertices. */
function findLineOf(rule: CheckedRule, vertices: ReadonlyMap<string, unknown>) {
  return (find: Find): Record<string, unknown> => {
    const { polytopeKey, classKey, outcome, heights } = find
    const score = scoreEntry(outcome, rule)
    return { polytopeKey, classKey, score, heights, vertices: vertices.get(polytopeKey) }
  }
}
