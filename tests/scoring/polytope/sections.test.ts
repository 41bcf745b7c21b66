import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { boundaryLattice } from '../../../scoring/geometry/boundaryLattice.ts'
import { hull } from '../../../scoring/geometry/hull.ts'
import { gcdOf } from '../../../scoring/geometry/integers.ts'
import { planeMinors, spaceNormal } from '../../../scoring/geometry/minors.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { polytopeSummary } from '../../../scoring/geometry/polytopeSummary.ts'
import { reflexiveSections } from '../../../scoring/geometry/sections.ts'
import { bundled } from './bundled.ts'
import { rowsOfFour, transformed, unimodular } from './unimodular.ts'

const small = bundled('small').filter((_, at) => at % 60 === 3)
const some = [...small, ...bundled('large').filter(({ id }) => /^w(9-39|20-17|25-11|40-8)-/.test(id))]

/** Every subspace that lattice points span, as the set of lattice points in it. */
function spanned(polytope: Polytope, dimension: 2 | 3): Map<string, { points: number[]; normal: number[] }> {
  const { points, count } = boundaryLattice(polytope)
  const found = new Map<string, { points: number[]; normal: number[] }>()
  const minors = new Float64Array(6)
  const normal = new Float64Array(4)
  const zero = (values: Float64Array): boolean => values.every((value) => value === 0)
  const all = Array.from({ length: count }, (_, p) => p)
  for (const a of all) {
    for (const b of all.slice(a + 1)) {
      planeMinors(points, a, b, minors)
      if (zero(minors)) continue
      const inPlane = all.filter((c) => (spaceNormal(points, minors, c, normal), zero(normal)))
      if (dimension === 2) found.set(inPlane.join(), { points: inPlane, normal: [] })
      else {
        for (const c of all.slice(b + 1)) {
          if (inPlane.includes(c)) continue
          spaceNormal(points, minors, c, normal)
          const here = [...normal]
          const on = all.filter((p) => here.reduce((sum, n, axis) => sum + n * points[4 * p + axis], 0) === 0)
          found.set(on.join(), { points: on, normal: here.map((n) => n / gcdOf(here)) })
        }
      }
    }
  }
  return found
}

/** Coordinates of points in the span, by elimination of all others: rational, cleared of denominators. */
function planeCoordinates(rows: readonly number[][]): number[][] {
  const axes = [0, 1, 2, 3]
    .flatMap((i) => [0, 1, 2, 3].map((j) => [i, j]))
    .find(([i, j]) => rows.some((u) => rows.some((v) => u[i] * v[j] - u[j] * v[i] !== 0))) as number[]
  return rows.map((row) => axes.map((axis) => row[axis]))
}

/** Does the hull of vectors in the plane have the origin inside? Each open half plane must hold one. */
const surrounds = (vectors: readonly number[][]): boolean =>
  vectors.every(([a, b]) => vectors.some(([c, d]) => a * d - b * c > 0)) &&
  vectors.every(([a, b]) => vectors.some(([c, d]) => a * d - b * c < 0))

