import fc from 'fast-check'
import { Matrix, solve } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import { minimumDegreeOrder, type EliminationOrder } from '../../../scoring/geometry/minimumDegree.ts'
import { SparseCholesky } from '../../../scoring/geometry/sparseCholesky.ts'

interface Pattern {
  readonly size: number
  readonly pairs: [number, number][]
}

/** Symmetric patterns with up to 40 variables, more than a machine word of bits. */
const patterns: fc.Arbitrary<Pattern> = fc
  .integer({ min: 1, max: 40 })
  .chain((size) =>
    fc.record({
      size: fc.constant(size),
      pairs: fc.array(fc.tuple(fc.nat(size - 1), fc.nat(size - 1)), { maxLength: 80 }),
    }),
  )
  .map(({ size, pairs }) => ({ size, pairs: pairs.filter(([a, b]) => a !== b) }))

function ordered({ size, pairs }: Pattern): EliminationOrder {
  const starts = Int32Array.from({ length: pairs.length + 1 }, (_, r) => 2 * r)
  return minimumDegreeOrder(size, { starts, points: Int32Array.from(pairs.flat()) })
}

/** The matrix with -1 for every pair and the given diagonal. */
function filled(order: EliminationOrder, pairs: [number, number][], diagonal: (a: number) => number) {
  const factor = new SparseCholesky(order)
  const dense = Matrix.zeros(order.size, order.size)
  for (const [a, b] of pairs) {
    factor.values[factor.entryOf(a, b)] = -1
    dense.set(a, b, -1)
    dense.set(b, a, -1)
  }
  for (let a = 0; a < order.size; a++) {
    factor.values[factor.entryOf(a, a)] = diagonal(a)
    dense.set(a, a, diagonal(a))
  }
  return { factor, dense }
}

describe('minimum-degree order', () => {
  it('eliminates a variable of least degree each time, with the fill that this causes', () => {
    fc.assert(
      fc.property(patterns, (pattern) => {
        const { size, order, positionOf, starts, rows } = ordered(pattern)
        const graph = Array.from({ length: size }, () => new Set<number>())
        for (const [a, b] of pattern.pairs) {
          graph[a].add(b)
          graph[b].add(a)
        }
        const left = new Set(graph.keys())
        for (let p = 0; p < size; p++) {
          const pivot = order[p]
          expect(positionOf[pivot]).toBe(p)
          expect(graph[pivot].size).toBe(Math.min(...[...left].map((v) => graph[v].size)))
          const column = Array.from(rows.subarray(starts[p], starts[p + 1]), (position) => order[position])
          expect(new Set(column)).toEqual(new Set([pivot, ...graph[pivot]]))
          expect(column[0]).toBe(pivot)
          left.delete(pivot)
          for (const a of graph[pivot]) {
            graph[a].delete(pivot)
            for (const b of graph[pivot]) if (a !== b) graph[a].add(b)
          }
        }
      }),
      { numRuns: 60 },
    )
  })

  it('eliminates a path without fill', () => {
    const path = { size: 50, pairs: Array.from({ length: 49 }, (_, a): [number, number] => [a, a + 1]) }
    expect(ordered(path).rows).toHaveLength(99)
  })
})

describe('sparse Cholesky factor', () => {
  it('solves like a dense solver', () => {
    fc.assert(
      fc.property(patterns, fc.infiniteStream(fc.integer({ min: -9, max: 9 })), (pattern, stream) => {
        const { factor, dense } = filled(ordered(pattern), pattern.pairs, (a) => 90 + a)
        const right = Float64Array.from({ length: pattern.size }, () => stream.next().value)
        const expected = solve(dense, Matrix.columnVector(right)).to1DArray()
        expect(factor.factorise()).toBe(true)
        factor.solve(right, right)
        expected.forEach((value, a) => expect(right[a]).toBeCloseTo(value, 12))
      }),
      { numRuns: 60 },
    )
  })

  it('refuses an indefinite matrix', () => {
    const { factor } = filled(ordered({ size: 2, pairs: [[0, 1]] }), [[0, 1]], () => 1)
    expect(factor.factorise()).toBe(false)
  })

  it('sets aside small pivots and solves on the others', () => {
    fc.assert(
      fc.property(patterns, fc.array(fc.nat(39), { maxLength: 6 }), (pattern, negative) => {
        const { factor, dense } = filled(ordered(pattern), pattern.pairs, (a) =>
          negative.includes(a) ? -5 : 90,
        )
        factor.factoriseSettingAside(0.1)
        const aside = Array.from(factor.aside.keys()).filter((a) => factor.aside[a] === 1)
        expect(aside).toEqual([...new Set(negative)].filter((a) => a < pattern.size).sort((a, b) => a - b))
        const kept = Array.from(factor.aside.keys()).filter((a) => factor.aside[a] === 0)
        const right = Float64Array.from({ length: pattern.size }, (_, a) => 1 + (a % 7))
        const solution = new Float64Array(pattern.size)
        factor.solve(right, solution)
        for (const a of aside) expect(solution[a]).toBe(0)
        if (kept.length === 0) return
        const expected = solve(
          dense.selection(kept, kept),
          Matrix.columnVector(kept.map((a) => right[a])),
        ).to1DArray()
        expected.forEach((value, k) => expect(solution[kept[k]]).toBeCloseTo(value, 12))
      }),
      { numRuns: 60 },
    )
  })
})
