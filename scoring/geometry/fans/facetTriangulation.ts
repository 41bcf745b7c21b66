import { InvariantError } from '../../errors.ts'
import type { Polytope } from '../polytope.ts'
import { circuitOf, settledSign } from './fanCircuits.ts'
import { minorsOf, pairing } from './simplexFrame.ts'

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
  const coordinates = polytope.points
  const count = points.length
  const above = new Float64Array(count)
  const error = new Float64Array(count)
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
    let lifted = false
    const { rows, determinant } = minorsOf(polytope, vertices)
    for (let m = 0; m < 4; m++) {
      const wall = wallOpposite(vertices, m)
      if (!open.has(wallCode(polytope, ...wall))) continue
      if (!lifted) lift(vertices, rows, determinant)
      lifted = true
      enter(ordered([...wall, beyond(vertices, rows, m, determinant > 0 ? -1 : 1)]))
    }
  }
  return simplices

  /** How far each point lies above the lifted simplex, with a bound on the rounding. */
  function lift(vertices: readonly number[], rows: Float64Array, determinant: number): void {
    const slope = new Float64Array(4)
    const size = new Float64Array(4)
    for (let m = 0; m < 4; m++) {
      for (let c = 0; c < 4; c++) {
        const term = (rows[4 * m + c] * heights[vertices[m]]) / determinant
        slope[c] += term
        size[c] += Math.abs(term)
      }
    }
    for (let n = 0; n < count; n++) {
      const at = 4 * points[n]
      let value = heights[points[n]]
      let scale = Math.abs(value)
      for (let c = 0; c < 4; c++) {
        value -= slope[c] * coordinates[at + c]
        scale += size[c] * Math.abs(coordinates[at + c])
      }
      above[n] = value
      error[n] = 16 * Number.EPSILON * scale
    }
  }

  /** The next vertex beyond the wall opposite to vertex m, on the side where sign * <row m, v> > 0. */
  function beyond(vertices: readonly number[], rows: Float64Array, m: number, sign: number): number {
    const wall = vertices.filter((_, n) => n !== m)
    let best = -1
    let turn = Infinity
    let doubt = 0
    for (let n = 0; n < count; n++) {
      const distance = sign * pairing(rows, m, coordinates, points[n])
      if (distance <= 0) continue
      const here = above[n] / distance
      const unsure = (error[n] + Number.EPSILON * Math.abs(above[n])) / distance
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
