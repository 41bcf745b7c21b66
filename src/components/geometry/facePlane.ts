/** Drawing coordinates of lattice polygons. */

export type Point2 = readonly [x: number, y: number]

/**
 * The same lattice points in a lattice basis that makes the polygon compact: the second-moment form of the
 * corners is reduced (Lagrange), which is a change of basis in GL(2,Z), so unit triangles stay unit triangles.
 * The longer side lies across; least coordinates are 0.
 */
export function compactPlane(plane: readonly Point2[], corners: readonly Point2[]): Point2[] {
  const count = corners.length || 1
  const meanX = corners.reduce((sum, [x]) => sum + x, 0) / count
  const meanY = corners.reduce((sum, [, y]) => sum + y, 0) / count
  let a = 0
  let b = 0
  let c = 0
  for (const [x, y] of corners) {
    a += (x - meanX) ** 2
    b += (x - meanX) * (y - meanY)
    c += (y - meanY) ** 2
  }
  let first: Point2 = [1, 0]
  let second: Point2 = [0, 1]
  for (let round = 0; round < 64; round++) {
    if (a < c) {
      ;[a, c] = [c, a]
      ;[first, second] = [second, first]
    }
    if (c === 0) break
    const steps = Math.round(b / c)
    if (steps === 0) break
    first = [first[0] - steps * second[0], first[1] - steps * second[1]]
    a += steps * steps * c - 2 * steps * b
    b -= steps * c
  }
  const drawn = plane.map(([x, y]): Point2 => [first[0] * x + first[1] * y, second[0] * x + second[1] * y])
  const leastX = Math.min(...drawn.map(([x]) => x))
  const leastY = Math.min(...drawn.map(([, y]) => y))
  const shifted = drawn.map(([x, y]): Point2 => [x - leastX, y - leastY])
  const [width, height] = extent(shifted)
  return height > width ? shifted.map(([x, y]): Point2 => [y, x]) : shifted
}

export function extent(points: readonly Point2[]): [width: number, height: number] {
  return [Math.max(0, ...points.map(([x]) => x)), Math.max(0, ...points.map(([, y]) => y))]
}

/** Edges (i < j) of a list of triangles, each once. */
export function edgesOf(triangles: readonly (readonly [number, number, number])[]): [number, number][] {
  const edges = new Map<string, [number, number]>()
  for (const triangle of triangles) {
    for (const [p, q] of [
      [0, 1],
      [0, 2],
      [1, 2],
    ] as const) {
      const i = Math.min(triangle[p], triangle[q])
      const j = Math.max(triangle[p], triangle[q])
      edges.set(`${i},${j}`, [i, j])
    }
  }
  return [...edges.values()]
}

/** Distance from a point to a segment. */
export function distanceToSegment([x, y]: Point2, [ax, ay]: Point2, [bx, by]: Point2): number {
  const dx = bx - ax
  const dy = by - ay
  const t = Math.min(1, Math.max(0, ((x - ax) * dx + (y - ay) * dy) / (dx * dx + dy * dy || 1)))
  return Math.hypot(x - ax - t * dx, y - ay - t * dy)
}
