import { compareMerits, feasibleKind, type Merit } from '../search/merit.ts'
import { RandomStream, seededState } from '../search/randomStream.ts'

/** What one run came by: the merits of its distinct evaluations, in order. */
export type MeritSequence = readonly Merit[]

/** One method on one task: a number per seed. Infinity: not within the evaluations watched. */
export interface Measured {
  /** Evaluations until a candidate is as good as the null's 99.9 % quantile. */
  readonly toHigh: readonly number[]
  /** Evaluations until a candidate is as good as the best of the null. */
  readonly toBest: readonly number[]
  /** Best score after so many evaluations; -Infinity while nothing feasible was found. */
  readonly early: readonly number[]
  readonly late: readonly number[]
}

/** Evaluations of the earlier of the two comparisons of scores. */
export const earlyCount = 30

/** The merit that a thousandth of the null reaches: the third best of 3,000. */
export function highMerit(merits: MeritSequence): Merit {
  return merits[Math.max(0, Math.floor(merits.length / 1000) - 1)]
}

/** @param merits the null's, best first */
export function measured(runs: readonly MeritSequence[], merits: MeritSequence, watched: number): Measured {
  return {
    toHigh: runs.map((run) => evaluationsTo(run, highMerit(merits))),
    toBest: runs.map((run) => evaluationsTo(run, merits[0])),
    early: runs.map((run) => bestScore(run.slice(0, earlyCount))),
    late: runs.map((run) => bestScore(run.slice(0, watched))),
  }
}

/** Runs of `seeds` random searches as they come out of the null sample, drawn with replacement: until its best. */
export function measuredRandom(merits: MeritSequence, watched: number, seeds = 1001): Measured {
  const runs = Array.from({ length: seeds }, (_, seed) => {
    const stream = new RandomStream(seededState(seed))
    const run: Merit[] = []
    let reached = false
    while (!reached || run.length < watched) {
      const merit = merits[stream.below(merits.length)]
      run.push(merit)
      reached ||= compareMerits(merit, merits[0]) <= 0
    }
    return run
  })
  return measured(runs, merits, watched)
}

function evaluationsTo(run: MeritSequence, wanted: Merit): number {
  const at = run.findIndex((merit) => compareMerits(merit, wanted) <= 0)
  return at < 0 ? Infinity : at + 1
}

function bestScore(run: MeritSequence): number {
  return run.reduce(
    (best, { kind, value }) => (kind === feasibleKind ? Math.max(best, value) : best),
    -Infinity,
  )
}

/** Quartiles as order statistics, the middle one the upper median; Infinity where runs did not get there. */
export function quartiles(values: readonly number[]): readonly [number, number, number] {
  const sorted = [...values].sort((a, b) => a - b)
  const at = (share: number): number => sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))]
  return [at(0.25), at(0.5), at(0.75)]
}
