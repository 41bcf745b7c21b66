import { probit, sampleCorrelation } from 'simple-statistics'

/** Ranks from 0, the least first; equal values share the mean of their ranks. */
export function midranks<T>(values: readonly T[], compare: (a: T, b: T) => number): number[] {
  const order = [...values.keys()].sort((a, b) => compare(values[a], values[b]) || a - b)
  const ranks = new Array<number>(values.length)
  for (let from = 0; from < order.length;) {
    let to = from + 1
    while (to < order.length && compare(values[order[from]], values[order[to]]) === 0) to++
    for (let n = from; n < to; n++) ranks[order[n]] = (from + to - 1) / 2
    from = to
  }
  return ranks
}

/** Normal scores (van der Waerden 1952) of ranks from 0 to size - 1: the quantiles of the normal law they stand for. */
export function normalScores(ranks: readonly number[]): number[] {
  const scores = ranks.map((rank) => probit((rank + 0.5) / ranks.length))
  const mean = scores.reduce((sum, score) => sum + score, 0) / scores.length
  return scores.map((score) => score - mean)
}

/** Spearman's rank correlation; 0 when one side does not vary. */
export function rankCorrelation(one: readonly number[], other: readonly number[]): number {
  if (one.every((rank) => rank === one[0]) || other.every((rank) => rank === other[0])) return 0
  return sampleCorrelation([...one], [...other])
}
