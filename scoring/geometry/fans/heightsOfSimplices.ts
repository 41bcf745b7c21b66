import { InputError } from '../../errors.ts'
import { listed, type PointNames } from '../pointNames.ts'
import type { Polytope } from '../polytope.ts'
import type { TwoFaceClass } from '../twoFaceClass.ts'
import { fanFromSimplices } from './fanFromSimplices.ts'
import type { FanWall } from './fanWalls.ts'
import { isRegularFan } from './fanRegularity.ts'

/** A triangulation that has been proved fine, regular and star: its class, and heights that give it. */
export interface ProvedTriangulation {
  readonly class: TwoFaceClass
  /** Integers, one per point of the polytope. */
  readonly heights: Float64Array
}

/**
 * Heights for a triangulation that is given by its simplices, after a proof that it is a fine star triangulation;
 * found by linear feasibility, exactly. They give these simplices, with every circuit positive, so they have no
 * ties in a 2-face nor in a facet.
 *
 * @param simplices four point indices each, or five with `originIndex`, in any order
 * @param names how messages name points
 * @throws InputError as `fanFromSimplices`, or simplices.not-regular with the walls that contradict each other and
 *   the weights with which their circuits add up to zero
 */
export function heightsOfSimplices(
  polytope: Polytope,
  simplices: readonly (readonly number[])[],
  names: PointNames = String,
): ProvedTriangulation {
  const fan = fanFromSimplices(polytope, simplices, names)
  const answer = isRegularFan(fan)
  if (answer.regular) return { class: fan.class, heights: answer.heights }
  throw new InputError(
    'simplices.not-regular',
    'The triangulation is not regular: no heights make it convex at these triangles all at once, as their ' +
      `circuits add up to zero: ${inShort(answer.walls.map((wall, n) => termOf(wall, answer.weights[n], names)))}.`,
    'simplices',
    answer.walls.map(({ vertices, opposite }, n) => ({
      triangle: [...vertices],
      opposite: [...opposite],
      weight: String(answer.weights[n]),
    })),
  )
}

/** Contradictions on large polytopes can take a hundred circuits; the error's `found` has them all. */
export function inShort(terms: readonly string[], most = 12): string {
  const more = terms.length - most
  return `${terms.slice(0, most).join('; ')}${more > 0 ? `; and ${more} more` : ''}`
}

function termOf({ vertices, opposite }: FanWall, weight: bigint, names: PointNames): string {
  const times = weight === 1n ? '' : `${weight} times `
  return `${times}${listed(vertices, names)} between ${opposite.map((p) => names(p)).join(' and ')}`
}
