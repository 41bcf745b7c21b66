import { describe, expect, it } from 'vitest'
import { chargeMatrix } from '../../../scoring/geometry/chargeMatrix.ts'
import { gcd } from '../../../scoring/geometry/integers.ts'
import { latticeBasis } from '../../../scoring/geometry/latticeBasis.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { determinant } from './circuitsByMinors.ts'
import { someVertices } from './stages.ts'

/** gcd of all 4 x 4 minors and the first four points that attain it, by looking at all of them. */
function byAllMinors({ points, pointCount }: Polytope): { index: number; first: number[] } {
  const rows = Array.from({ length: pointCount }, (_, p) => Array.from(points.subarray(4 * p, 4 * p + 4)))
  const minors: { four: number[]; size: number }[] = []
  for (let a = 0; a < pointCount; a++) {
    for (let b = a + 1; b < pointCount; b++) {
      for (let c = b + 1; c < pointCount; c++) {
        for (let d = c + 1; d < pointCount; d++) {
          minors.push({
            four: [a, b, c, d],
            size: Math.abs(determinant([rows[a], rows[b], rows[c], rows[d]])),
          })
        }
      }
    }
  }
  const index = minors.reduce((common, { size }) => gcd(common, size), 0)
  return { index, first: minors.find(({ size }) => size === index)?.four ?? [] }
}

describe('lattice basis', () => {
  const small = someVertices(30)
    .map(({ vertices }) => polytopeFromPoints(vertices))
    .filter(({ pointCount }) => pointCount <= 16)

  it('leaves out the first four points whose determinant is the gcd of all minors', () => {
    for (const polytope of small) {
      const { index, excluded, basis } = latticeBasis(polytope)
      expect({ index, first: Array.from(excluded) }).toEqual(byAllMinors(polytope))
      expect([...excluded, ...basis].sort((a, b) => a - b)).toEqual(
        Array.from({ length: polytope.pointCount }, (_, p) => p),
      )
    }
  })

  it('does so on a sublattice as well', () => {
    // The quintic divided by Z5: the vertices generate a sublattice of index 5.
    const quotient = bundledPolytopes('small').find(({ id }) => id === 'r1-0001')
    const polytope = polytopeFromPoints(quotient?.vertices ?? [])
    expect(latticeBasis(polytope).index).toBe(5)
    expect(latticeBasis(polytope).index).toBe(byAllMinors(polytope).index)
  })

  it('gives integral charges that the linear relations annihilate', () => {
    for (const polytope of [...small, polytopeFromPoints(largePolytope('w25-11').vertices)]) {
      const { excluded, basis } = latticeBasis(polytope)
      const charges = chargeMatrix(polytope, excluded, basis)
      expect(charges.every(Number.isInteger)).toBe(true)
      for (let a = 0; a < basis.length; a++) {
        for (let axis = 0; axis < 4; axis++) {
          let sum = 0
          for (let p = 0; p < polytope.pointCount; p++) {
            sum += charges[p * basis.length + a] * polytope.points[4 * p + axis]
          }
          expect(sum).toBe(0)
        }
      }
    }
  })
})
