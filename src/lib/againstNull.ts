import {
  enrichment,
  isEasy,
  rarenessOf,
  searchRate,
  type Enrichment,
  type Rareness,
  type SearchRate,
} from '../../scoring/index.ts'
import { type NullSummary } from '../../shared/nullSamples.ts'
import { type SearchDetail } from '../../shared/searches.ts'
import { type NullCurves } from '../components/charts/runCurves.ts'
import { formatNumber, formatPercent } from './numbers.ts'

/** What is needed of a search to compare it with its null sample. */
export type AgainstNullOf = Pick<SearchDetail, 'progress' | 'null' | 'ownHitLine' | 'method'>

/** What can be said of a search beside its null sample; only what the counts carry. */
export interface AgainstNull {
  /** Null while the hits of some island are not known. */
  rate: SearchRate | null
  /** Evaluations that may lie on either side of the hit line. */
  unsure: number
  /** Every class has been scored. */
  isExact: boolean
  enrichment: Enrichment | null
  /** The null hits so often that a hit says little. */
  easy: boolean
}

export function againstNull({ progress, null: sample, ownHitLine, method }: AgainstNullOf): AgainstNull {
  // Candidates that the search was given are no finds of its own.
  const begun = progress.islands
    .map(({ hits, evaluations, given = 0 }) => ({ hits, evaluations: evaluations - given }))
    .filter(({ evaluations }) => evaluations > 0)
  const counts = begun.flatMap(({ hits, evaluations }) => (hits === undefined ? [] : [{ hits, evaluations }]))
  const rate = counts.length === begun.length ? searchRate(counts) : null
  const nullRate = sample?.hit ?? null
  return {
    rate,
    unsure: progress.islands.reduce((sum, { unsure = 0 }) => sum + unsure, 0),
    isExact: progress.exhausted && method === 'exhaustive',
    enrichment: rate && nullRate && enrichment(rate, nullRate),
    easy: ownHitLine && nullRate !== null && isEasy(nullRate),
  }
}

/** "23.4 times (12 to 51, 95 %)", or what there is of it. */
export function enrichmentText({ ratio, interval }: Enrichment, isExact: boolean): string {
  const times = ratio === null ? null : `${formatNumber(ratio, 3)} times`
  if (interval === null || isExact) return times ?? 'the null has no hit'
  const [low, high] = interval
  if (low === 0 && high === null) return 'neither has a hit'
  const range =
    high === null
      ? `at least ${formatNumber(low, 3)} times`
      : `${formatNumber(low, 3)} to ${formatNumber(high, 3)}`
  return times === null ? `${range} (95 %)` : `${times} (${range}, 95 %)`
}

/** The null as `BestCurves` draws it; null before its first piece. */
export function nullCurves(sample: NullSummary | null): NullCurves | null {
  if (sample === null) return null
  const { evaluated, best, expectedBest, bestRange = [] } = sample
  return { size: evaluated, best, expected: expectedBest, range: bestRange }
}

/** A level that the null sets, with the evaluations it took a search to reach it. */
export interface Reached {
  name: string
  level: number
  /** Null: not reached yet. */
  evaluations: number | null
}

/** @param sample that the levels are taken from */
export function levelsReached({ progress }: Pick<SearchDetail, 'progress'>, sample: NullSummary): Reached[] {
  const levels = [
    ['99 % quantile', sample.quantile99],
    ['99.9 % quantile', sample.quantile999 ?? null],
    ['best', sample.best],
  ] as const
  return levels.flatMap(([name, level]) => {
    if (level === null) return []
    const step = progress.curve.find(([, score]) => score >= level)
    return [{ name, level, evaluations: step?.[0] ?? null }]
  })
}

/** What the best of n null candidates is expected to be: a value, or beyond the sample's size a bound. */
export interface Expectation {
  score: number
  isBound: boolean
}

/** Between the sizes that the sample lists, linear in the logarithm of n. */
export function expectedBestOf(sample: NullSummary, n: number): Expectation | null {
  if (n > sample.evaluated) return sample.best === null ? null : { score: sample.best, isBound: true }
  const after = sample.expectedBest.findIndex(([size]) => size >= n)
  const [next, before] = [sample.expectedBest[after], sample.expectedBest[after - 1]]
  if (next === undefined) return null
  if (next[0] === n || before === undefined) return next[0] === n ? { score: next[1], isBound: false } : null
  const share = Math.log(n / before[0]) / Math.log(next[0] / before[0])
  return { score: before[1] + share * (next[1] - before[1]), isBound: false }
}

/** Null where the sample was drawn by a version that kept no list of scores. */
export function rarenessIn(sample: NullSummary, score: number): Rareness | null {
  return sample.ranked ? rarenessOf(score, sample.ranked, sample.evaluated) : null
}

/** "3 of 2 000 are at least as good: 0.15 % (0.05 % to 0.44 %, 95 %)". */
export function rarenessText({ least, most, size, rate, low, high }: Rareness): string {
  if (most === 0) return `none of ${formatNumber(size)} is as good: below ${formatPercent(high)} (95 %)`
  const count = least === most ? formatNumber(least) : `${formatNumber(least)} to ${formatNumber(most)}`
  return `${count} of ${formatNumber(size)} at least as good: ${formatPercent(rate)} (${formatPercent(low)} to ${formatPercent(high)}, 95 %)`
}
