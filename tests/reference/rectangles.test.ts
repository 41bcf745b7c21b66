import { describe, expect, it } from 'vitest'
import { polygonCount } from '../../scoring/geometry/counting/polygonCount.ts'
import { flip, flippableEdges } from '../../scoring/geometry/flips.ts'
import { quadraticHeights } from '../../scoring/geometry/heights.ts'
import { isRegular } from '../../scoring/geometry/regularity.ts'
import { referenceClass, type TwoFaceClass } from '../../scoring/geometry/twoFaceClass.ts'
import { polygonAlone, rectangle } from '../scoring/classes/polygonAlone.ts'

/** All unimodular triangulations of a lattice polygon: exchanges of diagonals connect them. */
function allTriangulations(points: readonly (readonly [number, number])[]): TwoFaceClass[] {
  const found = [referenceClass(polygonAlone(points))]
  const seen = new Set([String.fromCharCode(...found[0].triangles)])
  for (let n = 0; n < found.length; n++) {
    for (const edge of flippableEdges(found[n])) {
      const neighbour = flip(found[n], edge)
      if (neighbour === undefined) throw new Error('a flippable edge did not flip')
      const name = String.fromCharCode(...neighbour.triangles)
      if (seen.has(name)) continue
      seen.add(name)
      found.push(neighbour)
    }
  }
  return found
}

function regular(classes: TwoFaceClass[]): number {
  const near = quadraticHeights(classes[0].polytope)
  return classes.filter((cls) => isRegular(cls, { near }).regular).length
}

// Kaibel, Ziegler, Counting lattice triangulations, math/0211268; the table counts all unimodular triangulations,
// regular or not. The number of regular ones is our own count.
describe('unimodular triangulations of a lattice rectangle', () => {
  it.each([
    [1, 1, 2],
    [1, 2, 6],
    [1, 3, 20],
    [1, 4, 70],
    [1, 5, 252],
    [2, 2, 64],
    [2, 3, 852],
  ])('%i x %i: %i, all of them regular', (m, n, count) => {
    const found = allTriangulations(rectangle(m, n))
    expect(found.length).toBe(count)
    expect(regular(found)).toBe(count)
  })

  it('2 x 4: 12170', () => {
    expect(allTriangulations(rectangle(2, 4)).length).toBe(12170)
  })

  it('3 x 3: 46456, all but 4 of them regular', () => {
    const found = allTriangulations(rectangle(3, 3))
    expect(found.length).toBe(46456)
    expect(regular(found)).toBe(46452)
  })

  it.each([
    [1, 5, 252n],
    [2, 2, 64n],
    [2, 3, 852n],
    [2, 4, 12170n],
    [3, 3, 46456n],
    [3, 4, 2822648n],
  ])('%i x %i: %i, by sweeping', (m, n, count) => {
    expect(polygonCount(rectangle(m, n).flat(), 2 * m * n, 1e6)).toBe(count)
  })
})
