import { CholeskyDecomposition, Matrix } from 'ml-matrix'

/** Weight of the penalty on the standardised coefficients: a constant and a part that grows with the rows. */
const [penalty, penaltyPerRow] = [3, 0.02]

/** A linear model of targets by features. */
export interface RidgeModel {
  predict(features: ArrayLike<number>): number
}

/**
 * Ridge regression (Hoerl, Kennard 1970) on standardised features: minimises
 * |y - mean - Z c|^2 + lambda |c|^2. Features that do not vary among the rows have no say. The same rows in the same
 * order give the same model to the bit.
 *
 * @param rows at least one, of equal length
 * @param targets one per row, of mean zero
 */
export function fitRidge(rows: readonly ArrayLike<number>[], targets: readonly number[]): RidgeModel {
  const width = rows[0].length
  const means = new Float64Array(width)
  for (const row of rows) for (let c = 0; c < width; c++) means[c] += row[c] / rows.length
  const spreads = new Float64Array(width)
  for (const row of rows) for (let c = 0; c < width; c++) spreads[c] += (row[c] - means[c]) ** 2 / rows.length
  const varying: number[] = []
  for (let c = 0; c < width; c++) if (spreads[c] > 1e-9 * (1 + means[c] ** 2)) varying.push(c)
  if (varying.length === 0) return { predict: () => 0 }

  const standard = rows.map((row) =>
    Float64Array.from(varying, (c) => (row[c] - means[c]) / Math.sqrt(spreads[c])),
  )
  const { gram, moments } = normalEquations(standard, targets)
  const lambda = penalty + penaltyPerRow * rows.length
  for (let c = 0; c < varying.length; c++) gram.set(c, c, gram.get(c, c) + lambda)
  const solved = new CholeskyDecomposition(gram).solve(Matrix.columnVector(moments)).to1DArray()
  const slopes = solved.map((slope, n) => slope / Math.sqrt(spreads[varying[n]]))
  const constant = slopes.reduce((sum, slope, n) => sum - slope * means[varying[n]], 0)
  return {
    predict(features) {
      let value = constant
      for (let n = 0; n < varying.length; n++) value += slopes[n] * features[varying[n]]
      return value
    },
  }
}

/** Z^T Z and Z^T y. */
function normalEquations(
  rows: readonly Float64Array[],
  targets: readonly number[],
): { gram: Matrix; moments: number[] } {
  const width = rows[0].length
  const lower = new Float64Array(width * width)
  const moments = new Array<number>(width).fill(0)
  for (const [n, row] of rows.entries()) {
    for (let r = 0; r < width; r++) {
      const value = row[r]
      moments[r] += value * targets[n]
      for (let c = 0, at = r * width; c <= r; c++) lower[at + c] += value * row[c]
    }
  }
  const gram = new Matrix(width, width)
  for (let r = 0; r < width; r++) {
    for (let c = 0; c <= r; c++) {
      gram.set(r, c, lower[r * width + c])
      gram.set(c, r, lower[r * width + c])
    }
  }
  return { gram, moments }
}
