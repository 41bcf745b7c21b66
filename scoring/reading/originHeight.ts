import { InputError } from '../errors.ts'
import { circuitOf } from '../geometry/fans/fanCircuits.ts'
import { fanOverClass } from '../geometry/fans/fan.ts'
import { gcdBig } from '../geometry/integers.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import type { PlacedPoints } from './placedPoints.ts'

/**
 * Checks that a height given to the origin is low enough for a star triangulation, exactly. Across a triangle in a
 * 2-face, between the simplices of two facets with apexes p and q, the relation c_p v_p + c_q v_q + ... = 0 has
 * coefficients with the sum S = c_q (1 + <m, v_q>) > 0, m the normal of p's facet; with the origin's coefficient -S
 * it is affine, and the lifted fan is convex there exactly when sum_m c_m w_m > S w_0.
 *
 * @param index of the origin in the list of points
 * @throws InputError heights.not-star with the triangle at which it fails first
 */
export function requireStar(
  placed: PlacedPoints,
  cls: TwoFaceClass,
  heights: ArrayLike<number>,
  { height: origin, index }: { readonly height: number; readonly index: number },
): void {
  const { polytope } = placed
  const { simplices, facetOf } = fanOverClass(cls, heights)
  const apexes = new Map<
    string,
    { readonly facet: number; readonly simplex: number[]; readonly apex: number }[]
  >()
  for (let s = 0; s < facetOf.length; s++) {
    const simplex = [...simplices.subarray(4 * s, 4 * s + 4)]
    for (const apex of simplex) {
      const wall = simplex.filter((p) => p !== apex).join()
      const sides = apexes.get(wall) ?? []
      apexes.set(wall, sides)
      sides.push({ facet: facetOf[s], simplex, apex })
    }
  }
  for (let t = 0; t < cls.faceOf.length; t++) {
    const wall = cls.triangles.subarray(3 * t, 3 * t + 3)
    const [here, there] = apexes.get(wall.join()) ?? []
    if (here === undefined || there === undefined) continue
    const { points, coefficients } = circuitOf(polytope, here.simplex, there.apex)
    let value = 0n
    let sum = 0n
    points.forEach((point, m) => {
      value += BigInt(coefficients[m]) * BigInt(heights[point])
      sum += BigInt(coefficients[m])
    })
    if (value > sum * BigInt(origin)) continue
    const common = gcdBig(value, sum)
    const [bound, divisor] = [value / common, sum / common]
    const corners = Array.from(wall, (point) => placed.nameOf(point)).join(', ')
    throw new InputError(
      'heights.not-star',
      `The triangulation is not star: the origin has the height ${origin}, but at the triangle ${corners} it must lie below ${bound}${divisor === 1n ? '' : `/${divisor}`}. Lower it, or leave the origin out.`,
      `heights[${index}]`,
      origin,
    )
  }
}
