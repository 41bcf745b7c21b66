/**
 * The value below which the fraction p of the values lies: with the values in order v_0 .. v_(n-1), linear
 * between neighbours at position p (n - 1). `values` is not empty and is left as it is.
 */
export function quantileOf(values: readonly number[], p: number): number {
  const ordered = Float64Array.from(values).sort()
  const position = p * (ordered.length - 1)
  const below = Math.floor(position)
  const above = Math.min(below + 1, ordered.length - 1)
  const share = position - below
  return share === 0 ? ordered[below] : ordered[below] * (1 - share) + ordered[above] * share
}
