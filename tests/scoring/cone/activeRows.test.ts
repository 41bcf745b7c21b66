import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { pointOnActiveRows } from '../../../scoring/geometry/activeRows.ts'
import { NormalMatrix } from '../../../scoring/geometry/normalMatrix.ts'
import { leastNormPoint } from '../../../scoring/geometry/quadraticProgram.ts'
import { feasibleRows, sparseRows } from './randomPrograms.ts'

const changes = 400

describe('active rows', () => {
  it('lead to the point of least norm from no rows at all', () => {
    fc.assert(
      fc.property(feasibleRows, ({ size, rows: lists }) => {
        const rows = sparseRows(lists)
        const slack = new Float64Array(lists.length).fill(1)
        const none = new Float64Array(lists.length)
        const start = new Float64Array(size)
        const found = pointOnActiveRows(rows, new NormalMatrix(size, rows), start, slack, none, changes)
        const expected = leastNormPoint(size, rows).point
        const scale = Math.max(...expected.map(Math.abs))
        expect(found).toBeDefined()
        found?.point.forEach((value, k) => expect(Math.abs(value - expected[k])).toBeLessThan(1e-8 * scale))
        expect(Math.min(...(found?.multipliers ?? []))).toBeGreaterThanOrEqual(0)
      }),
      { numRuns: 300 },
    )
  })

  it('drop the row that a contradiction makes superfluous', () => {
    // x >= 1 and 2x >= 1 as equations contradict each other; only the first binds.
    const rows = sparseRows([[[0, 1]], [[0, 2]]])
    const all = Float64Array.of(1, 1)
    const found = pointOnActiveRows(
      rows,
      new NormalMatrix(1, rows),
      Float64Array.of(1),
      all,
      all.map(() => 9),
      9,
    )
    expect(found?.point[0]).toBeCloseTo(1, 12)
    expect(Array.from(found?.multipliers ?? [])).toEqual([expect.closeTo(1, 12), 0])
  })

  it('give up when no point satisfies the rows, or too few changes are allowed', () => {
    const opposed = sparseRows([[[0, 1]], [[0, -1]]])
    const none = new Float64Array(2)
    const slack = Float64Array.of(1, 1)
    const start = new Float64Array(2)
    expect(
      pointOnActiveRows(opposed, new NormalMatrix(1, opposed), start.slice(1), slack, none, changes),
    ).toBeUndefined()
    const two = sparseRows([[[0, 1]], [[1, 1]]])
    expect(pointOnActiveRows(two, new NormalMatrix(2, two), start, slack, none, 1)).toBeUndefined()
    expect(pointOnActiveRows(two, new NormalMatrix(2, two), start, slack, none, 2)).toBeDefined()
  })
})
