export type Curve = readonly (readonly [number, number])[]

/** Best score so far of one run over its distinct evaluations. */
export interface RunCurve {
  label: string
  curve: Curve
  evaluations: number
}

/** What the null says of the best of as many candidates. */
export interface NullCurves {
  /** Candidates of the null sample. */
  size: number
  best: number | null
  /** Expected best of n, [n, score]. */
  expected: Curve
  /** 90 % range, [n, low, high]; high is null where the sample is too small for it. */
  range: readonly (readonly [number, number, number | null])[]
}

/** Everything a chart of runs shows, on one ascending list of evaluation counts; undefined: no point of its own. */
export interface AlignedCurves {
  counts: number[]
  runs: (number | undefined)[][]
  expected: (number | undefined)[]
  low: (number | undefined)[]
  high: (number | undefined)[]
  /** Beyond the sample's size: the null's best, which the expectation is at least. */
  bound: (number | undefined)[]
}

/** @param reach the last evaluation count that is shown */
export function alignCurves(
  runs: readonly RunCurve[],
  sample: NullCurves | null,
  reach: number,
): AlignedCurves {
  const levels = runs.map(({ curve, evaluations }) => {
    const last = curve.at(-1)
    return new Map(last && evaluations > last[0] ? [...curve, [evaluations, last[1]] as const] : curve)
  })
  const expected = new Map(sample?.expected)
  const range = new Map(
    sample?.range.map(([n, low, high]) => [n, [low, high ?? sample.best ?? low]] as const),
  )
  const bound = new Map<number, number>()
  if (sample && sample.best !== null && reach > sample.size) {
    bound.set(sample.size, sample.best)
    bound.set(reach, sample.best)
  }
  const counts = [...new Set([...levels, expected, range, bound].flatMap((map) => [...map.keys()]))].sort(
    (a, b) => a - b,
  )
  return {
    counts,
    runs: levels.map((level) => counts.map((n) => level.get(n))),
    expected: counts.map((n) => expected.get(n)),
    low: counts.map((n) => range.get(n)?.[0]),
    high: counts.map((n) => range.get(n)?.[1]),
    bound: counts.map((n) => bound.get(n)),
  }
}

/** The best score after n evaluations; null before the first and after the last. */
export function bestAt({ curve, evaluations }: RunCurve, n: number): number | null {
  if (n > evaluations) return null
  return curve.findLast(([at]) => at <= n)?.[1] ?? null
}

/** The largest n for which the sample knows the upper end of the range; null when it knows none. */
export function lastKnownEnd(range: NullCurves['range']): number | null {
  return range.findLast(([, , high]) => high !== null)?.[0] ?? null
}
