import { medianSorted, quantileSorted } from 'simple-statistics'

/** A rate with its 95 % interval. */
export interface Rate {
  readonly hits: number
  readonly size: number
  readonly rate: number
  readonly low: number
  readonly high: number
}

/** Two-sided 95 % point of the standard normal distribution. */
const normal95 = 1.959963984540054

/**
 * Hit rate with Wilson's score interval at 95 % (Wilson 1927). With no hits among n the interval is [0, 3 / n],
 * the rule of three (upper bound of a one-sided 95 % interval), at most 1. An empty sample has no rate: null.
 */
export function rateOf(hits: number, size: number): Rate | null {
  if (size === 0) return null
  const rate = hits / size
  if (hits === 0) return { hits, size, rate, low: 0, high: Math.min(1, 3 / size) }
  const z2 = normal95 ** 2
  const denominator = 1 + z2 / size
  const centre = (rate + z2 / (2 * size)) / denominator
  const half = (normal95 / denominator) * Math.sqrt((rate * (1 - rate)) / size + z2 / (4 * size * size))
  return { hits, size, rate, low: Math.max(0, centre - half), high: Math.min(1, centre + half) }
}

/**
 * Expected best score among n distinct candidates drawn without replacement from a sample. With the scores
 * x_1 <= ... <= x_N the largest of the n is x_i with probability C(i - 1, n - 1) / C(N, n); the first
 * `size - scores.length` candidates have no score (infeasible or undefined) and rank below all others. The
 * expectation is over the draws with at least one score among them; null when these are fewer than half.
 *
 * @param scores ascending
 * @param size number of candidates in the sample, those without a score included
 */
export function expectedBest(scores: ArrayLike<number>, size: number, n: number): number | null {
  if (n < 1 || n > size || scores.length === 0) return null
  // p_N = n / N, and p_(i-1) = p_i (i - n) / (i - 1).
  let probability = n / size
  let total = 0
  let covered = 0
  for (let i = size; i > size - scores.length && i >= n; i--) {
    total += probability * scores[i - 1 - (size - scores.length)]
    covered += probability
    probability *= (i - n) / (i - 1)
  }
  return covered < 0.5 ? null : total / covered
}

/**
 * The p quantile (linear interpolation between order statistics) of a sample some
 * of whose members have no score and rank below all others; null when it falls among those.
 *
 * @param scores ascending
 */
export function quantileOf(scores: readonly number[], size: number, p: number): number | null {
  if (scores.length === 0) return null
  const ranked = [...new Array<number>(size - scores.length).fill(-Infinity), ...scores]
  const quantile = quantileSorted(ranked, p)
  return Number.isFinite(quantile) ? quantile : null
}

/**
 * Range of the best score among n candidates: 5 % of such draws stay below `low`, 5 % go above `high`. The ends are
 * the sample's quantiles at 0.05^(1/n) and 0.95^(1/n). `high` is null where fewer than one of the sample would lie
 * above it: the sample does not know, and nothing is extrapolated. Null, too, where `low` has no score.
 *
 * @param scores ascending
 * @param size number of candidates in the sample, those without a score included; they rank below all others
 */
export function bestRange(
  scores: readonly number[],
  size: number,
  n: number,
): readonly [low: number, high: number | null] | null {
  const at = (p: number): number | undefined =>
    scores[Math.ceil(size * p ** (1 / n)) - 1 - (size - scores.length)]
  const low = at(0.05)
  if (low === undefined) return null
  const isKnown = size * (1 - 0.95 ** (1 / n)) >= 1
  return [low, isKnown ? (at(0.95) ?? null) : null]
}

/** Median of those that have a score; null when none has. */
export function medianOf(scores: readonly number[]): number | null {
  return scores.length === 0 ? null : medianSorted([...scores])
}
