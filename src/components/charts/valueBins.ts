/** Edges of bins and how many values each holds; the last bin includes its upper edge. */
export interface Bins {
  readonly edges: readonly number[]
  readonly counts: readonly number[]
}

/** More different whole numbers than this are binned like other numbers. */
const mostWholeBins = 40

/**
 * A histogram of values in ascending order. Whole numbers that span few get a bin each, from n - 1/2 to n + 1/2.
 * Others get bins of equal width, equal on the logarithmic axis if that is asked for, as many as the rule of Freedman
 * and Diaconis says (width 2 IQR / n^(1/3), common practice), between 8 and 40.
 *
 * @param log on a logarithmic axis; values that are not positive are left out
 */
export function binsOf(sorted: readonly number[], { log, whole }: { log: boolean; whole: boolean }): Bins {
  const shown = log ? sorted.filter((value) => value > 0) : sorted
  const [first] = shown
  const last = shown.at(-1)
  if (first === undefined || last === undefined) return { edges: [], counts: [] }
  if (whole && !log && last - first < mostWholeBins) {
    const edges = Array.from({ length: last - first + 2 }, (_, n) => first - 0.5 + n)
    return { edges, counts: countsIn(edges, shown) }
  }
  const there = (value: number) => (log ? Math.log10(value) : value)
  const back = (place: number) => (log ? 10 ** place : place)
  const [low, high] = [there(first), there(last)]
  if (!(high > low)) {
    const half = log ? 0.05 : Math.max(Math.abs(first) * 0.05, 0.5)
    return { edges: [back(low - half), back(low + half)], counts: [shown.length] }
  }
  const at = (p: number) => there(shown[Math.floor(p * (shown.length - 1))] ?? first)
  const width = (2 * (at(0.75) - at(0.25))) / Math.cbrt(shown.length)
  const wanted = width > 0 ? Math.ceil((high - low) / width) : 8
  const count = Math.min(40, Math.max(8, wanted))
  const edges = Array.from({ length: count + 1 }, (_, n) =>
    n === 0 ? first : n === count ? last : back(low + ((high - low) * n) / count),
  )
  return { edges, counts: countsIn(edges, shown) }
}

function countsIn(edges: readonly number[], sorted: readonly number[]): number[] {
  const counts = new Array<number>(edges.length - 1).fill(0)
  let bin = 0
  for (const value of sorted) {
    while (bin < counts.length - 1 && value >= (edges[bin + 1] ?? Infinity)) bin++
    counts[bin] = (counts[bin] ?? 0) + 1
  }
  return counts
}
