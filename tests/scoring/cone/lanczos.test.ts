import fc from 'fast-check'
import { EigenvalueDecomposition, Matrix } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import { largestEigenvalue } from '../../../scoring/geometry/lanczos.ts'

/** x -> matrix x. */
function operator(matrix: Matrix): (x: Float64Array, y: Float64Array) => void {
  return (x, y) => y.set(matrix.mmul(Matrix.columnVector(x)).to1DArray())
}

describe('largest eigenvalue by Lanczos', () => {
  it('is that of a full decomposition', () => {
    const matrices = fc
      .integer({ min: 1, max: 25 })
      .chain((n) => fc.array(fc.integer({ min: -9, max: 9 }), { minLength: n * n, maxLength: n * n }))
      .map((entries) => {
        const n = Math.sqrt(entries.length)
        const root = Matrix.from1DArray(n, n, entries)
        return root.mmul(root.transpose()).add(Matrix.eye(n))
      })
    fc.assert(
      fc.property(matrices, (matrix) => {
        const { value, residual } = largestEigenvalue(matrix.rows, operator(matrix), 1e-9)
        const all = new EigenvalueDecomposition(matrix, { assumeSymmetric: true }).realEigenvalues
        expect(value / Math.max(...all)).toBeCloseTo(1, 11)
        expect(residual).toBeLessThanOrEqual(1e-9)
      }),
      { numRuns: 100 },
    )
  })

  it('takes a multiple eigenvalue, and one of a space with a kernel', () => {
    const matrix = Matrix.diag([3, 3, 3, 0, 1, 0, 2])
    const { value, steps } = largestEigenvalue(7, operator(matrix), 1e-9)
    expect(value).toBeCloseTo(3, 13)
    expect(steps).toBeLessThanOrEqual(3)
  })

  it('needs more steps for a smaller gap', () => {
    const spectrum = (gap: number): Matrix =>
      Matrix.diag(Array.from({ length: 60 }, (_, k) => (k === 0 ? 1 : (1 - gap) * Math.cos(k / 40))))
    const near = largestEigenvalue(60, operator(spectrum(0.01)), 1e-9)
    const far = largestEigenvalue(60, operator(spectrum(0.5)), 1e-9)
    expect(near.value).toBeCloseTo(1, 12)
    expect(far.value).toBeCloseTo(1, 12)
    expect(near.steps).toBeGreaterThan(far.steps)
  })
})
