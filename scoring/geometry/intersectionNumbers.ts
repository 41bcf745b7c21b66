import { InvariantError } from '../errors.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * Triple intersection numbers and second Chern class of a class, sparse. All entries are exact integers
 * (asserted), held in doubles.
 */
export interface IntersectionNumbers {
  /** Number of points. */
  readonly pointCount: number
  /** i < j < k per triangle, as in the class, and kappa_ijk = L_f. */
  readonly triangles: Int32Array
  readonly triangleNumbers: Float64Array
  /** i < j per edge of the class, lexicographic order. */
  readonly edges: Int32Array
  /** kappa_iij, kappa_ijj per edge. */
  readonly edgeNumbers: Float64Array
  /** kappa_iii per point. */
  readonly cubes: Float64Array
  /** c2 . D_i per point. */
  readonly secondChern: Float64Array
  /** Euler number from these numbers; equals 2 (h11 - h21). */
  readonly euler: number
}

/**
 * Intersection numbers by local formulas, in time proportional to the number of triangles:
 *
 *     kappa_ijk = L_f                                            triangle of 2-face f
 *     kappa_iij v_i + kappa_ijj v_j = - sum_{k != i,j} kappa_ijk v_k   edge
 *     kappa_iii v_i = - sum_{j != i} kappa_iij v_j                     point
 *
 * The last two are the linear relations sum_k <m, v_k> D_k = 0 multiplied by D_i D_j and by D_i^2; they are
 * over-determined, and integrality and all four coordinates are asserted. Second Chern class and Euler number
 * by adjunction: c2 . D_k = sum_{i<j} kappa_ijk (i or j may be k), euler = sum_{i<j<k} kappa_ijk - sum_k c2 . D_k.
 * (Toric geometry of a smooth anticanonical hypersurface: Batyrev, alg-geom/9310003.)
 *
 * On a polytope that is not favourable D_i is the sum of the components of a split divisor.
 *
 * @throws InvariantError when an equation has no integer solution or the Euler number is not 2 (h11 - h21)
 */
export function intersectionNumbers(cls: TwoFaceClass): IntersectionNumbers {
  const { polytope, triangles, faceOf } = cls
  const { points, pointCount, twoFaces } = polytope
  const triangleNumbers = new Float64Array(faceOf.length)
  for (let t = 0; t < faceOf.length; t++) triangleNumbers[t] = twoFaces[faceOf[t]].dualLength

  const { edges, edgeOf } = edgesOf(triangles, pointCount)
  const edgeCount = edges.length / 2
  const sums = new Float64Array(4 * edgeCount)
  const secondChern = new Float64Array(pointCount)
  for (let t = 0; t < faceOf.length; t++) {
    const number = triangleNumbers[t]
    for (let c = 0; c < 3; c++) {
      const opposite = 4 * triangles[3 * t + c]
      const e = 4 * edgeOf[3 * t + c]
      sums[e] -= number * points[opposite]
      sums[e + 1] -= number * points[opposite + 1]
      sums[e + 2] -= number * points[opposite + 2]
      sums[e + 3] -= number * points[opposite + 3]
      secondChern[triangles[3 * t + c]] += number
    }
  }

  const edgeNumbers = new Float64Array(2 * edgeCount)
  const pointSums = new Float64Array(4 * pointCount)
  for (let e = 0; e < edgeCount; e++) {
    const i = edges[2 * e]
    const j = edges[2 * e + 1]
    solveOnEdge(points, i, j, sums, 4 * e, edgeNumbers, 2 * e)
    const iij = edgeNumbers[2 * e]
    const ijj = edgeNumbers[2 * e + 1]
    for (let c = 0; c < 4; c++) {
      pointSums[4 * i + c] -= iij * points[4 * j + c]
      pointSums[4 * j + c] -= ijj * points[4 * i + c]
    }
    secondChern[i] += iij
    secondChern[j] += ijj
  }

  const cubes = new Float64Array(pointCount)
  for (let p = 0; p < pointCount; p++) cubes[p] = solveOnPoint(points, p, pointSums)

  let euler = 0
  for (const number of triangleNumbers) euler += number
  for (const number of secondChern) euler -= number
  if (euler !== polytope.hodge.euler) {
    throw new InvariantError(
      `The Euler number of the class is ${euler}, that of the polytope ${polytope.hodge.euler}.`,
    )
  }
  return { pointCount, triangles, triangleNumbers, edges, edgeNumbers, cubes, secondChern, euler }
}

