import { describe, expect, it } from 'vitest'
import { gcdOf } from '../../../scoring/geometry/integers.ts'
import { intersectionNumber } from '../../../scoring/geometry/intersectionNumbers.ts'
import { rowLists } from './randomPrograms.ts'
import { classOf, someVertices, topologyOf } from './stages.ts'

describe('curve rows', () => {
  const samples = someVertices(40).map(({ id, vertices }) => ({ id, ...topologyOf(classOf(vertices, 3)) }))

  it('are integral multiples of D_i . D_j . D_k, one row for every edge', () => {
    for (const { class: cls, numbers, curves } of samples) {
      const rows = rowLists(curves)
      expect(rows).toHaveLength(numbers.edges.length / 2)
      rows.forEach((row, e) => {
        const [i, j] = numbers.edges.subarray(2 * e, 2 * e + 2)
        const full = Array.from({ length: cls.polytope.pointCount }, (_, k) =>
          intersectionNumber(numbers, i, j, k),
        )
        const dense = full.map(() => 0)
        for (const [k, coefficient] of row) dense[k] = coefficient
        const divisor = gcdOf(full) / gcdOf(dense)
        expect(dense.every(Number.isInteger)).toBe(true)
        expect(dense.map((coefficient) => coefficient * divisor)).toEqual(full)
      })
    }
  })

  it('are linear relations of the points', () => {
    for (const { class: cls, curves } of samples) {
      const { points } = cls.polytope
      for (const row of rowLists(curves)) {
        for (let axis = 0; axis < 4; axis++) {
          expect(row.reduce((sum, [k, coefficient]) => sum + coefficient * points[4 * k + axis], 0)).toBe(0)
        }
      }
    }
  })

  it('list points in ascending order without zeros', () => {
    for (const { curves } of samples) {
      for (const row of rowLists(curves)) {
        row.forEach(([k, coefficient], q) => {
          expect(coefficient).not.toBe(0)
          if (q > 0) expect(k).toBeGreaterThan(row[q - 1][0])
        })
      }
    }
  })

  it('are the circuits v_k + v_l = a v_i + b v_j on edges inside 2-faces', () => {
    for (const { class: cls, numbers, curves } of samples) {
      const { triangles, faceOf } = cls
      rowLists(curves).forEach((row, e) => {
        const [i, j] = numbers.edges.subarray(2 * e, 2 * e + 2)
        const around = Array.from(faceOf.keys()).filter((t) => {
          const corners = triangles.subarray(3 * t, 3 * t + 3)
          return corners.includes(i) && corners.includes(j)
        })
        if (faceOf[around[0]] !== faceOf[around[1]]) return
        const opposite = row.filter(([k]) => k !== i && k !== j)
        const own = row.filter(([k]) => k === i || k === j)
        expect(opposite.map(([, coefficient]) => coefficient)).toEqual([1, 1])
        expect(own.reduce((sum, [, coefficient]) => sum + coefficient, 0)).toBe(-2)
      })
    }
  })

  it('pair primitively with the components of split divisors on edges of the polytope', () => {
    let divided = 0
    for (const { class: cls, numbers, curves } of samples) {
      const { components, edges: polytopeEdges } = cls.polytope
      rowLists(curves).forEach((row, e) => {
        const [i, j] = numbers.edges.subarray(2 * e, 2 * e + 2)
        if (!polytopeEdges.some((edge) => edge.includes(i) && edge.includes(j))) return
        expect(gcdOf(row.map(([k, coefficient]) => coefficient / components[k]))).toBe(1)
        if (gcdOf(row.map(([, coefficient]) => coefficient)) > 1) divided++
      })
    }
    // Rows that the plain gcd would have divided further occur among the samples.
    expect(divided).toBeGreaterThan(0)
  })
})
