export type Curve = readonly (readonly [number, number])[]

/** Both curves on one ascending list of evaluation counts, undefined where a curve has no point of its own. */
export function alignCurves(
  found: Curve,
  expected: Curve,
  evaluations: number,
): [number[], (number | undefined)[], (number | undefined)[]] {
  const last = found.at(-1)
  const level: Curve = last && evaluations > last[0] ? [...found, [evaluations, last[1]]] : found
  const foundAt = new Map(level.map(([n, score]) => [n, score]))
  const expectedAt = new Map(expected.map(([n, score]) => [n, score]))
  const counts = [...new Set([...foundAt.keys(), ...expectedAt.keys()])].sort((a, b) => a - b)
  return [counts, counts.map((n) => foundAt.get(n)), counts.map((n) => expectedAt.get(n))]
}
