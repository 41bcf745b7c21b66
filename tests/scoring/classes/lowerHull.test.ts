import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isGeneric, tiedCircuits } from '../../../scoring/geometry/circuits.ts'
import { classFromHeights, fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { latticePolygon, polygonAlone, rectangle, turn } from './polygonAlone.ts'

type PlanePoint = readonly [number, number]

/** Points that lie on or above a segment or triangle of other lifted points: no vertices of the lower hull. */
function unusedByTrial(points: readonly PlanePoint[], heights: readonly number[]): number[] {
  const all = [...points.keys()]
  return all.filter((p) => {
    const others = all.filter((q) => q !== p)
    for (const a of others) {
      for (const b of others) {
        if (a === b) continue
        const alongX = points[b][0] - points[a][0]
        const alongY = points[b][1] - points[a][1]
        const along = (points[p][0] - points[a][0]) * alongX + (points[p][1] - points[a][1]) * alongY
        const whole = alongX ** 2 + alongY ** 2
        const onLine = turn(points[a], points[b], points[p]) === 0
        if (onLine && along > 0 && along < whole) {
          if (heights[p] * whole >= heights[a] * (whole - along) + heights[b] * along) return true
        }
        for (const c of others) {
          const area = turn(points[a], points[b], points[c])
          if (area <= 0) continue
          const shares = [turn(points[p], points[b], points[c]), turn(points[a], points[p], points[c])]
          shares.push(area - shares[0] - shares[1])
          if (shares.some((share) => share < 0)) continue
          if (heights[p] * area >= shares[0] * heights[a] + shares[1] * heights[b] + shares[2] * heights[c])
            return true
        }
      }
    }
    return false
  })
}

/** Every triangle lies below all points when lifted, and together they have the polygon's area. */
function isLowerHull(
  points: readonly PlanePoint[],
  heights: readonly number[],
  triangles: Int32Array,
): boolean {
  let area = 0
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = triangles.subarray(t, t + 3)
    const signed = turn(points[a], points[b], points[c])
    area += Math.abs(signed)
    for (const p of points.keys()) {
      const shares = [turn(points[p], points[b], points[c]), turn(points[a], points[p], points[c])]
      const plane =
        shares[0] * heights[a] + shares[1] * heights[b] + (signed - shares[0] - shares[1]) * heights[c]
      if (Math.sign(signed) * (heights[p] * signed - plane) < 0) return false
    }
  }
  return area === polygonAlone(points).twoFaces[0].area
}

const coordinate = fc.integer({ min: 0, max: 4 })
const polygon = fc
  .array(fc.tuple(coordinate, coordinate), { minLength: 3, maxLength: 6 })
  .filter((corners) => corners.some((p) => corners.some((q) => turn(corners[0], p, q) !== 0)))
  .map((corners) => latticePolygon(corners))

describe('heights on a lattice polygon', () => {
  it('leave out exactly the points that trying all triangles shows not to be vertices of the lower hull', () => {
    const seen = { fine: 0, coarse: 0 }
    fc.assert(
      fc.property(
        polygon,
        fc.integer(),
        fc.constantFrom(1, 2, 5, 1000),
        fc.nat(2),
        (points, seed, spread, bend) => {
          // Small spreads make ties of every kind; the quadratic part makes some of the heights fine.
          let state = seed
          const heights = points.map(([x, y]) => {
            state = (Math.imul(state, 1103515245) + 12345) | 0
            return (Math.abs(state >> 8) % spread) + bend * (x * x + y * y)
          })
          const outcome = classFromHeights(polygonAlone(points), heights)
          const unused = unusedByTrial(points, heights)
          expect(outcome.fine ? [] : Array.from(outcome.unused)).toEqual(unused)
          const triangles = outcome.fine ? outcome.class.triangles : outcome.triangles
          expect(isLowerHull(points, heights, triangles)).toBe(true)
          seen[outcome.fine ? 'fine' : 'coarse']++
        },
      ),
      { numRuns: 400 },
    )
    expect(seen.fine).toBeGreaterThan(50)
    expect(seen.coarse).toBeGreaterThan(50)
  })

  it('that are flat around a point do not use it, though no single edge shows it', () => {
    // A trapezoid cut by the two edges from the middle of its long side: both are ties of parallelograms.
    const trapezoid = polygonAlone([
      [0, 0],
      [0, 1],
      [1, 0],
      [1, 1],
      [2, 0],
    ])
    const star = fineClass(trapezoid, [0, 0, -1, 0, 0])
    if (star === undefined) throw new Error('a low point is used')
    const outcome = classFromHeights(trapezoid, new Float64Array(5), star)
    expect(outcome.fine).toBe(false)
    if (!outcome.fine) expect(Array.from(outcome.unused)).toEqual([2])
  })

  it('that tie are decided by point index, whatever the start, and the tie is reported', () => {
    const square = polygonAlone(rectangle(1, 1))
    const flat = new Float64Array(4)
    const first = classFromHeights(square, flat)
    if (!first.fine) throw new Error('a flat square uses its four corners')
    // Point 0 counts as raised most: the diagonal avoids it.
    expect(Array.from(first.class.triangles)).toEqual([0, 1, 2, 1, 2, 3])
    const other = classFromHeights(square, [-1, 0, 0, -1])
    if (!other.fine) throw new Error('convex heights are fine')
    expect(Array.from(other.class.triangles)).toEqual([0, 1, 3, 0, 2, 3])
    const again = classFromHeights(square, flat, other.class)
    expect(again.fine && again.class.triangles).toEqual(first.class.triangles)
    expect(Array.from(tiedCircuits(first.class, flat))).toEqual([0])
    expect(isGeneric(first.class, flat)).toBe(false)
  })
})
