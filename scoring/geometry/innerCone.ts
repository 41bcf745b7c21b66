import { InvariantError } from '../errors.ts'
import { gcd } from './integers.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'
import type { SparseRows } from './sparseRows.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * The inner cone of a class: the union of the toric Kaehler cones of all its FRSTs. Its conditions come triangle
 * by triangle. For the triangle (i, j, k) let n be the primitive normal of span(v_i, v_j, v_k), x_p = <n, v_p>,
 * u integral with <n, u> = 1, v_p = x_p u + c_p with c_p integral in the span (the cone has index 1), and
 * w'_p = w_p - c_p . (w_i, w_j, w_k). Then w'_p >= 0 where x_p = 0, and w'_p / x_p >= w'_q / x_q for
 * x_p > 0 > x_q. Each condition is a circuit, a primitive integer relation among at most five points:
 *
 *     v_p - c_p . (v_i, v_j, v_k) = 0,      a v_p + b v_q - (a c_p + b c_q) . (v_i, v_j, v_k) = 0
 *
 * with a = |x_q| / g, b = x_p / g, g = gcd(x_p, x_q); a and b have no common factor.
 */
export class InnerCone {
  private readonly triangles: Int32Array
  private readonly points: Float64Array
  private readonly pointCount: number
  /**
   * 16 integers per triangle: the inverse of the matrix with the columns v_i, v_j, v_k, u. Three rows give the
   * coordinates c_p, the last is n.
   */
  private readonly frames: Float64Array

  constructor(twoFaceClass: TwoFaceClass) {
    this.triangles = twoFaceClass.triangles
    this.points = reducedCoordinates(twoFaceClass.polytope)
    this.pointCount = twoFaceClass.polytope.pointCount
    this.frames = new Float64Array((16 * this.triangles.length) / 3)
    for (let t = 0; t < this.triangles.length / 3; t++) {
      const corners = this.triangles.subarray(3 * t, 3 * t + 3)
      writeFrame(this.points, corners, this.frames.subarray(16 * t, 16 * t + 16))
    }
  }

  /**
   * Of each triangle, the circuit with the least value at w if that is below `threshold` (floating point;
   * ties go to the first found); the circuits themselves are exact. Rows have ascending points.
   */
  violatedCircuits(weights: Float64Array, threshold: number): SparseRows {
    const found: [number, number][][] = []
    const ratio = new Float64Array(this.pointCount)
    const height = new Float64Array(this.pointCount)
    for (let t = 0; t < this.triangles.length / 3; t++) {
      const [p, q] = this.worstPair(t, weights, threshold, height, ratio)
      if (p >= 0) found.push(this.circuit(t, p, q))
    }
    return toRows(found)
  }

  /** Every circuit of the cone, triangle by triangle: cubic in the number of points, for small polytopes. */
  allCircuits(): SparseRows {
    const found: [number, number][][] = []
    for (let t = 0; t < this.triangles.length / 3; t++) {
      const sides = Array.from({ length: this.pointCount }, (_, p) => this.pairing(t, 3, p))
      const corners = this.triangles.subarray(3 * t, 3 * t + 3)
      sides.forEach((side, p) => {
        if (side === 0 && !corners.includes(p)) found.push(this.circuit(t, p, -1))
        if (side > 0) sides.forEach((other, q) => other < 0 && found.push(this.circuit(t, p, q)))
      })
    }
    return toRows(found)
  }

  /** The points p, q of the circuit of least value below `threshold`; q = -1 where x_p = 0; p = -1 for none. */
  private worstPair(
    t: number,
    weights: Float64Array,
    threshold: number,
    height: Float64Array,
    ratio: Float64Array,
  ): [number, number] {
    const { points, frames, pointCount } = this
    const i = this.triangles[3 * t]
    const j = this.triangles[3 * t + 1]
    const k = this.triangles[3 * t + 2]
    const f = 16 * t
    // w'_p = w_p - <slope, v_p>: the linear function that agrees with w on the triangle and vanishes on u.
    const slope0 = weights[i] * frames[f] + weights[j] * frames[f + 4] + weights[k] * frames[f + 8]
    const slope1 = weights[i] * frames[f + 1] + weights[j] * frames[f + 5] + weights[k] * frames[f + 9]
    const slope2 = weights[i] * frames[f + 2] + weights[j] * frames[f + 6] + weights[k] * frames[f + 10]
    const slope3 = weights[i] * frames[f + 3] + weights[j] * frames[f + 7] + weights[k] * frames[f + 11]
    const n0 = frames[f + 12]
    const n1 = frames[f + 13]
    const n2 = frames[f + 14]
    const n3 = frames[f + 15]

    let worst = threshold
    let worstP = -1
    let worstQ = -1
    let leastAbove = Infinity
    let largestBelow = -Infinity
    for (let p = 0; p < pointCount; p++) {
      const v = 4 * p
      const x = n0 * points[v] + n1 * points[v + 1] + n2 * points[v + 2] + n3 * points[v + 3]
      const lifted =
        weights[p] -
        (slope0 * points[v] + slope1 * points[v + 1] + slope2 * points[v + 2] + slope3 * points[v + 3])
      height[p] = x
      if (x === 0) {
        if (lifted < worst && p !== i && p !== j && p !== k) {
          worst = lifted
          worstP = p
        }
        continue
      }
      const r = lifted / x
      ratio[p] = r
      if (x > 0) leastAbove = r < leastAbove ? r : leastAbove
      else largestBelow = r > largestBelow ? r : largestBelow
    }
    // The value of a circuit is lcm(x_p, |x_q|) (r_p - r_q) >= r_p - r_q when that is positive.
    if (leastAbove - largestBelow >= worst) return [worstP, worstQ]
    for (let p = 0; p < pointCount; p++) {
      if (!(height[p] > 0) || ratio[p] - largestBelow >= worst) continue
      for (let q = 0; q < pointCount; q++) {
        if (!(height[q] < 0) || ratio[p] - ratio[q] >= worst) continue
        const multiple = (height[p] / gcd(height[p], height[q])) * -height[q]
        const value = multiple * (ratio[p] - ratio[q])
        if (value < worst) {
          worst = value
          worstP = p
          worstQ = q
        }
      }
    }
    return [worstP, worstQ]
  }

