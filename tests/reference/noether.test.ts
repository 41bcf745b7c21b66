import { describe, expect, it } from 'vitest'
import { divisorTopology } from '../../scoring/geometry/divisors.ts'
import { intersectionNumbers } from '../../scoring/geometry/intersectionNumbers.ts'
import { latticeBasis } from '../../scoring/geometry/latticeBasis.ts'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { referenceClass } from '../../scoring/geometry/twoFaceClass.ts'
import { bundledPolytopes } from './bundledPolytopes.ts'

// Noether's formula for a surface D in a Calabi-Yau threefold, chi(O_D) = (2 D^3 + c2 . D) / 12 (textbook, by
// Hirzebruch-Riemann-Roch). The left side is read off the dual polytope (arXiv:1712.04946), the right side comes
// from the triangulation. The Euler number 2 (h11 - h21) is Batyrev's (alg-geom/9310003), against adjunction.
describe.each(['small', 'h11-5', 'large'] as const)('one class on every bundled polytope (%s)', (file) => {
  const bundled = bundledPolytopes(file)

  it("satisfies Noether's identity for every divisor and has the Euler number of its Hodge numbers", () => {
    const wrong: string[] = []
    let multiplyConnected = 0
    for (const { id, vertices, h11, h21 } of bundled) {
      const polytope = polytopeFromPoints(vertices)
      const { cubes, secondChern, euler } = intersectionNumbers(referenceClass(polytope))
      const { chi } = divisorTopology(polytope)
      if (latticeBasis(polytope).index > 1) multiplyConnected++
      if (euler !== 2 * (h11 - h21)) wrong.push(`${id}: Euler number ${euler}`)
      chi.forEach((value, i) => {
        if (12 * value !== 2 * cubes[i] + secondChern[i]) wrong.push(`${id}: divisor ${i}`)
      })
    }
    expect(wrong).toEqual([])
    // Batyrev, Kreuzer, math/0505432 (from memory): 16 of all polytopes give a fundamental group that is not trivial,
    // N modulo the lattice of the points. (Here are all with h11 <= 5; the others need h11 >= 6 and are not.)
    expect(multiplyConnected).toBe({ small: 14, 'h11-5': 2, large: 0 }[file])
    expect(bundled.length).toBe({ small: 1482, 'h11-5': 4990, large: 76 }[file])
  })
})
