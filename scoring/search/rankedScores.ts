import { rateOf } from './statistics.ts'

/**
 * Scores of a sample with how many of its members are better, and how many at least as good; best first. Of many
 * distinct scores not all are listed: the counts of those left out between two that are differ by at most half the
 * square root of the count, which is half its statistical error.
 */
export type RankedScores = readonly (readonly [score: number, better: number, atLeast: number])[]

/** @param ascending scores of the feasible candidates, ascending */
export function rankedScores(ascending: readonly number[]): RankedScores {
  const distinct: [score: number, better: number, atLeast: number][] = []
  for (const [n, score] of [...ascending].reverse().entries()) {
    const last = distinct.at(-1)
    if (last?.[0] === score) last[2]++
    else distinct.push([score, n, n + 1])
  }
  let listed = 0
  return distinct.filter(([, , atLeast], n) => {
    const next = distinct.at(n + 1)?.[2] ?? Infinity
    if (next - listed <= Math.max(1, Math.sqrt(listed) / 2)) return false
    listed = atLeast
    return true
  })
}

/** How rare a score is among candidates that nobody selected. */
export interface Rareness {
  /** Sample members at least as good; a range where the list does not say exactly. */
  readonly least: number
  readonly most: number
  readonly size: number
  readonly rate: number
  /** 95 %: Wilson's interval around the counts; with none, [0, 3 / n]. */
  readonly low: number
  readonly high: number
}

/**
 * The share of a sample at least as good as a score, with its error. Where no member is, the bound 3 / n (95 %) is
 * all that is said: no tail is extrapolated.
 *
 * @param size members of the sample, those without a score included
 * @returns null for an empty sample
 */
export function rarenessOf(score: number, ranked: RankedScores, size: number): Rareness | null {
  const after = ranked.findIndex(([listed]) => listed < score)
  const least = (after < 0 ? ranked.at(-1) : ranked[after - 1])?.[2] ?? 0
  const most = after < 0 ? least : ranked[after][1]
  const [from, to] = [rateOf(least, size), rateOf(most, size)]
  if (from === null || to === null) return null
  return { least, most, size, rate: (least + most) / 2 / size, low: from.low, high: to.high }
}
