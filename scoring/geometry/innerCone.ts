import { InvariantError } from '../errors.ts'
import { faceSpans, type FaceSpan } from './faceSpans.ts'
import { gcd } from './integers.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'
import type { SparseRows } from './sparseRows.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * The inner cone of a class: the union of the toric Kaehler cones of all its FRSTs. Its conditions come triangle
 * by triangle. For the triangle (i, j, k) let n be the primitive normal of span(v_i, v_j, v_k), x_p = <n, v_p>,
 * u integral with <n, u> = 1, v_p = x_p u + c_p . (v_i, v_j, v_k) with c_p integral (the cone has index 1), and
 * w'_p = w_p - c_p . (w_i, w_j, w_k). Then w'_p >= 0 where x_p = 0, and w'_p / x_p >= w'_q / x_q for
 * x_p > 0 > x_q. Each condition is a circuit, a primitive integer relation among at most five points:
 *
 *     v_p - c_p . (v_i, v_j, v_k) = 0,      a v_p + b v_q - (a c_p + b c_q) . (v_i, v_j, v_k) = 0
 *
 * with a = |x_q| / g, b = x_p / g, g = gcd(x_p, x_q); a and b have no common factor. The value of the second at w
 * is lcm(x_p, |x_q|) (w'_p / x_p - w'_q / x_q).
 */
export class InnerCone {
  private readonly triangles: Int32Array
  private readonly faceOf: Int32Array
  private readonly spans: readonly FaceSpan[]
  private readonly points: Float64Array

  constructor(twoFaceClass: TwoFaceClass) {
    this.triangles = twoFaceClass.triangles
    this.faceOf = twoFaceClass.faceOf
    this.spans = faceSpans(twoFaceClass.polytope)
    this.points = reducedCoordinates(twoFaceClass.polytope)
  }

  /**
   * Of each triangle, the circuit with the least value at w if that is below `threshold` (searched in floating
   * point; ties go to the first found). The circuits themselves are exact; rows have ascending points.
   */
  violatedCircuits(weights: Float64Array, threshold: number): SparseRows {
    const found: Circuit[] = []
    const ratio = new Float64Array(weights.length)
    const inverse = new Float64Array(9)
    for (let t = 0; t < this.faceOf.length; t++) {
      this.writeInverse(t, inverse)
      const pair = this.worstPair(t, inverse, weights, threshold, ratio)
      if (pair) found.push(this.circuit(t, inverse, pair[0], pair[1]))
    }
    return toRows(found)
  }

  /** Every circuit of the cone: cubic in the number of points, for small polytopes. */
  allCircuits(): SparseRows {
    const found: Circuit[] = []
    const inverse = new Float64Array(9)
    for (let t = 0; t < this.faceOf.length; t++) {
      this.writeInverse(t, inverse)
      const { inside, above, below } = this.spans[this.faceOf[t]]
      const corners = this.triangles.subarray(3 * t, 3 * t + 3)
      for (const p of inside) if (!corners.includes(p)) found.push(this.circuit(t, inverse, p, -1))
      for (const p of above) for (const q of below) found.push(this.circuit(t, inverse, p, q))
    }
    return toRows(found)
  }

  /** The points p, q of the circuit of least value below `threshold`, q = -1 where x_p = 0. */
  private worstPair(
    t: number,
    inverse: Float64Array,
    weights: Float64Array,
    threshold: number,
    ratio: Float64Array,
  ): [number, number] | undefined {
    const { coordinates, inside, above, below } = this.spans[this.faceOf[t]]
    const i = this.triangles[3 * t]
    const j = this.triangles[3 * t + 1]
    const k = this.triangles[3 * t + 2]
    // w'_p = w_p - slope . y_p: the linear function that agrees with w on the triangle and vanishes on u.
    const slope0 = inverse[0] * weights[i] + inverse[1] * weights[j] + inverse[2] * weights[k]
    const slope1 = inverse[3] * weights[i] + inverse[4] * weights[j] + inverse[5] * weights[k]
    const slope2 = inverse[6] * weights[i] + inverse[7] * weights[j] + inverse[8] * weights[k]

    let worst = threshold
    let pair: [number, number] | undefined
    for (let m = 0; m < inside.length; m++) {
      const p = inside[m]
      const y = 4 * p
      const value =
        weights[p] - (slope0 * coordinates[y] + slope1 * coordinates[y + 1] + slope2 * coordinates[y + 2])
      if (value < worst && p !== i && p !== j && p !== k) {
        worst = value
        pair = [p, -1]
      }
    }
    let least = Infinity
    for (let m = 0; m < above.length; m++) {
      const p = above[m]
      const y = 4 * p
      const lifted =
        weights[p] - (slope0 * coordinates[y] + slope1 * coordinates[y + 1] + slope2 * coordinates[y + 2])
      const r = lifted / coordinates[y + 3]
      ratio[p] = r
      if (r < least) least = r
    }
    let largest = -Infinity
    for (let m = 0; m < below.length; m++) {
      const q = below[m]
      const y = 4 * q
      const lifted =
        weights[q] - (slope0 * coordinates[y] + slope1 * coordinates[y + 1] + slope2 * coordinates[y + 2])
      const r = lifted / coordinates[y + 3]
      ratio[q] = r
      if (r > largest) largest = r
    }
    // lcm >= 1, so only ratios that differ by less than the threshold can belong to a violated circuit.
    if (least - largest >= worst) return pair
    const near = below.filter((q) => least - ratio[q] < worst)
    for (const p of above) {
      if (ratio[p] - largest >= worst) continue
      const x = coordinates[4 * p + 3]
      for (const q of near) {
        const difference = ratio[p] - ratio[q]
        if (difference >= worst) continue
        const depth = -coordinates[4 * q + 3]
        const value = (x / gcd(x, depth)) * depth * difference
        if (value < worst) {
          worst = value
          pair = [p, q]
        }
      }
    }
    return pair
  }

