import { describe, expect, it } from 'vitest'
import { divisorTopology } from '../../../scoring/geometry/divisors.ts'
import { intersectionNumbers } from '../../../scoring/geometry/intersectionNumbers.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { squareOf } from '../../../scoring/geometry/squareOf.ts'
import { referenceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { diagonalDelPezzoDegrees } from '../../../scoring/observables/specialDivisors.ts'
import { bundledPolytopes } from '../../reference/bundledPolytopes.ts'

/**
 * J less its parts along the diagonal divisors D_s: t_s = D_s^2 . J / D_s^3, so that what is left meets none of them.
 * `tau` is D_k . J . J / 2 for it, a vector that knows its class.
 */
function bigPart(vertices: readonly (readonly number[])[], weight: (p: number) => number) {
  const polytope = polytopeFromPoints(vertices)
  const numbers = intersectionNumbers(referenceClass(polytope))
  const degrees = diagonalDelPezzoDegrees(numbers, divisorTopology(polytope).chi)
  const total = Float64Array.from(degrees, (_, p) => weight(p))
  const big = total.slice()
  let small = 0
  degrees.forEach((degree, s) => {
    if (!(degree > 0)) return
    const alone = new Float64Array(degrees.length)
    alone[s] = 1
    const t = squareOf(numbers, alone).reduce((sum, number, p) => sum + number * total[p], 0) / degree
    big[s] -= t
    small += degree * t ** 3
  })
  const cube = (weights: Float64Array): number =>
    squareOf(numbers, weights).reduce((sum, number, p) => sum + number * weights[p], 0)
  return { degrees, cube: cube(total), split: cube(big) + small, tau: squareOf(numbers, big) }
}

describe('volume form of diagonal type', () => {
  const some = bundledPolytopes('small').filter(({ h11 }, at) => h11 === 2 || at % 40 === 3)

  it('J^3 splits into cubes along the diagonal del Pezzo divisors, and the rest has one parameter when all classes but one are', () => {
    let diagonal = 0
    let others = 0
    for (const { vertices } of some) {
      const one = bigPart(vertices, (p) => p * p + 1)
      const two = bigPart(vertices, (p) => 3 * p - 4)
      for (const { cube, split } of [one, two]) expect(split).toBeCloseTo(cube, 5)
      const small = one.degrees.filter((degree) => degree > 0).length
      if (small === 0) continue
      const size = (tau: Float64Array): number => Math.hypot(...tau)
      const cosine =
        one.tau.reduce((sum, entry, k) => sum + entry * two.tau[k], 0) / (size(one.tau) * size(two.tau))
      if (small === one.degrees.length - 5) {
        expect(Math.abs(cosine)).toBeCloseTo(1, 9)
        diagonal++
      } else if (Math.abs(cosine) < 0.999) others++
    }
    expect([diagonal > 2, others > 2]).toEqual([true, true])
  })
})