/** Row of edge (i, j), i < j, in `edges`, by bisection; -1 when the class has no such edge. */
export function edgeRow(edges: Int32Array, i: number, j: number): number {
  let low = 0
  let high = edges.length / 2 - 1
  while (low <= high) {
    const middle = (low + high) >> 1
    const order = edges[2 * middle] - i || edges[2 * middle + 1] - j
    if (order === 0) return middle
    if (order < 0) low = middle + 1
    else high = middle - 1
  }
  return -1
}

/** kappa_ijk for any three points, equal ones included. */
export function intersectionNumber(numbers: IntersectionNumbers, i: number, j: number, k: number): number {
  const p = Math.min(i, j, k)
  const r = Math.max(i, j, k)
  const q = i + j + k - p - r
  if (p === r) return numbers.cubes[p]
  if (p === q || q === r) {
    const e = edgeRow(numbers.edges, p, r)
    return e < 0 ? 0 : numbers.edgeNumbers[2 * e + (p === q ? 0 : 1)]
  }
  const { triangles } = numbers
  let low = 0
  let high = triangles.length / 3 - 1
  while (low <= high) {
    const middle = (low + high) >> 1
    const order = triangles[3 * middle] - p || triangles[3 * middle + 1] - q || triangles[3 * middle + 2] - r
    if (order === 0) return numbers.triangleNumbers[middle]
    if (order < 0) low = middle + 1
    else high = middle - 1
  }
  return 0
}

/** Table (i, j) -> edge, all zero between calls: kept so that a large one is not cleared each time. */
let table = new Int32Array(0)

/** The edges of the triangles in lexicographic order, and for corner c of triangle t the edge opposite to it. */
function edgesOf(triangles: Int32Array, pointCount: number): { edges: Int32Array; edgeOf: Int32Array } {
  if (table.length < pointCount * pointCount) table = new Int32Array(pointCount * pointCount)
  const edgeOf = new Int32Array(triangles.length)
  const codes = new Int32Array(triangles.length)
  let count = 0
  for (let t = 0; t < triangles.length; t += 3) {
    for (let c = 0; c < 3; c++) {
      const i = triangles[c === 0 ? t + 1 : t]
      const j = triangles[c === 2 ? t + 1 : t + 2]
      const code = i * pointCount + j
      edgeOf[t + c] = code
      if (table[code] === 0) {
        table[code] = 1
        codes[count++] = code
      }
    }
  }
  const sorted = codes.subarray(0, count).sort()
  const edges = new Int32Array(2 * count)
  for (let e = 0; e < count; e++) {
    const i = Math.floor(sorted[e] / pointCount)
    edges[2 * e] = i
    edges[2 * e + 1] = sorted[e] - i * pointCount
    table[sorted[e]] = e
  }
  for (let h = 0; h < edgeOf.length; h++) edgeOf[h] = table[edgeOf[h]]
  for (let e = 0; e < count; e++) table[sorted[e]] = 0
  return { edges, edgeOf }
}

/** Solves x v_i + y v_j = s in integers, s the four numbers at sums[at..]; checks every coordinate. */
function solveOnEdge(
  points: Int32Array,
  i: number,
  j: number,
  sums: Float64Array,
  at: number,
  out: Float64Array,
  to: number,
): void {
  const p = 4 * i
  const q = 4 * j
  for (let c = 0; c < 3; c++) {
    for (let d = c + 1; d < 4; d++) {
      const minor = points[p + c] * points[q + d] - points[p + d] * points[q + c]
      if (minor === 0) continue
      const x = (sums[at + c] * points[q + d] - sums[at + d] * points[q + c]) / minor
      const y = (points[p + c] * sums[at + d] - points[p + d] * sums[at + c]) / minor
      let solved = Number.isInteger(x) && Number.isInteger(y)
      for (let n = 0; n < 4; n++) solved &&= x * points[p + n] + y * points[q + n] === sums[at + n]
      if (!solved) {
        throw new InvariantError(`The linear relations on the edge (${i}, ${j}) have no integer solution.`)
      }
      // Minus zero would print as "-0".
      out[to] = x + 0
      out[to + 1] = y + 0
      return
    }
  }
  throw new InvariantError(`Points ${i} and ${j} of an edge are parallel.`)
}

/** Solves x v_i = s in integers; checks every coordinate. */
function solveOnPoint(points: Int32Array, i: number, sums: Float64Array): number {
  const p = 4 * i
  let c = 0
  while (c < 3 && points[p + c] === 0) c++
  const x = sums[p + c] / points[p + c]
  let solved = Number.isInteger(x)
  for (let n = 0; n < 4; n++) solved &&= x * points[p + n] === sums[p + n]
  if (!solved) throw new InvariantError(`The linear relations at point ${i} have no integer solution.`)
  return x + 0
}