  /** The exact relation of points p, q (or p alone, q = -1) and the corners of triangle t. */
  private circuit(t: number, inverse: Float64Array, p: number, q: number): Circuit {
    const { coordinates } = this.spans[this.faceOf[t]]
    const x = coordinates[4 * p + 3]
    const depth = q < 0 ? 1 : -coordinates[4 * q + 3]
    const common = gcd(x, depth)
    const a = depth / common
    const b = x / common
    const entries: Circuit = [[p, a]]
    if (q >= 0) entries.push([q, b])
    const y = [0, 1, 2].map((r) => a * coordinates[4 * p + r] + (q < 0 ? 0 : b * coordinates[4 * q + r]))
    for (let corner = 0; corner < 3; corner++) {
      const share = y[0] * inverse[corner] + y[1] * inverse[3 + corner] + y[2] * inverse[6 + corner]
      if (share !== 0) entries.push([this.triangles[3 * t + corner], -share])
    }
    for (let axis = 0; axis < 4; axis++) {
      let sum = 0
      for (const [point, coefficient] of entries) sum += coefficient * this.points[4 * point + axis]
      if (sum !== 0)
        throw new InvariantError(`The circuit of points ${p}, ${q} at triangle ${t} is no relation.`)
    }
    return entries.sort((left, right) => left[0] - right[0])
  }

  /**
   * Inverse (row-major) of the integer matrix, of determinant 1 or -1, whose rows are the coordinates y of the
   * triangle's corners: c_p = y_p times it.
   */
  private writeInverse(t: number, inverse: Float64Array): void {
    const { coordinates: y } = this.spans[this.faceOf[t]]
    const a = 4 * this.triangles[3 * t]
    const b = 4 * this.triangles[3 * t + 1]
    const c = 4 * this.triangles[3 * t + 2]
    inverse[0] = y[b + 1] * y[c + 2] - y[b + 2] * y[c + 1]
    inverse[3] = y[b + 2] * y[c] - y[b] * y[c + 2]
    inverse[6] = y[b] * y[c + 1] - y[b + 1] * y[c]
    inverse[1] = y[c + 1] * y[a + 2] - y[c + 2] * y[a + 1]
    inverse[4] = y[c + 2] * y[a] - y[c] * y[a + 2]
    inverse[7] = y[c] * y[a + 1] - y[c + 1] * y[a]
    inverse[2] = y[a + 1] * y[b + 2] - y[a + 2] * y[b + 1]
    inverse[5] = y[a + 2] * y[b] - y[a] * y[b + 2]
    inverse[8] = y[a] * y[b + 1] - y[a + 1] * y[b]
    const determinant = y[a] * inverse[0] + y[a + 1] * inverse[3] + y[a + 2] * inverse[6]
    if (determinant !== 1 && determinant !== -1) {
      throw new InvariantError(`The cone over triangle ${t} has index ${determinant}, not 1.`)
    }
    for (let e = 0; e < 9; e++) inverse[e] *= determinant
  }
}

/** Points with their integer coefficients. */
type Circuit = [number, number][]

function toRows(found: readonly Circuit[]): SparseRows {
  const starts = new Int32Array(found.length + 1)
  found.forEach((entries, r) => (starts[r + 1] = starts[r] + entries.length))
  const flat = found.flat()
  return {
    starts,
    points: Int32Array.from(flat, (entry) => entry[0]),
    coefficients: Float64Array.from(flat, (entry) => entry[1]),
  }
}
