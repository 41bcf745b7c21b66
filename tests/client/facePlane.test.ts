// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import {
  compactPlane,
  distanceToSegment,
  edgesOf,
  extent,
  type Point2,
} from '../../src/components/geometry/facePlane.ts'

const twiceArea = ([a, b, c]: readonly Point2[]) =>
  a && b && c ? (b[0] - a[0]) * (c[1] - a[1]) - (c[0] - a[0]) * (b[1] - a[1]) : 0

describe('compactPlane', () => {
  it('undoes a shear: a sheared unit square is a unit square again', () => {
    const square: Point2[] = [
      [0, 0],
      [1, 7],
      [1, 8],
      [0, 1],
    ]
    expect(extent(compactPlane(square, square))).toEqual([1, 1])
  })

  it('is a change of lattice basis: areas keep their size, points stay integral and apart', () => {
    const coordinate = fc.integer({ min: -40, max: 40 })
    const point = fc.tuple(coordinate, coordinate)
    fc.assert(
      fc.property(fc.uniqueArray(point, { minLength: 3, maxLength: 12, selector: String }), (points) => {
        const drawn = compactPlane(points, points)
        expect(drawn.flat().every((value) => Number.isInteger(value) && value >= 0)).toBe(true)
        expect(new Set(drawn.map(String)).size).toBe(points.length)
        for (let at = 0; at + 2 < points.length; at++) {
          expect(Math.abs(twiceArea(drawn.slice(at, at + 3)))).toBe(
            Math.abs(twiceArea(points.slice(at, at + 3))),
          )
        }
      }),
    )
  })

  it('lays the longer side across', () => {
    const tall: Point2[] = [
      [0, 0],
      [1, 0],
      [0, 9],
    ]
    const [width, height] = extent(compactPlane(tall, tall))
    expect(width).toBeGreaterThanOrEqual(height)
  })
})

describe('edges and distances', () => {
  it('lists each edge of a triangulation once', () => {
    expect(
      edgesOf([
        [0, 1, 2],
        [1, 2, 3],
      ]),
    ).toEqual([
      [0, 1],
      [0, 2],
      [1, 2],
      [1, 3],
      [2, 3],
    ])
  })

  it('measures to the segment, not to its line', () => {
    expect(distanceToSegment([3, 0], [0, 0], [1, 0])).toBe(2)
    expect(distanceToSegment([0.5, 0.25], [0, 0], [1, 0])).toBe(0.25)
  })
})
