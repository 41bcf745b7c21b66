/** Best score so far: [evaluations, score] at each improvement, evaluations counted from 1. */
export type Curve = readonly (readonly [number, number])[]

/** Steps a curve holds before every second of the middle ones is dropped. */
const longest = 400

/** The curve with one more improvement. Long curves are thinned, first and last step kept. */
export function withStep(curve: Curve, evaluations: number, score: number): Curve {
  return thinned([...curve, [evaluations, score]])
}

/** At most 400 steps, the first and the last among them. */
export function thinned(curve: Curve): Curve {
  let steps = curve
  while (steps.length > longest) {
    const last = steps.length - 1
    steps = steps.filter((_, n) => n === last || n % 2 === 0)
  }
  return steps
}

/**
 * The curves of islands as one over the total of evaluations: evaluation e of island n comes after evaluation e
 * of the islands before it and before evaluation e of those after it; an island that has fewer drops out.
 */
export function interleaved(
  islands: readonly { readonly curve: Curve; readonly evaluations: number }[],
): Curve {
  const steps: { at: number; score: number }[] = []
  for (const [n, island] of islands.entries()) {
    for (const [e, score] of island.curve) {
      let at = 0
      for (const [m, other] of islands.entries()) at += Math.min(other.evaluations, m <= n ? e : e - 1)
      steps.push({ at, score })
    }
  }
  steps.sort((a, b) => a.at - b.at)
  const merged: [number, number][] = []
  let best = -Infinity
  for (const { at, score } of steps) {
    if (score <= best) continue
    best = score
    merged.push([at, score])
  }
  return thinned(merged)
}