  /** The exact relation of points p, q (or p alone, q = -1) and the corners of triangle t. */
  private circuit(t: number, p: number, q: number): [number, number][] {
    let a = 1
    let b = 0
    if (q >= 0) {
      const above = this.pairing(t, 3, p)
      const below = -this.pairing(t, 3, q)
      const common = gcd(above, below)
      a = below / common
      b = above / common
    }
    const entries: [number, number][] = [[p, a]]
    if (q >= 0) entries.push([q, b])
    for (let corner = 0; corner < 3; corner++) {
      const share = a * this.pairing(t, corner, p) + (q >= 0 ? b * this.pairing(t, corner, q) : 0)
      if (share !== 0) entries.push([this.triangles[3 * t + corner], -share])
    }
    for (let axis = 0; axis < 4; axis++) {
      let sum = 0
      for (const [point, coefficient] of entries) sum += coefficient * this.points[4 * point + axis]
      if (sum !== 0) throw new InvariantError(`The circuit of points ${p}, ${q} at triangle ${t} is no relation.`)
    }
    return entries.sort((left, right) => left[0] - right[0])
  }

  private pairing(t: number, row: number, p: number): number {
    const { frames, points } = this
    const f = 16 * t + 4 * row
    const v = 4 * p
    return (
      frames[f] * points[v] +
      frames[f + 1] * points[v + 1] +
      frames[f + 2] * points[v + 2] +
      frames[f + 3] * points[v + 3]
    )
  }
}

/** Completes v_i, v_j, v_k to a basis of Z^4 by u and writes the inverse of that basis, row by row. */
function writeFrame(points: Float64Array, corners: Int32Array, frame: Float64Array): void {
  const basis = [0, 1, 2].map((c) => Array.from(points.subarray(4 * corners[c], 4 * corners[c] + 4)))
  const normal = [0, 1, 2, 3].map((axis) => cofactor([...basis, [0, 0, 0, 0]], 3, axis))
  const u = dualVector(normal)
  basis.push(u)
  for (let row = 0; row < 4; row++) {
    for (let axis = 0; axis < 4; axis++) frame[4 * row + axis] = cofactor(basis, row, axis)
  }
}

/** Cofactor of entry (row, axis) of the 4 x 4 matrix with the given rows. */
function cofactor(matrix: readonly (readonly number[])[], row: number, axis: number): number {
  const [a, b, c] = [0, 1, 2, 3].filter((r) => r !== row).map((r) => matrix[r].filter((_, i) => i !== axis))
  const minor =
    a[0] * (b[1] * c[2] - b[2] * c[1]) - a[1] * (b[0] * c[2] - b[2] * c[0]) + a[2] * (b[0] * c[1] - b[1] * c[0])
  return (row + axis) % 2 === 0 ? minor : -minor
}

/** An integer vector u with <n, u> = 1 for a primitive n, by the extended Euclidean algorithm. */
function dualVector(n: readonly number[]): number[] {
  let common = 0
  let u: number[] = []
  for (const entry of n) {
    const [g, x, y] = extendedGcd(common, entry)
    u = [...u.map((value) => value * x), y]
    common = g
  }
  if (common !== 1) throw new InvariantError(`The cone over a triangle has index ${common}, not 1.`)
  return u
}

/** g = gcd(a, b) >= 0 and x, y with a x + b y = g. */
function extendedGcd(a: number, b: number): [number, number, number] {
  let [r, s] = [a, b]
  let [x, nextX] = [1, 0]
  let [y, nextY] = [0, 1]
  while (s !== 0) {
    const quotient = Math.trunc(r / s)
    ;[r, s] = [s, r - quotient * s]
    ;[x, nextX] = [nextX, x - quotient * nextX]
    ;[y, nextY] = [nextY, y - quotient * nextY]
  }
  return r < 0 ? [-r, -x, -y] : [r, x, y]
}

function toRows(found: readonly [number, number][][]): SparseRows {
  const starts = new Int32Array(found.length + 1)
  found.forEach((entries, r) => (starts[r + 1] = starts[r] + entries.length))
  const flat = found.flat()
  return {
    starts,
    points: Int32Array.from(flat, (entry) => entry[0]),
    coefficients: Float64Array.from(flat, (entry) => entry[1]),
  }
}
