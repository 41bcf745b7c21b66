import type { IntersectionNumbers } from './intersectionNumbers.ts'

/** D . D . D_k for every point k, for the class D = sum_p coefficients[p] D_p. */
export function squareOf(numbers: IntersectionNumbers, coefficients: ArrayLike<number>): Float64Array {
  const { triangles, triangleNumbers, edges, edgeNumbers, cubes, pointCount } = numbers
  const square = new Float64Array(pointCount)
  for (let i = 0; i < pointCount; i++) square[i] = cubes[i] * coefficients[i] ** 2
  for (let e = 0; e < edgeNumbers.length; e += 2) {
    const i = edges[e]
    const j = edges[e + 1]
    const a = coefficients[i]
    const b = coefficients[j]
    square[i] += 2 * edgeNumbers[e] * a * b + edgeNumbers[e + 1] * b * b
    square[j] += 2 * edgeNumbers[e + 1] * a * b + edgeNumbers[e] * a * a
  }
  for (let t = 0; t < triangleNumbers.length; t++) {
    const i = triangles[3 * t]
    const j = triangles[3 * t + 1]
    const k = triangles[3 * t + 2]
    const twice = 2 * triangleNumbers[t]
    square[i] += twice * coefficients[j] * coefficients[k]
    square[j] += twice * coefficients[i] * coefficients[k]
    square[k] += twice * coefficients[i] * coefficients[j]
  }
  return square
}