describe('reflexive sections, against all subspaces that lattice points span', () => {
  it.each(small.map(({ id, vertices }) => ({ id, vertices })))('of $id', ({ vertices }) => {
    const polytope = polytopeFromPoints(vertices)
    const { points } = boundaryLattice(polytope)
    const rows = rowsOfFour(points)
    const { planar, solid } = reflexiveSections(polytope)

    const planes = [...spanned(polytope, 2).values()].filter((plane) =>
      surrounds(planeCoordinates(plane.points.map((p) => rows[p]))),
    )
    expect(planar.map((section) => [...section.points].sort((a, b) => a - b).join()).sort()).toEqual(
      planes.map((plane) => plane.points.join()).sort(),
    )

    // In a basis of the hyperplane, joined to a point on either side of it: facets of the suspension at distance 1
    // show the hull of its lattice points to be reflexive; the section is no larger when a lattice point lies on
    // every edge that crosses.
    const spaces = [...spanned(polytope, 3).values()].filter(({ points: on, normal }) => {
      const value = (p: number): number => rows[p].reduce((sum, x, axis) => sum + x * normal[axis], 0)
      const crossings = polytope.edges.every((edge) => {
        const [u, v] = [value(edge[0]), value(edge[edge.length - 1])]
        return u * v >= 0 || edge.some((p) => value(p) === 0)
      })
      if (!crossings) return false
      const apex = rows.find((_, p) => value(p) === 1) ?? unitOver(normal)
      const suspension = [...on.map((p) => rows[p]), apex, apex.map((x) => -x)]
      const found = hull(suspension)
      expect(found.kind).toBe('hull')
      return found.kind === 'hull' && found.facets.every(({ offset }) => offset === 1)
    })
    expect(solid.map((section) => section.points.join()).sort()).toEqual(
      spaces.map((space) => space.points.join()).sort(),
    )
  })
})

/** A lattice point on which the primitive functional is 1, by trial. */
function unitOver(normal: readonly number[]): number[] {
  const range = [-3, -2, -1, 0, 1, 2, 3]
  for (const a of range)
    for (const b of range)
      for (const c of range)
        for (const d of range)
          if (a * normal[0] + b * normal[1] + c * normal[2] + d * normal[3] === 1) return [a, b, c, d]
  throw new Error('the functional is not primitive')
}

describe('summary of a polytope', () => {
  it('does not depend on coordinates', () => {
    fc.assert(
      fc.property(fc.constantFrom(...some), unimodular(6, 2), ({ vertices }, operations) => {
        expect(polytopeSummary(polytopeFromPoints(transformed(vertices, operations)))).toEqual(
          polytopeSummary(polytopeFromPoints(vertices)),
        )
      }),
      { numRuns: 12, seed: 3 },
    )
  })

  it.each(some.map(({ id, vertices }) => ({ id, vertices })))('adds up for $id', ({ vertices }) => {
    const polytope = polytopeFromPoints(vertices)
    const summary = polytopeSummary(polytope)
    const { pointsOnVertices, pointsOnEdges, pointsOnFaces, pointsOnFacets } = summary
    expect(pointsOnVertices + pointsOnEdges + pointsOnFaces + pointsOnFacets).toBe(polytope.latticePoints - 1)
    expect(summary.vertices - summary.edges + summary.faces - summary.facets).toBe(0)
    const { solid, planar } = reflexiveSections(polytope)
    const pairs = solid.flatMap((space) =>
      planar.filter((plane) => plane.points.every((p) => space.points.includes(p))),
    )
    expect(summary.nestedSections).toBe(pairs.length)

    // Ehrhart's polynomial of a reflexive polytope has a palindromic h* = (1, h1, h2, h1, 1) (Hibi 1992, from
    // memory), so the points of P and of 2 P give the volume 2 + 2 h1 + h2.
    const doubled = pointsOfDouble(polytope)
    expect(summary.normalisedVolume).toBe(doubled - 3 * (polytope.latticePoints - 5) - 13)
  })
})

/** Lattice points of twice the polytope, in the box of its vertices. */
function pointsOfDouble(polytope: Polytope): number {
  const facets = rowsOfFour(polytope.facets)
  const vertices = rowsOfFour(polytope.points).slice(0, polytope.vertexCount)
  const range = (axis: number): number[] => {
    const least = 2 * Math.min(...vertices.map((v) => v[axis]))
    const most = 2 * Math.max(...vertices.map((v) => v[axis]))
    return Array.from({ length: most - least + 1 }, (_, i) => least + i)
  }
  let count = 0
  for (const a of range(0))
    for (const b of range(1))
      for (const c of range(2))
        for (const d of range(3)) {
          if (facets.every((m) => a * m[0] + b * m[1] + c * m[2] + d * m[3] >= -2)) count++
        }
  return count
}
