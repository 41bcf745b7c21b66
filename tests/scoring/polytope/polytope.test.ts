import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { gcdOf } from '../../../scoring/geometry/integers.ts'
import type { Polytope, TwoFace } from '../../../scoring/geometry/polytope.ts'
import { dualPolytope, polytopeFromPoints, reducedPolytope } from '../../../scoring/geometry/polytope.ts'
import { bundledSpread } from './bundled.ts'
import { quintic, rowsOfFour, transformed, unimodular } from './unimodular.ts'

const sample = bundledSpread(13)
const polytopes = sample.map(({ id, vertices }) => ({ id, vertices, polytope: polytopeFromPoints(vertices) }))

const point = (p: Polytope, i: number): number[] => [...p.points.subarray(4 * i, 4 * i + 4)]
const facetsOn = (p: Polytope, x: readonly number[]): number[] =>
  rowsOfFour(p.facets).flatMap((m, a) =>
    m.reduce((sum, entry, axis) => sum + entry * x[axis], 0) === -1 ? [a] : [],
  )

/** All lattice points of the polytope by its inequalities, in the box of its vertices. */
function pointsByDefinition(p: Polytope): number[][] {
  const vertices = rowsOfFour(p.points).slice(0, p.vertexCount)
  const facets = rowsOfFour(p.facets)
  const range = (axis: number): number[] => {
    const entries = vertices.map((v) => v[axis])
    const least = Math.min(...entries)
    return Array.from({ length: Math.max(...entries) - least + 1 }, (_, i) => least + i)
  }
  const found: number[][] = []
  for (const a of range(0))
    for (const b of range(1))
      for (const c of range(2))
        for (const d of range(3))
          if (facets.every((m) => a * m[0] + b * m[1] + c * m[2] + d * m[3] >= -1)) found.push([a, b, c, d])
  return found
}

/** Points and facet normals stay within 32 bits: the polytope is accepted in the coordinates given. */
function isKept(points: readonly (readonly number[])[]): boolean {
  try {
    polytopeFromPoints(points)
    return true
  } catch (error) {
    if (error instanceof InputError && error.code === 'polytope.coordinates-too-large') return false
    throw error
  }
}

const describedFaces = (p: Polytope, to: (i: number) => number): string[] =>
  p.twoFaces
    .map(({ points, area, dualLength }) => {
      const renamed = Array.from(points, to).sort((i, j) => i - j)
      return [...renamed, area, dualLength].join()
    })
    .sort()

