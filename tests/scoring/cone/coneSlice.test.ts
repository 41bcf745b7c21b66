import { describe, expect, it } from 'vitest'
import { classFromHeights } from '../../../scoring/geometry/twoFaceClass.ts'
import { coneSlice, type ConeSlice } from '../../../scoring/geometry/coneSlice.ts'
import { InnerCone } from '../../../scoring/geometry/innerCone.ts'
import { intersectionNumbers } from '../../../scoring/geometry/intersectionNumbers.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { referencePoint } from '../../../scoring/geometry/referencePoint.ts'
import { curveRows } from '../../../scoring/geometry/curves.ts'
import { rowCount, stackRows, type SparseRows } from '../../../scoring/geometry/sparseRows.ts'
import { polytopeFromWeights } from '../../../scoring/geometry/weights.ts'

function sliced(weights: number[], side: 'fan' | 'newton', seed: number) {
  const polytope = polytopeFromWeights(weights, side)
  const given = classFromHeights(polytope, quadraticHeights(polytope, { seed, noise: 0.49 }))
  if (!given.fine) throw new Error('quadratic heights are fine')
  const numbers = intersectionNumbers(given.class)
  const { weights: reference } = referencePoint(given.class, numbers)
  const slice = (...directions: Parameters<typeof coneSlice>[3]) =>
    coneSlice(given.class, numbers, reference, directions)
  const all = stackRows(curveRows(given.class, numbers), new InnerCone(given.class).allCircuits())
  return { polytope, reference, slice, all }
}

/** Values of all rows along a vector. */
function along({ starts, points, coefficients }: SparseRows, r: number, vector: ArrayLike<number>): number {
  let sum = 0
  for (let e = starts[r]; e < starts[r + 1]; e++) sum += coefficients[e] * vector[points[e]]
  return sum
}

const inside = (polygon: ConeSlice['cone'], x: number, y: number, slack: number) =>
  polygon.length > 2 &&
  polygon.every((corner, at) => {
    const next = polygon[(at + 1) % polygon.length]
    const cross = (next.x - corner.x) * (y - corner.y) - (next.y - corner.y) * (x - corner.x)
    return cross >= -slack * Math.hypot(next.x - corner.x, next.y - corner.y)
  })

describe('a slice of the cone', () => {
  it.each([
    [[1, 1, 2, 2, 2], 'fan', 1],
    [[6, 7, 7, 9, 13], 'newton', 1],
    [[3, 5, 6, 7, 7], 'fan', 3],
  ] as const)('of %j %s is what all curves and circuits leave of the plane', (weights, side, seed) => {
    const { polytope, reference, slice, all } = sliced([...weights], side, seed)
    const divisors: [number, number] = [0, polytope.pointCount - 1]
    const { cone, stretched, reach, directions } = slice({ divisor: divisors[0] }, { divisor: divisors[1] })
    // The plane again, from the divisors: e_i less its part along the linear relations, by normal equations.
    const [first, second] = divisors.map((point) => projected(polytope, point))
    const at = (x: number, y: number) => {
      // (x, y) = a * first + b * second in the directions of the slice.
      const b = y / directions[1][1]
      const a = x - b * directions[1][0]
      return reference.map((w, p) => w + a * first[p] + b * second[p])
    }
    let compared = 0
    for (let n = 0; n < 200; n++) {
      const x = reach * Math.cos(n * 2.4) * (n / 200) ** 2
      const y = reach * Math.sin(n * 2.4) * (n / 200) ** 2
      const w = at(x, y)
      let least = Infinity
      for (let r = 0; r < rowCount(all); r++) least = Math.min(least, along(all, r, w))
      for (const [polygon, level] of [
        [cone, 0],
        [stretched, 1],
      ] as const) {
        if (Math.abs(least - level) < 1e-6 * reach) continue
        expect(inside(polygon, x, y, 1e-9 * reach)).toBe(least > level)
        compared++
      }
    }
    expect(compared).toBeGreaterThan(300)
  })

  it('towards the nearest walls meets the first at its distance, straight ahead', () => {
    const { slice } = sliced([6, 7, 7, 9, 13], 'newton', 1)
    const { nearest, walls, cone } = slice({ wall: 0 }, { wall: 1 })
    expect(walls[0].row).toEqual(nearest[0].row)
    expect(walls[0].distance).toBeCloseTo(nearest[0].distance, 12)
    // C . w = value + slope . (x, y) vanishes at (distance, 0).
    expect(walls[0].value + walls[0].slope[0] * nearest[0].distance).toBeCloseTo(0, 9)
    expect(walls[0].slope[1]).toBeCloseTo(0, 9)
    expect(cone.some(({ line }) => line === 0)).toBe(true)
    for (const { row, edges } of nearest) {
      expect(edges.length > 0 || row.length <= 5).toBe(true)
    }
  })

  it('along the ray has its corner at the origin, and holds the stretched cone', () => {
    const { slice, reference } = sliced([6, 7, 7, 9, 13], 'newton', 1)
    const { cone, stretched } = slice({ ray: true }, { wall: 0 })
    const norm = Math.hypot(...reference)
    expect(cone.some(({ x, y }) => Math.hypot(x + norm, y) < 1e-6 * norm)).toBe(true)
    expect(inside(stretched, norm, 0, 0)).toBe(true)
    expect(inside(stretched, -1e-3 * norm, 0, 0)).toBe(false)
  })

  it('with one modulus, or along one class twice, is none', () => {
    expect(() => sliced([1, 1, 1, 1, 1], 'fan', 0).slice({ divisor: 0 }, { divisor: 1 })).toThrow(
      'span no plane',
    )
    const { slice } = sliced([1, 1, 2, 2, 2], 'fan', 1)
    expect(() => slice({ divisor: 0 }, { divisor: 0 })).toThrow('span no plane')
    expect(() => slice({ divisor: 0 }, { divisor: 99 })).toThrow('There is no D99; the last is')
  })
})

/** The unit vector of a point less its part along the four linear relations, normalised. */
function projected({ points, pointCount }: ReturnType<typeof polytopeFromWeights>, point: number): number[] {
  const v = (p: number) => [0, 1, 2, 3].map((axis) => points[4 * p + axis])
  const gram = [0, 1, 2, 3].map((a) =>
    [0, 1, 2, 3].map((b) => {
      let sum = 0
      for (let p = 0; p < pointCount; p++) sum += v(p)[a] * v(p)[b]
      return sum
    }),
  )
  const right = v(point)
  // Gauss-Jordan on four positive definite equations.
  for (let a = 0; a < 4; a++) {
    const pivot = gram[a][a]
    for (let c = 0; c < 4; c++) gram[a][c] /= pivot
    right[a] /= pivot
    for (let b = 0; b < 4; b++) {
      if (b === a) continue
      const factor = gram[b][a]
      for (let c = 0; c < 4; c++) gram[b][c] -= factor * gram[a][c]
      right[b] -= factor * right[a]
    }
  }
  const vector = Array.from({ length: pointCount }, (_, p) => {
    const share = v(p).reduce((sum, entry, axis) => sum + entry * right[axis], 0)
    return (p === point ? 1 : 0) - share
  })
  const length = Math.hypot(...vector)
  return vector.map((entry) => entry / length)
}
