import { InvariantError } from '../../errors.ts'
import type { Polytope } from '../polytope.ts'
import { circuitOf, settledSign } from './fanCircuits.ts'
import { minorsOf } from './simplexFrame.ts'

/** A triangle that a simplex shares with the next one or with the facet's boundary; vertices ascending. */
export type Wall = readonly [number, number, number]

/** A number per wall; exact as there are fewer than 1,000 points. */
export function wallCode(polytope: Polytope, i: number, j: number, k: number): number {
  const low = i < j ? (i < k ? i : k) : j < k ? j : k
  const high = i > j ? (i > k ? i : k) : j > k ? j : k
  return (low * polytope.pointCount + (i + j + k - low - high)) * polytope.pointCount + high
}

/**
 * The regular triangulation of one facet for given heights: the lower hull of its lifted points, found by going
 * from each simplex through its open walls to the next (gift wrapping). Beyond a wall the next vertex is the point
 * q whose lifted position makes the flattest turn, the least (w_q - l(q)) / x_q with l the linear function that the
 * last simplex interpolates and x_q > 0 the distance from the wall. Doubles compare; whatever their rounding bound
 * leaves open is decided by the sign of one circuit in integers, and exact ties by `settledSign`, hence the outcome
 * is one simplicial complex whatever the order of the walk.
 *
 * @param points the facet's points
 * @param boundary codes of the triangles that the heights give on the facet's 2-faces
 * @param start one of these triangles
 * @returns simplices, 4 points each, ascending; in the order of the walk
 */
export function triangulateFacet(
  polytope: Polytope,
  points: Int32Array,
  heights: ArrayLike<number>,
  boundary: ReadonlySet<number>,
  start: Wall,
): number[][] {
  const count = points.length
  const coordinates = new Float64Array(4 * count)
  const extent = new Float64Array(4)
  const lifted = new Float64Array(count)
  let highest = 0
  for (let n = 0; n < count; n++) {
    for (let c = 0; c < 4; c++) {
      coordinates[4 * n + c] = polytope.points[4 * points[n] + c]
      extent[c] = Math.max(extent[c], Math.abs(coordinates[4 * n + c]))
    }
    lifted[n] = heights[points[n]]
    highest = Math.max(highest, Math.abs(lifted[n]))
  }
  /** How far each point lies above the simplex in hand, and a bound on the rounding. */
  const above = new Float64Array(count)
  let error = 0
  const simplices: number[][] = []
  /** Walls with a simplex on one side so far. */
  const open = new Set<number>()

  const enter = (vertices: number[]): void => {
    simplices.push(vertices)
    for (let m = 0; m < 4; m++) {
      const [i, j, k] = wallOpposite(vertices, m)
      const code = wallCode(polytope, i, j, k)
      if (boundary.has(code)) continue
      if (!open.delete(code)) open.add(code)
    }
  }

  // Before there is a simplex, any point off the starting wall stands in for one: l may be any linear function
  // that interpolates the wall.
  const offWall = points.find((q) => minorsOf(polytope, [...start, q]).determinant !== 0)
  if (offWall === undefined) throw new InvariantError('The points of a facet lie in a plane.')
  const frame = [...start, offWall]
  const inner = minorsOf(polytope, frame)
  lift(frame, inner.rows, inner.determinant)
  enter(ordered([...start, beyond(frame, inner.rows, 3, inner.determinant > 0 ? 1 : -1)]))

  for (let s = 0; s < simplices.length; s++) {
    const vertices = simplices[s]
    let isLifted = false
    const { rows, determinant } = minorsOf(polytope, vertices)
    for (let m = 0; m < 4; m++) {
      const wall = wallOpposite(vertices, m)
      if (!open.has(wallCode(polytope, ...wall))) continue
      if (!isLifted) lift(vertices, rows, determinant)
      isLifted = true
      enter(ordered([...wall, beyond(vertices, rows, m, determinant > 0 ? -1 : 1)]))
    }
  }
  return simplices

  /** Measures all points against a lifted simplex. */
  function lift(vertices: readonly number[], rows: Float64Array, determinant: number): void {
    const slope = [0, 0, 0, 0]
    let size = highest
    for (let m = 0; m < 4; m++) {
      for (let c = 0; c < 4; c++) {
        const term = (rows[4 * m + c] * heights[vertices[m]]) / determinant
        slope[c] += term
        size += Math.abs(term) * extent[c]
      }
    }
    const [a, b, c, d] = slope
    for (let n = 0, at = 0; n < count; n++, at += 4) {
      above[n] =
        lifted[n] -
        (a * coordinates[at] + b * coordinates[at + 1] + c * coordinates[at + 2] + d * coordinates[at + 3])
    }
    error = 16 * Number.EPSILON * size
  }

  /** The next vertex beyond the wall opposite to vertex m, on the side where sign * <row m, v> > 0. */
  function beyond(vertices: readonly number[], rows: Float64Array, m: number, sign: number): number {
    const wall = vertices.filter((_, n) => n !== m)
    const [a, b, c, d] = rows.subarray(4 * m, 4 * m + 4).map((entry) => sign * entry)
    let best = -1
    let turn = Infinity
    let doubt = 0
    for (let n = 0, at = 0; n < count; n++, at += 4) {
      const distance =
        a * coordinates[at] + b * coordinates[at + 1] + c * coordinates[at + 2] + d * coordinates[at + 3]
      if (distance <= 0) continue
      const here = above[n] / distance
      // The bound covers the rounding of the quotient: |above| is below 2 * size.
      const unsure = error / distance
      if (here - unsure > turn + doubt) continue
      if (here + unsure >= turn - doubt && best >= 0) {
        const circuit = circuitOf(polytope, [...wall, points[best]], points[n])
        if (settledSign(circuit, heights) > 0) continue
      }
      best = n
      turn = here
      doubt = unsure
    }
    if (best < 0) throw new InvariantError(`No simplex lies beyond the wall (${wall.join(', ')}) of a facet.`)
    return points[best]
  }
}

function wallOpposite(vertices: readonly number[], m: number): Wall {
  return vertices.filter((_, n) => n !== m) as unknown as Wall
}

function ordered(vertices: number[]): number[] {
  return vertices.sort((p, q) => p - q)
}
