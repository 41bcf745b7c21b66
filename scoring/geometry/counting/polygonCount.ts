import { InvariantError } from '../../errors.ts'

/**
 * The number of unimodular triangulations of a lattice polygon, regular or not, exact; undefined when more than
 * `limit` states would have to be looked at.
 *
 * Counts ways to sweep: a monotone path of lattice edges goes from the polygon's lower boundary to its upper one,
 * one unit triangle at a time (either one edge is replaced by two over it, or two by one). Of the orders in which
 * the triangles of one triangulation can be taken, the one counts that always takes the leftmost triangle possible:
 * after a triangle, the next must not lie wholly to the left of the edges it has made, or it would have been taken
 * before. So a state is a path with the position of its leftmost new edge, and all sequences of states end in
 * different triangulations (Alvarez, Seidel, A simple aggregative algorithm for counting triangulations, SoCG 2013;
 * Kaibel, Ziegler, math/0211268).
 *
 * @param plane two coordinates per point, all lattice points of the polygon, in lexicographic order or not
 * @param area normalised area, the number of triangles
 */
export function polygonCount(plane: ArrayLike<number>, area: number, limit: number): bigint | undefined {
  const order = Array.from({ length: plane.length / 2 }, (_, p) => p).sort(
    (p, q) => plane[2 * p] - plane[2 * q] || plane[2 * p + 1] - plane[2 * q + 1],
  )
  const x = order.map((p) => plane[2 * p])
  const y = order.map((p) => plane[2 * p + 1])
  const turn = (p: number, q: number, r: number): number =>
    (x[q] - x[p]) * (y[r] - y[p]) - (y[q] - y[p]) * (x[r] - x[p])
  const count = order.length
  const above = pointsOver(count, turn)
  // Paths as strings of point numbers, the mark first; points come in lexicographic order along a path.
  let level = new Map([[code(0, boundary(count, turn, 1)), 1n]])
  let states = 0
  for (let t = 0; t < area; t++) {
    const next = new Map<string, bigint>()
    for (const [named, ways] of level) {
      if (++states > limit) return undefined
      const mark = named.charCodeAt(0)
      const path = named.slice(1)
      const put = (newMark: number, newPath: string): void => {
        const name = String.fromCharCode(newMark) + newPath
        next.set(name, (next.get(name) ?? 0n) + ways)
      }
      for (let e = mark; e + 1 < path.length; e++) {
        const p = path.charCodeAt(e)
        const q = path.charCodeAt(e + 1)
        for (const r of above[p * count + q])
          put(e, path.slice(0, e + 1) + String.fromCharCode(r) + path.slice(e + 1))
        if (e > 0 && turn(path.charCodeAt(e - 1), p, q) === 1)
          put(e - 1, path.slice(0, e) + path.slice(e + 1))
      }
    }
    level = next
  }
  const [last, ...others] = level.values()
  if (others.length === 0) return last
  // The last triangle is taken in different places.
  const end = boundary(count, turn, -1)
  for (const name of level.keys())
    if (name.slice(1) !== end)
      throw new InvariantError('A sweep over a polygon does not end at its upper boundary.')
  return [last, ...others].reduce((sum, ways) => sum + ways)
}

const code = (mark: number, path: string): string => String.fromCharCode(mark) + path

/** Per pair p < q of points: those that make a unit triangle above the edge between them, between the two. */
function pointsOver(count: number, turn: (p: number, q: number, r: number) => number): number[][] {
  const above: number[][] = Array.from({ length: count * count }, () => [])
  for (let p = 0; p < count; p++) {
    for (let q = p + 1; q < count; q++) {
      for (let r = p + 1; r < q; r++) if (turn(p, q, r) === 1) above[p * count + q].push(r)
    }
  }
  return above
}

/** The lower (side 1) or upper (side -1) boundary with all points on it, from the first point to the last. */
function boundary(count: number, turn: (p: number, q: number, r: number) => number, side: number): string {
  const chain: number[] = []
  for (let p = 0; p < count; p++) {
    while (chain.length > 1 && side * turn(chain[chain.length - 2], chain[chain.length - 1], p) < 0)
      chain.pop()
    chain.push(p)
  }
  return String.fromCharCode(...chain)
}
