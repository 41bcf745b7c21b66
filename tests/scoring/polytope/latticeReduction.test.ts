import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  applyBig,
  reducedBasis,
  rowsOf,
  transform,
  transposed,
} from '../../../scoring/geometry/latticeReduction.ts'
import { quintic, transformed, unimodular } from './unimodular.ts'

const big = (points: readonly (readonly number[])[]): bigint[][] => points.map((point) => point.map(BigInt))

describe('reducedBasis', () => {
  it('makes a sheared quintic small again', () => {
    fc.assert(
      fc.property(unimodular(12, 900), (operations) => {
        const sheared = transformed(quintic, operations)
        fc.pre(sheared.flat().every(Number.isSafeInteger))
        const { matrix } = reducedBasis(big(sheared))
        for (const point of big(sheared)) {
          for (const entry of applyBig(matrix, point)) expect(entry >= -2n && entry <= 2n).toBe(true)
        }
      }),
    )
  })

  it('gives a change of basis whose dual is the inverse transpose', () => {
    const entry = fc.integer({ min: -1000, max: 1000 })
    fc.assert(
      fc.property(
        fc.array(fc.tuple(entry, entry, entry, entry), { minLength: 1, maxLength: 9 }),
        (points) => {
          const { matrix, dual } = reducedBasis(big([...points, ...quintic]))
          const product = matrix.map((row) => applyBig(dual, row).map(String).join())
          expect(product).toEqual(['1,0,0,0', '0,1,0,0', '0,0,1,0', '0,0,0,1'])
        },
      ),
    )
  })

  it('refuses points in a hyperplane through the origin', () => {
    expect(() =>
      reducedBasis(
        big([
          [1, 0, 0, 0],
          [0, 1, 0, 0],
          [0, 0, 1, 0],
          [1, 1, 1, 0],
        ]),
      ),
    ).toThrow('four dimensions')
  })
})

describe('transform', () => {
  it('agrees with big integers where doubles would lose digits', () => {
    const matrix = [
      [2n ** 40n + 1n, 1n, 0n, 0n],
      [0n, 1n, 0n, 0n],
      [0n, 0n, 1n, 0n],
      [0n, 0n, 0n, 1n],
    ]
    expect(transform(matrix, [4095, -(2 ** 40) * 4095, 7, 8])).toEqual([4095, -(2 ** 40) * 4095, 7, 8])
    expect(rowsOf([1, 2, 3, 4, 5, 6, 7, 8])).toEqual([
      [1n, 2n, 3n, 4n],
      [5n, 6n, 7n, 8n],
    ])
    expect(
      transposed([
        [1n, 2n],
        [3n, 4n],
      ]),
    ).toEqual([
      [1n, 3n],
      [2n, 4n],
    ])
  })
})
