import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { hull } from '../../../scoring/geometry/hull.ts'
import { affineDimension } from '../../../scoring/geometry/polytopeInput.ts'
import { facetsByDefinition } from './facetsByDefinition.ts'
import { quintic } from './unimodular.ts'

const entry = fc.integer({ min: -3, max: 3 })
const cloud = fc
  .uniqueArray(fc.tuple(entry, entry, entry, entry), { minLength: 5, maxLength: 13, selector: String })
  .filter((points) => affineDimension(points) === 4)

describe('hull', () => {
  it('finds the facets of the definition, or one that shows the origin not inside', () => {
    const kinds = new Set<string>()
    fc.assert(
      fc.property(cloud, (points) => {
        const expected = facetsByDefinition(points)
        const found = hull(points)
        kinds.add(found.kind)
        if (found.kind === 'hull') {
          const facets = found.facets.map(({ normal, offset }) =>
            [...normal, offset].map((x) => x + 0).join(),
          )
          expect(facets.sort()).toEqual(expected)
          for (const { normal, offset, vertices } of found.facets) {
            const on = found.vertices.flatMap((index, position) =>
              points[index].reduce((sum, x, axis) => sum + x * normal[axis], offset) === 0 ? [position] : [],
            )
            expect(vertices).toEqual(on)
          }
        } else if (found.kind === 'origin-not-interior') {
          expect(expected).toContain([...found.normal, found.offset].map((x) => x + 0).join())
          expect(found.offset).toBeLessThanOrEqual(0)
        }
        const inside = expected.every((facet) => Number(facet.split(',')[4]) > 0)
        expect(found.kind).toBe(inside ? 'hull' : 'origin-not-interior')
      }),
      { numRuns: 300 },
    )
    expect([...kinds].sort()).toEqual(['hull', 'origin-not-interior'])
  })

  it('finds all facets of clouds that surround the origin', () => {
    fc.assert(
      fc.property(cloud, (points) => {
        const around = new Map([...points, ...quintic].map((point) => [String(point), point]))
        const symmetric = [...around.values()].flatMap((point) => [point, point.map((x) => 0 - x)])
        const distinct = [...new Map(symmetric.map((point) => [String(point), point])).values()].slice(0, 16)
        if (affineDimension(distinct) < 4) return
        const found = hull(distinct)
        if (found.kind !== 'hull') return
        const facets = found.facets.map(({ normal, offset }) => [...normal, offset].map((x) => x + 0).join())
        expect(facets.sort()).toEqual(facetsByDefinition(distinct))
      }),
      { numRuns: 100 },
    )
  })

  it('returns vertices only, whatever the order of the points', () => {
    const cube = Array.from({ length: 81 }, (_, i) =>
      [0, 1, 2, 3].map((axis) => (Math.floor(i / 3 ** axis) % 3) - 1),
    )
    fc.assert(
      fc.property(fc.shuffledSubarray(cube, { minLength: 81, maxLength: 81 }), (points) => {
        const found = hull(points)
        if (found.kind !== 'hull') throw new Error(found.kind)
        expect(found.facets.length).toBe(8)
        expect(found.vertices.length).toBe(16)
        for (const index of found.vertices) expect(points[index].every((x) => Math.abs(x) === 1)).toBe(true)
      }),
      { numRuns: 10 },
    )
  })

  it('gives up beyond 64 vertices', () => {
    const curve = Array.from({ length: 70 }, (_, i) => {
      const t = i - 35
      return [t, t * t - 400, t * (t * t - 900), t ** 4 - 700000]
    })
    expect(hull([...curve, [0, 5000, 0, 9e7], [0, 5000, 0, -9e7]]).kind).not.toBe('hull')
    const sphere = Array.from({ length: 3 ** 4 * 81 }, (_, i) =>
      [0, 1, 2, 3].map((axis) => (Math.floor(i / 9 ** axis) % 9) - 4),
    ).filter((point) => point.reduce((sum, x) => sum + x * x, 0) === 26)
    expect(sphere.length).toBeGreaterThan(64)
    expect(hull(sphere).kind).toBe('too-many-vertices')
  })

  it('stays exact where a combination of facets needs more than 53 bits, and says when it cannot', () => {
    const large = [...quintic, [1999, 1997, -1993, 1987], [-1999, 1993, 1997, -1979], [1, -2, 3, -5]].map(
      (p) => [...p],
    )
    const found = hull(large)
    if (found.kind !== 'hull') throw new Error(found.kind)
    for (const { normal, offset } of found.facets) {
      for (const point of large) {
        const value = point.reduce((sum, x, axis) => sum + BigInt(x) * BigInt(normal[axis]), BigInt(offset))
        expect(value >= 0n).toBe(true)
      }
    }
    expect(hull(quintic.map((point) => point.map((x) => 1e9 * x))).kind).toBe('too-large')
  })
})
