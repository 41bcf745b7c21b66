import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { polytopeFromWeights } from '../../scoring/geometry/weights.ts'

describe('Hodge numbers of weighted hypersurfaces', () => {
  it.each([
    // Candelas, de la Ossa, Green, Parkes 1991.
    [[1, 1, 1, 1, 1], 1, 101],
    // Klemm, Theisen 1992; Font 1992.
    [[1, 1, 1, 1, 2], 1, 103],
    [[1, 1, 1, 1, 4], 1, 149],
    [[1, 1, 1, 2, 5], 1, 145],
    // Candelas, de la Ossa, Font, Katz, Morrison 1993.
    [[1, 1, 2, 2, 2], 2, 86],
    [[1, 1, 2, 2, 6], 2, 128],
    // Candelas, Font, Katz, Morrison 1994.
    [[1, 1, 1, 6, 9], 2, 272],
    // Kreuzer, Skarke, hep-th/0002240.
    [[1, 1, 12, 28, 42], 11, 491],
  ])('weights %j: h = (%i, %i), and the mirror', (weights, h11, h21) => {
    expect(polytopeFromWeights(weights, 'fan').hodge).toEqual({ h11, h21, euler: 2 * (h11 - h21) })
    expect(polytopeFromWeights(weights, 'newton').hodge).toEqual({
      h11: h21,
      h21: h11,
      euler: 2 * (h21 - h11),
    })
  })
})

// The data file was computed from first principles by another program; every number in it is computed again.
describe.each(['small', 'h11-5', 'large'])('bundled polytopes (%s)', (file) => {
  interface Stated {
    readonly id: string
    readonly vertices: number[][]
    readonly h11: number
    readonly h21: number
    readonly latticePoints: number
    readonly dualLatticePoints: number
    readonly favourable: boolean
    readonly weights?: number[]
    readonly side?: 'fan' | 'newton'
  }
  const path = new URL(`../../server/library/data/polytopes-${file}.json`, import.meta.url)
  const { polytopes } = JSON.parse(readFileSync(path, 'utf8')) as { polytopes: Stated[] }

  it('have the Hodge numbers, lattice points and favourability the data say', () => {
    const wrong = polytopes.filter((stated) => {
      const { hodge, latticePoints, dualLatticePoints, favourable, vertexCount } = polytopeFromPoints(
        stated.vertices,
      )
      return !(
        hodge.h11 === stated.h11 &&
        hodge.h21 === stated.h21 &&
        latticePoints === stated.latticePoints &&
        dualLatticePoints === stated.dualLatticePoints &&
        favourable === stated.favourable &&
        vertexCount === stated.vertices.length
      )
    })
    expect(wrong.map(({ id }) => id)).toEqual([])
    expect(polytopes.length).toBe({ small: 1482, 'h11-5': 4990, large: 76 }[file])
  }, 240_000)
})