describe('polytopeFromPoints', () => {
  it('has the vertices it was made from, whatever else is given and in whatever order', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...polytopes),
        fc.infiniteStream(fc.nat()),
        ({ vertices, polytope }, keys) => {
          const shuffled = [...rowsOfFour(polytope.points), [0, 0, 0, 0], ...vertices]
            .map((row) => ({ row, key: keys.next().value as number }))
            .sort((a, b) => a.key - b.key)
            .map(({ row }) => row)
          expect(polytopeFromPoints(shuffled)).toEqual(polytope)
          const given = vertices.map(String).sort()
          expect(rowsOfFour(polytope.points).slice(0, polytope.vertexCount).map(String).sort()).toEqual(given)
        },
      ),
      { numRuns: 40 },
    )
  })

  it('lists all lattice points but the origin and facet interiors, in the fixed order', () => {
    let compared = 0
    for (const { polytope: p } of polytopes) {
      const vertices = rowsOfFour(p.points).slice(0, p.vertexCount)
      const box = [0, 1, 2, 3].reduce((all, axis) => {
        const entries = vertices.map((v) => v[axis])
        return all * (Math.max(...entries) - Math.min(...entries) + 1)
      }, 1)
      if (box > 60_000) continue
      compared++
      const all = pointsByDefinition(p)
      expect(p.latticePoints).toBe(all.length)
      const kept = all.filter((x) => facetsOn(p, x).length >= 2)
      const rank = (x: number[]): number => {
        const through = facetsOn(p, x).length
        if (vertices.some((v) => String(v) === String(x))) return 0
        return through === 2 ? 2 : 1
      }
      kept.sort((x, y) => rank(x) - rank(y) || x[0] - y[0] || x[1] - y[1] || x[2] - y[2] || x[3] - y[3])
      expect(rowsOfFour(p.points)).toEqual(kept)
      expect([...p.carrierDimension]).toEqual(kept.map(rank))
    }
    expect(compared).toBeGreaterThan(80)
  })

  it('has facets with primitive normals in lexicographic order, and satisfies the Euler relation', () => {
    for (const { polytope: p } of polytopes) {
      const facets = rowsOfFour(p.facets)
      expect(facets).toEqual(
        [...facets].sort((x, y) => x[0] - y[0] || x[1] - y[1] || x[2] - y[2] || x[3] - y[3]),
      )
      for (const m of facets) expect(gcdOf(m)).toBe(1)
      expect(p.vertexCount - p.edges.length + p.twoFaces.length - p.facetCount).toBe(0)
    }
  })

  it('lists the points of each edge in order, at equal steps', () => {
    for (const { polytope: p } of polytopes) {
      const onEdges: number[] = []
      for (const edge of p.edges) {
        const [first, second] = [point(p, edge[0]), point(p, edge[1])]
        const step = second.map((x, axis) => x - first[axis])
        expect(gcdOf(step)).toBe(1)
        edge.forEach((i, k) => expect(point(p, i)).toEqual(first.map((x, axis) => x + k * step[axis])))
        expect([p.carrierDimension[edge[0]], p.carrierDimension[edge.at(-1)!]]).toEqual([0, 0])
        onEdges.push(...edge.slice(1, -1))
      }
      const expected = [...p.carrierDimension].flatMap((dimension, i) => (dimension === 1 ? [i] : []))
      expect(onEdges.sort((i, j) => i - j)).toEqual(expected)
    }
  })

  it('gives the dual what belongs to it, and is the dual of its dual', () => {
    for (const { polytope: p } of polytopes) {
      const dual = dualPolytope(p)
      expect(dual.hodge).toEqual({ h11: p.hodge.h21, h21: p.hodge.h11, euler: 0 - p.hodge.euler })
      expect([dual.latticePoints, dual.dualLatticePoints]).toEqual([p.dualLatticePoints, p.latticePoints])
      expect(rowsOfFour(dual.facets)).toEqual(rowsOfFour(p.points).slice(0, p.vertexCount))
      expect(dualPolytope(dual)).toEqual(p)
    }
  })

  it('counts interior points of dual faces', () => {
    for (const { polytope: p } of polytopes) {
      const dual = dualPolytope(p)
      const dualPoints = rowsOfFour(dual.points).map((x) => facetsOn(dual, x).join())
      // A facet of the dual has the interior points that no other list counts.
      const facetInteriors = dual.latticePoints - 1 - dual.pointCount
      expect(p.dualInterior.subarray(0, p.vertexCount).reduce((sum, count) => sum + count, 0)).toBe(
        facetInteriors,
      )
      const ends = new Map<number, string>()
      for (const edge of p.edges)
        for (const i of edge.slice(1, -1)) ends.set(i, [edge[0], edge.at(-1)!].sort((a, b) => a - b).join())
      for (let i = p.vertexCount; i < p.pointCount; i++) {
        if (p.carrierDimension[i] === 1) {
          expect(p.dualInterior[i]).toBe(dualPoints.filter((through) => through === ends.get(i)).length)
          expect(p.components[i]).toBe(1)
        } else {
          const face = p.twoFaces.find(({ points }) => points.includes(i))!
          expect([p.components[i], p.dualInterior[i]]).toEqual([face.dualLength, face.dualLength - 1])
        }
      }
    }
  })

  it('counts what toric divisors miss: h11 is the number of points less 4, and components', () => {
    for (const { polytope: p } of polytopes) {
      const divisors = p.components.reduce((sum, count) => sum + count, 0)
      expect(p.hodge.h11).toBe(divisors - 4)
      expect(p.favourable).toBe(divisors === p.pointCount)
    }
  })

  it('keeps a sheared polytope exact in the coordinates given', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...polytopes.slice(0, 40)),
        unimodular(7, 90),
        ({ polytope }, operations) => {
          const sheared = transformed(rowsOfFour(polytope.points), operations)
          fc.pre(isKept(sheared))
          const found = polytopeFromPoints(sheared)
          expect(rowsOfFour(found.points).map(String).sort()).toEqual(sheared.map(String).sort())
          expect(found.hodge).toEqual(polytope.hodge)
          // Face by face, points traced through the shear.
          const position = new Map(rowsOfFour(found.points).map((x, i) => [String(x), i]))
          const moved = sheared.map((x) => position.get(String(x))!)
          expect(describedFaces(found, (i) => i)).toEqual(describedFaces(polytope, (i) => moved[i]))
        },
      ),
      { numRuns: 60 },
    )
  })
})

