import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InvariantError } from '../../../scoring/errors.ts'
import { leastNormPoint } from '../../../scoring/geometry/quadraticProgram.ts'
import { feasibleRows, sparseRows, valueOf } from './randomPrograms.ts'

describe('least-norm point', () => {
  it('satisfies the conditions of Karush, Kuhn and Tucker', () => {
    fc.assert(
      fc.property(feasibleRows, ({ size, rows }) => {
        const { point, multipliers } = leastNormPoint(size, sparseRows(rows))
        const length = Math.max(...point.map(Math.abs))
        const stationary = Float64Array.from(point)
        rows.forEach((row, r) => {
          const slack = valueOf(row, point) - 1
          expect(slack).toBeGreaterThan(-1e-9)
          expect(multipliers[r]).toBeGreaterThanOrEqual(-1e-9 * length)
          expect(Math.abs(slack * multipliers[r])).toBeLessThan(1e-8 * length * length)
          for (const [column, coefficient] of row) stationary[column] -= coefficient * multipliers[r]
        })
        expect(Math.max(...stationary.map(Math.abs))).toBeLessThan(1e-9 * length)
      }),
      { numRuns: 400 },
    )
  })

  it('is known in closed form for one row: a / |a|^2', () => {
    const { point } = leastNormPoint(
      3,
      sparseRows([
        [
          [0, 2],
          [2, -1],
        ],
      ]),
    )
    expect(Array.from(point)).toEqual([0.4, 0, -0.2].map((x) => expect.closeTo(x, 14)))
  })

  it('takes repeated and dependent active rows', () => {
    const rows = sparseRows([
      [[0, 1]],
      [[1, 1]],
      [[0, 1]],
      [
        [0, 1],
        [1, 1],
      ],
      [
        [0, 2],
        [1, -1],
      ],
    ])
    const { point } = leastNormPoint(2, rows)
    expect(Array.from(point)).toEqual([1, 1].map((x) => expect.closeTo(x, 13)))
  })

  it('takes a row that is active without a multiplier', () => {
    // (1, 0) is the least point of the first row alone; the second touches it.
    const { point } = leastNormPoint(
      2,
      sparseRows([
        [[0, 1]],
        [
          [0, 1],
          [1, 1],
        ],
        [
          [0, 1],
          [1, -3],
        ],
      ]),
    )
    expect(Array.from(point)).toEqual([1, 0].map((x) => expect.closeTo(x, 12)))
  })

  it('repeats to the bit', () => {
    fc.assert(
      fc.property(feasibleRows, ({ size, rows }) => {
        const first = leastNormPoint(size, sparseRows(rows)).point
        expect(leastNormPoint(size, sparseRows(rows)).point).toEqual(first)
      }),
      { numRuns: 50 },
    )
  })

  it('refuses rows that contradict each other', () => {
    expect(() => leastNormPoint(1, sparseRows([[[0, 1]], [[0, -1]]]))).toThrow(InvariantError)
    const cyclic = sparseRows([
      [
        [0, 1],
        [1, -1],
      ],
      [
        [1, 1],
        [2, -1],
      ],
      [
        [2, 1],
        [0, -1],
      ],
    ])
    expect(() => leastNormPoint(3, cyclic)).toThrow(InvariantError)
  })
})
