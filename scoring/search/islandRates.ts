import { quantileSorted } from 'simple-statistics'
import { RandomStream, seededState } from './randomStream.ts'
import { rateOf, type Rate } from './statistics.ts'

/** Fewest independent islands from which an interval is made. */
export const fewestIslands = 5

/** Draws of the resampling. */
const resamples = 2000

/** What one independent island has counted. */
export interface IslandCount {
  readonly hits: number
  readonly evaluations: number
}

/** Distinct hits per distinct evaluation of a search. */
export interface SearchRate {
  readonly hits: number
  readonly evaluations: number
  readonly rate: number
  readonly islands: number
  /**
   * 95 % interval; null under five islands. Without hits [0, 3 / n], which takes evaluations for independent and is
   * too narrow where they are not.
   */
  readonly interval: readonly [low: number, high: number] | null
}

/**
 * The hit rate of a search, all islands together, with an interval from resampling its islands: evaluations of one
 * chain are correlated, its islands are independent. Islands are drawn with replacement, 2,000 times, and the
 * 2.5 % and 97.5 % quantiles of the pooled rate are the interval (Efron 1979); its width is multiplied by
 * sqrt(n / (n - 1)), since resampling n islands underestimates their spread by that much. With few islands it is
 * rough. Without any hit resampling says nothing, and the rule of three takes its place. Deterministic: the
 * generator has a fixed seed.
 *
 * @returns null without evaluations
 */
export function searchRate(islands: readonly IslandCount[]): SearchRate | null {
  const begun = islands.filter(({ evaluations }) => evaluations > 0)
  const pooled = pooledRate(begun)
  if (pooled === null) return null
  const hits = begun.reduce((sum, island) => sum + island.hits, 0)
  const evaluations = begun.reduce((sum, island) => sum + island.evaluations, 0)
  const interval: [number, number] | null =
    hits === 0 ? [0, Math.min(1, 3 / evaluations)] : resampled(begun, pooled)
  return { hits, evaluations, rate: pooled, islands: begun.length, interval }
}

function resampled(islands: readonly IslandCount[], pooled: number): [number, number] | null {
  const n = islands.length
  if (n < fewestIslands) return null
  const stream = new RandomStream(seededState(1927, n))
  const rates: number[] = []
  for (let draw = 0; draw < resamples; draw++)
    rates.push(pooledRate(Array.from({ length: n }, () => islands[stream.below(n)])) ?? 0)
  rates.sort((a, b) => a - b)
  const widened = Math.sqrt(n / (n - 1))
  const end = (p: number): number =>
    Math.min(1, Math.max(0, pooled + widened * (quantileSorted(rates, p) - pooled)))
  return [end(0.025), end(0.975)]
}

function pooledRate(islands: readonly IslandCount[]): number | null {
  const evaluations = islands.reduce((sum, island) => sum + island.evaluations, 0)
  return evaluations === 0 ? null : islands.reduce((sum, island) => sum + island.hits, 0) / evaluations
}

/** How much more often a search hits than the null. */
export interface Enrichment {
  readonly ratio: number | null
  /**
   * Ends from the intervals of both rates, the worse of each against the better of the other: at least as wide as
   * a 95 % interval. Null without an interval of the search; the upper end is null (no bound) where the null's
   * lower end is zero.
   */
  readonly interval: readonly [low: number, high: number | null] | null
}

/**
 * The search's rate over the null's. Without hits in the null there is no ratio, but a lower end: the null's rate
 * is below 3/n (95 %).
 */
export function enrichment(search: SearchRate, nullRate: Rate): Enrichment {
  const ratio = nullRate.rate > 0 ? search.rate / nullRate.rate : null
  if (search.interval === null) return { ratio, interval: null }
  const [low, high] = search.interval
  return { ratio, interval: [low / nullRate.high, nullRate.low > 0 ? high / nullRate.low : null] }
}

/** A null hit rate above which a rule asks for little. */
export const easyRate = 0.05

/** True when the null's whole interval lies above `easyRate`: most of what a search finds, chance finds as well. */
export function isEasy(nullRate: Rate): boolean {
  return nullRate.low > easyRate
}

/** How rare a score is among candidates that nobody selected. */
export interface Rarity extends Rate {
  /** "below 3/n (95 %)" is all that can be said: no null candidate is as good. */
  readonly isBoundOnly: boolean
}

/**
 * The share of null candidates at least as good as a score, with Wilson's interval; where none is, the bound
 * 3 / n. No tail is extrapolated.
 *
 * @param scores of the null sample's feasible candidates, in any order
 * @param size candidates of the null sample, those without a score included
 */
export function rarityOf(score: number, scores: readonly number[], size: number): Rarity | null {
  const rate = rateOf(scores.filter((other) => other >= score).length, size)
  return rate && { ...rate, isBoundOnly: rate.hits === 0 }
}
