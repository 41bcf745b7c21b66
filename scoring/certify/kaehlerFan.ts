import { crossForm, pairing, type Vector } from './determinants.ts'
import { compareIndices } from './facetTriangulation.ts'
import { LiftedSimplex, liftedPoints, type LiftedPoints } from './liftedSimplex.ts'

/** Heights of a Kaehler class as integers in general position, and the unit they are counted in. */
export interface RoundedClass {
  readonly heights: readonly number[]
  readonly unit: number
}

/**
 * Integers near w / unit, moved by less than 2^12 units each according to the index, so that no two cones are left
 * undecided: w itself often lies on a wall between fans that the threefold does not see.
 */
export function roundedClass(w: readonly number[]): RoundedClass {
  const most = w.reduce((largest, entry) => Math.max(largest, Math.abs(entry)), 0)
  const unit = most / 2 ** 44
  let state = 1
  const heights = w.map((entry) => {
    // Minimal standard generator (Park, Miller 1988): all that matters is that the moves follow no pattern.
    state = (state * 48271) % 2147483647
    return Math.round(entry / unit) + (state % 8191) - 4095
  })
  return { heights, unit }
}

/**
 * The fan of the piecewise linear function with the given values on the points and 0 at the origin, from a triangle
 * whose cone is said to belong to it: maximal cones by turning about walls, every cone compared with all points.
 * Undefined when some point lies below a cone or two are met at once: then the triangle is no cone of the fan, or
 * the values are not in general position.
 */
export function fanOfFunction(
  points: readonly Vector[],
  heights: readonly number[],
  triangle: readonly number[],
): { lifted: LiftedPoints; simplices: readonly (readonly number[])[] } | undefined {
  const lifted = liftedPoints(points, heights)
  const all = [...points.keys()]
  const form = crossForm(points[triangle[0]], points[triangle[1]], points[triangle[2]])
  const off = points.findIndex((point) => pairing(form, point) !== 0)
  const first = new LiftedSimplex(lifted, [...triangle, off]).pivot(3, 1, all)
  if (first === undefined || first.ties.length > 0) return undefined
  const open: number[][] = [[...triangle, first.first]]
  const seen = new Map<string, number[]>([[name(open[0]), open[0]]])
  for (let corners = open.pop(); corners !== undefined; corners = open.pop()) {
    const cone = new LiftedSimplex(lifted, corners)
    for (const p of all) if (!corners.includes(p) && cone.excess(p) <= 0) return undefined
    for (let at = 0; at < 4; at++) {
      const turned = cone.pivot(at, -1, all)
      if (turned === undefined || turned.ties.length > 0) return undefined
      const next = corners.map((p, n) => (n === at ? turned.first : p))
      if (seen.has(name(next))) continue
      seen.set(name(next), next)
      open.push(next)
    }
  }
  const simplices = [...seen.values()].map((corners) => corners.sort((a, b) => a - b)).sort(compareIndices)
  return { lifted, simplices }
}

const name = (corners: readonly number[]): string => [...corners].sort((a, b) => a - b).join()
