import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { circuitOf } from '../../../scoring/geometry/fans/fanCircuits.ts'
import { enumerateFans } from '../../../scoring/geometry/fans/enumerateFans.ts'
import { fanFromHeights } from '../../../scoring/geometry/fans/fan.ts'
import { fanFromSimplices } from '../../../scoring/geometry/fans/fanFromSimplices.ts'
import { fanNeighbours } from '../../../scoring/geometry/fans/fanFlips.ts'
import { heightsOfSimplices } from '../../../scoring/geometry/fans/heightsOfSimplices.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { rowsOf } from './byDefinition.ts'

const small = (id: string): Polytope => {
  const found = bundledPolytopes('small').find((entry) => entry.id === id)
  if (found === undefined) throw new Error(`no bundled polytope ${id}`)
  return polytopeFromPoints(found.vertices)
}

interface Contradiction {
  readonly triangle: number[]
  readonly opposite: [number, number]
  readonly weight: string
}

/** The contradiction among walls, checked from the definition: all weights positive, circuits adding up to zero. */
function addsUpToZero(polytope: Polytope, contradiction: readonly Contradiction[]): boolean {
  const sums = new Array<bigint>(polytope.pointCount).fill(0n)
  for (const { triangle, opposite, weight } of contradiction) {
    const { points, coefficients } = circuitOf(polytope, [...triangle, opposite[0]], opposite[1])
    points.forEach((p, m) => (sums[p] += BigInt(weight) * BigInt(coefficients[m])))
  }
  return contradiction.every(({ weight }) => BigInt(weight) > 0n) && sums.every((sum) => sum === 0n)
}

describe('flips of fans', () => {
  it('lead to fine star triangulations, regular with heights or not with a proof', () => {
    let irregular = 0
    for (const id of ['r3-0015', 'r4-0114', 'r4-0268', 'r4-0616']) {
      const polytope = small(id)
      const { fans, heights } = enumerateFans(polytope, 30)
      fans.forEach((fan, n) => {
        expect(fanFromHeights(polytope, heights[n])?.simplices).toEqual(fan.simplices)
        for (const neighbour of fanNeighbours(fan)) {
          expect(fanFromSimplices(polytope, rowsOf(neighbour)).simplices).toEqual(neighbour.simplices)
          try {
            const { heights: found } = heightsOfSimplices(polytope, rowsOf(neighbour))
            expect(fanFromHeights(polytope, found)?.simplices).toEqual(neighbour.simplices)
          } catch (error) {
            if (!(error instanceof InputError)) throw error
            expect(error.code).toBe('simplices.not-regular')
            expect(error.message).toMatch(/no heights make it convex at these triangles all at once/)
            expect(addsUpToZero(polytope, error.found as Contradiction[])).toBe(true)
            irregular++
          }
        }
      })
    }
    expect(irregular).toBeGreaterThan(0)
  })

  it('are undone by a flip back', () => {
    const polytope = polytopeFromPoints(largePolytope('w20-17').vertices)
    const fan = fanFromHeights(polytope, quadraticHeights(polytope, { seed: 3, noise: 0.4 }))
    if (fan === undefined) throw new Error('quadratic heights are fine')
    const neighbours = fanNeighbours(fan)
    expect(neighbours.length).toBeGreaterThan(20)
    for (const neighbour of neighbours) {
      expect(neighbour.simplices).not.toEqual(fan.simplices)
      const back = fanNeighbours(neighbour).map(({ simplices }) => simplices.join())
      expect(back).toContain(fan.simplices.join())
    }
  })
})
