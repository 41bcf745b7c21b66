import { describe, expect, it } from 'vitest'
import { divisorTopology } from '../../../scoring/geometry/divisors.ts'
import { chargeMatrix } from '../../../scoring/geometry/chargeMatrix.ts'
import { latticeBasis } from '../../../scoring/geometry/latticeBasis.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { rigidDivisors } from '../../../scoring/geometry/rigidDivisors.ts'
import { polytopeFromWeights } from '../../../scoring/geometry/weights.ts'
import { bundled } from './bundled.ts'
import { rankOf } from './modularRank.ts'

const some = [
  ...bundled('small').filter(({ favourable }, at) => at % 30 === 4 || !favourable),
  ...bundled('large').filter(({ h11 }) => h11 < 21),
]

describe('rigid divisors', () => {
  it.each(some.map(({ id, vertices }) => ({ id, vertices })))(
    'of $id span what their charges do',
    ({ vertices }) => {
      const polytope = polytopeFromPoints(vertices)
      const { excluded, basis } = latticeBasis(polytope)
      const charges = chargeMatrix(polytope, excluded, basis)
      const { rigid, components } = divisorTopology(polytope)
      const toric: number[][] = []
      let unsplit = 0
      let parts = 0
      let beyond = 0
      for (let p = 0; p < polytope.pointCount; p++) {
        if (rigid[p] === 0 && components[p] === 1) continue
        toric.push([...charges.slice(p * basis.length, (p + 1) * basis.length)])
        if (components[p] === 1) unsplit++
        else parts += components[p]
        beyond += components[p] - 1
      }
      expect(rigidDivisors(polytope)).toEqual({
        prime: unsplit,
        components: parts,
        rank: rankOf(toric) + beyond,
      })
      expect(rigidDivisors(polytope).rank).toBeLessThanOrEqual(polytope.hodge.h11)
    },
  )

  // Candelas, Font, Katz, Morrison 1994 (from memory): the plane E is rigid, the divisors H and L move.
  it('of weights (1,1,1,6,9) are one', () => {
    expect(rigidDivisors(polytopeFromWeights([1, 1, 1, 6, 9], 'fan'))).toEqual({
      prime: 1,
      components: 0,
      rank: 1,
    })
  })

  it('span all classes on the mirror with h11 = 491, as a basis of rigid divisors needs', () => {
    const polytope = polytopeFromWeights([1, 1, 12, 28, 42], 'newton')
    expect(rigidDivisors(polytope).rank).toBe(491)
  })
})
