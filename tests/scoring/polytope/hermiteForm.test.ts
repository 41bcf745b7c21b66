import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { hermiteForm } from '../../../scoring/geometry/hermiteForm.ts'
import { affineDimension } from '../../../scoring/geometry/polytopeInput.ts'
import { transformed, unimodular } from './unimodular.ts'

const entry = fc.integer({ min: -9, max: 9 })
const columns = fc
  .array(fc.tuple(entry, entry, entry, entry), { minLength: 4, maxLength: 8 })
  .filter((points) => affineDimension([[0, 0, 0, 0], ...points]) === 4)

const matrixOf = (points: readonly (readonly number[])[]): number[] =>
  [0, 1, 2, 3].flatMap((axis) => points.map((point) => point[axis]))

describe('hermiteForm', () => {
  it('is the same for matrices that differ by GL(4,Z)', () => {
    fc.assert(
      fc.property(columns, unimodular(10, 4), (points, operations) => {
        const form = hermiteForm(matrixOf(points), points.length)
        expect(hermiteForm(matrixOf(transformed(points, operations)), points.length)).toEqual(form)
      }),
    )
  })

  it('is an echelon matrix with positive pivots and reduced entries above them', () => {
    fc.assert(
      fc.property(columns, (points) => {
        const width = points.length
        const form = hermiteForm(matrixOf(points), width)
        let before = -1
        for (let row = 0; row < 4; row++) {
          const entries = [...form.subarray(row * width, (row + 1) * width)]
          const pivot = entries.findIndex((value) => value !== 0)
          expect(pivot).toBeGreaterThan(before)
          expect(entries[pivot]).toBeGreaterThan(0)
          for (let above = 0; above < row; above++) {
            expect(form[above * width + pivot]).toBeGreaterThanOrEqual(0)
            expect(form[above * width + pivot]).toBeLessThan(entries[pivot])
          }
          before = pivot
        }
      }),
    )
  })

  it('carries appended columns along, so that an identity gives the transformation', () => {
    fc.assert(
      fc.property(columns, (points) => {
        const width = points.length
        const bordered = [0, 1, 2, 3].flatMap((axis) => [
          ...points.map((point) => point[axis]),
          ...[0, 1, 2, 3].map((other) => (other === axis ? 1 : 0)),
        ])
        const both = hermiteForm(bordered, width)
        const form = hermiteForm(matrixOf(points), width)
        for (let row = 0; row < 4; row++) {
          for (let column = 0; column < width; column++) {
            const u = both.subarray(row * (width + 4) + width, (row + 1) * (width + 4))
            const image = points[column].reduce((sum, x, axis) => sum + u[axis] * x, 0)
            expect(image).toBe(form[row * width + column])
          }
        }
      }),
    )
  })

  it('refuses matrices of lower rank and entries beyond 2^53', () => {
    expect(() => hermiteForm([1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 0], 4)).toThrow('rank')
    const huge = [3, 2 ** 52, 0, 0, 2, -(2 ** 52), 0, 0, 0, 0, 1, 0, 0, 0, 0, 1]
    expect(() => hermiteForm(huge, 4)).toThrow('safe integers')
  })
})
