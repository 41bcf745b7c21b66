import { InputError } from '../errors.ts'
import { circuits, tiedCircuits } from '../geometry/circuits.ts'
import { heightBound } from '../geometry/faceSheets.ts'
import { classFromHeights, type TwoFaceClass } from '../geometry/twoFaceClass.ts'
import type { PlacedPoints } from './placedPoints.ts'

/** Points named in a message before "and n more". */
const namedAtMost = 4

/**
 * One height for each point of the polytope, from heights of the listed points. Those of the origin and of points
 * inside facets have no part in a 2-face and are passed over.
 *
 * @throws InputError heights.wrong-count, heights.not-integers, heights.too-large, heights.missing-point
 */
export function placedHeights(placed: PlacedPoints, values: readonly number[]): Float64Array {
  const { polytope, places, listed } = placed
  if (values.length !== places.length) {
    throw new InputError(
      'heights.wrong-count',
      `There are ${values.length} heights for ${places.length} ${listed ? 'listed points' : 'points of the polytope'}; give one for each.`,
      'heights',
      values.length,
    )
  }
  const bound = heightBound(polytope)
  const heights = new Float64Array(polytope.pointCount).fill(NaN)
  places.forEach((place, n) => {
    const value = values[n]
    if (!Number.isInteger(value)) {
      throw new InputError(
        'heights.not-integers',
        `Height ${n + 1} is ${value}; heights are integers.`,
        `heights[${n}]`,
        value,
      )
    }
    if (typeof place !== 'number') return
    if (Math.abs(value) > bound) {
      throw new InputError(
        'heights.too-large',
        `The height of ${placed.nameOf(place)} is ${value}; beyond ${bound} in size comparisons on this polytope would not be exact.`,
        `heights[${n}]`,
        value,
      )
    }
    heights[place] = value
  })
  const missing = [...heights.keys()].filter((point) => Number.isNaN(heights[point]))
  if (missing.length > 0) {
    throw new InputError(
      'heights.missing-point',
      `The list of points leaves out ${namesOf(placed, missing)}; a height is needed for every lattice point on a 2-face.`,
      'points',
      missing.length,
    )
  }
  return heights
}

/**
 * The class that heights give, if they decide it.
 * @throws InputError heights.not-fine with the points left out; heights.tied where a circuit vanishes
 */
export function classOfHeights(placed: PlacedPoints, heights: Float64Array): TwoFaceClass {
  const outcome = classFromHeights(placed.polytope, heights)
  if (!outcome.fine) {
    const unused = [...outcome.unused]
    throw new InputError(
      'heights.not-fine',
      `The heights are not fine: ${namesOf(placed, unused)} ${unused.length === 1 ? 'lies' : 'lie'} on or above the lower hull of a 2-face and would not be used. Lower ${unused.length === 1 ? 'its height' : 'their heights'}.`,
      'heights',
      unused,
    )
  }
  const tied = tiedCircuits(outcome.class, heights)
  if (tied.length > 0) {
    const { i, j, k, l } = circuits(outcome.class)
    const [row] = tied
    const corners = [i, j, k, l].map((points) => placed.nameOf(points[row]))
    throw new InputError(
      'heights.tied',
      `The heights do not decide the triangulation: ${corners.slice(0, 3).join(', ')} and ${corners[3]} are lifted into one plane, so the edge between the first two could as well be another${tied.length > 1 ? ` (${tied.length} such ties)` : ''}. Change one of these heights a little.`,
      'heights',
      [i, j, k, l].map((points) => points[row]),
    )
  }
  return outcome.class
}

/** `(1, 0, 0, 0), (0, 1, 0, 0) and 7 more points`. */
export function namesOf({ nameOf }: PlacedPoints, points: readonly number[]): string {
  const names = points.slice(0, namedAtMost).map(nameOf)
  const more = points.length - names.length
  if (more > 0) return `${names.join(', ')} and ${more} more ${more === 1 ? 'point' : 'points'}`
  return names.length === 1 ? names[0] : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`
}
