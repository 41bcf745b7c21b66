import { minimumDegreeOrder } from './minimumDegree.ts'
import { SparseCholesky } from './sparseCholesky.ts'
import { rowCount, type SparseRows } from './sparseRows.ts'

/**
 * The matrix I + A^T D A for a fixed sparse A and changing positive diagonal D: ordered and laid out once,
 * then filled and factorised for each D.
 */
export class NormalMatrix {
  private readonly factor: SparseCholesky
  private readonly rows: SparseRows
  /** Products of pairs of entries, row of A by row, and where in the factor each is added. */
  private readonly pairStarts: Int32Array
  private readonly pairProducts: Float64Array
  private readonly pairTargets: Int32Array
  private readonly diagonalTargets: Int32Array

  constructor(size: number, rows: SparseRows) {
    this.rows = rows
    this.factor = new SparseCholesky(minimumDegreeOrder(size, rows))
    const { starts, points, coefficients } = rows
    const count = rowCount(rows)
    this.pairStarts = new Int32Array(count + 1)
    for (let r = 0; r < count; r++) {
      const length = starts[r + 1] - starts[r]
      this.pairStarts[r + 1] = this.pairStarts[r] + (length * (length + 1)) / 2
    }
    this.pairProducts = new Float64Array(this.pairStarts[count])
    this.pairTargets = new Int32Array(this.pairStarts[count])
    this.diagonalTargets = Int32Array.from({ length: size }, (_, v) => this.factor.entryOf(v, v))
    let pair = 0
    for (let r = 0; r < count; r++) {
      for (let a = starts[r]; a < starts[r + 1]; a++) {
        for (let b = starts[r]; b <= a; b++) {
          this.pairProducts[pair] = coefficients[a] * coefficients[b]
          this.pairTargets[pair++] = this.factor.entryOf(points[a], points[b])
        }
      }
    }
  }

  get size(): number {
    return this.factor.order.size
  }

  /** Factorises I + A^T D A; false when rounding has made it indefinite. */
  factorise(diagonal: Float64Array): boolean {
    const { pairStarts, pairProducts, pairTargets } = this
    const { values } = this.factor
    values.fill(0)
    for (let r = 0; r < rowCount(this.rows); r++) {
      const weight = diagonal[r]
      if (weight === 0) continue
      for (let k = pairStarts[r]; k < pairStarts[r + 1]; k++)
        values[pairTargets[k]] += weight * pairProducts[k]
    }
    for (const place of this.diagonalTargets) values[place] += 1
    return this.factor.factorise()
  }

  /** Solves (I + A^T D A) x = right with the last factor; `x` may be `right` itself. */
  solve(right: Float64Array, x: Float64Array): void {
    this.factor.solve(right, x)
  }
}
