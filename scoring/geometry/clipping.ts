/** A corner of a convex polygon with the number of the line that its edge to the next corner lies on. */
export interface Corner {
  readonly x: number
  readonly y: number
  readonly line: number
}

/** The square of half-width `reach` around the origin, counterclockwise; its edges have the number -1. */
export function squareAround(reach: number): Corner[] {
  return [
    { x: -reach, y: -reach, line: -1 },
    { x: reach, y: -reach, line: -1 },
    { x: reach, y: reach, line: -1 },
    { x: -reach, y: reach, line: -1 },
  ]
}

/** The part of a convex polygon where constant + a x + b y >= 0; new edges get the number `line`. */
export function clipped(
  polygon: readonly Corner[],
  constant: number,
  a: number,
  b: number,
  line: number,
): readonly Corner[] {
  const values = polygon.map(({ x, y }) => constant + a * x + b * y)
  if (values.every((value) => value >= 0)) return polygon
  const kept: Corner[] = []
  polygon.forEach((corner, at) => {
    const next = polygon[(at + 1) % polygon.length]
    const here = values[at]
    const there = values[(at + 1) % polygon.length]
    if (here >= 0) kept.push(corner)
    if (here >= 0 === there >= 0) return
    const share = here / (here - there)
    const cut = { x: corner.x + share * (next.x - corner.x), y: corner.y + share * (next.y - corner.y) }
    kept.push({ ...cut, line: here >= 0 ? line : corner.line })
  })
  return kept
}

/** Without edges shorter than `least`, which only rounding makes. */
export function withoutShortEdges(polygon: readonly Corner[], least: number): Corner[] {
  return polygon.filter((corner, at) => {
    const next = polygon[(at + 1) % polygon.length]
    return polygon.length < 2 || Math.hypot(next.x - corner.x, next.y - corner.y) > least
  })
}