describe('reducedPolytope', () => {
  it('takes a quintic sheared to coordinates of 10^12 and more', () => {
    fc.assert(
      fc.property(unimodular(12, 3000), (operations) => {
        const sheared = transformed(quintic, operations)
        fc.pre(sheared.flat().every(Number.isSafeInteger))
        const polytope = reducedPolytope(sheared)
        expect(polytope.hodge).toEqual({ h11: 1, h21: 101, euler: -200 })
        expect(polytope.points.every((entry) => Math.abs(entry) <= 2)).toBe(true)
      }),
    )
    const huge = quintic.map(([a, b, c, d]) => [a, b + 1e6 * a, c + 1e6 * b + 1e12 * a, d - 1e12 * c])
    expect(reducedPolytope(huge).dualLatticePoints).toBe(126)
  })
})

describe('2-faces', () => {
  /** Lattice area of the triangle in Z^4: gcd of the 2 x 2 minors of two sides. */
  const spaceArea = (p: Polytope, [i, j, k]: number[]): number => {
    const [a, b] = [j, k].map((other) => point(p, other).map((x, axis) => x - point(p, i)[axis]))
    const minors: number[] = []
    for (let r = 0; r < 4; r++) for (let s = r + 1; s < 4; s++) minors.push(a[r] * b[s] - a[s] * b[r])
    return gcdOf(minors)
  }
  const signedArea = (face: TwoFace, [i, j, k]: number[]): number => {
    const [a, b, c] = [i, j, k].map((index) => {
      const position = face.points.indexOf(index)
      return [face.plane[2 * position], face.plane[2 * position + 1]]
    })
    return (b[0] - a[0]) * (c[1] - a[1]) - (c[0] - a[0]) * (b[1] - a[1])
  }

  it('hold exactly the points on both facets, ascending', () => {
    for (const { polytope: p } of polytopes) {
      const through = rowsOfFour(p.points).map((x) => facetsOn(p, x))
      for (const { facets, points } of p.twoFaces) {
        const on = through.flatMap((list, i) => (facets.every((a) => list.includes(a)) ? [i] : []))
        expect([...points]).toEqual(on)
      }
    }
  })

  it('are charted by a lattice basis of their plane, corners counterclockwise, least coordinates zero', () => {
    for (const { polytope: p } of polytopes) {
      for (const face of p.twoFaces) {
        const corners = [...face.corners]
        expect(corners.every((i) => i < p.vertexCount)).toBe(true)
        expect(corners.length).toBe([...face.points].filter((i) => i < p.vertexCount).length)
        let area = 0
        for (let k = 1; k + 1 < corners.length; k++) {
          const triangle = [corners[0], corners[k], corners[k + 1]]
          expect(signedArea(face, triangle)).toBe(spaceArea(p, triangle))
          expect(signedArea(face, triangle)).toBeGreaterThan(0)
          area += signedArea(face, triangle)
        }
        expect(face.area).toBe(area)
        for (const axis of [0, 1]) {
          expect(Math.min(...face.plane.filter((_, i) => i % 2 === axis))).toBe(0)
        }
      }
    }
  })

  it("satisfy Pick's theorem", () => {
    for (const { polytope: p } of polytopes) {
      for (const face of p.twoFaces) {
        const interior = [...face.points].filter((i) => p.carrierDimension[i] === 2).length
        const boundary = face.points.length - interior
        expect(face.area).toBe(2 * interior + boundary - 2)
      }
    }
  })

  it('have the lattice length of their dual edge', () => {
    for (const { polytope: p } of polytopes) {
      const facets = rowsOfFour(p.facets)
      for (const { facets: ends, dualLength } of p.twoFaces) {
        expect(dualLength).toBe(gcdOf(facets[ends[0]].map((x, axis) => x - facets[ends[1]][axis])))
      }
    }
  })
})
