import { intersectionNumbers, type IntersectionNumbers } from '../intersectionNumbers.ts'
import type { Polytope } from '../polytope.ts'
import type { TwoFaceClass } from '../twoFaceClass.ts'
import { lowerBound, moveRow } from './sortedRows.ts'

/** What one exchange has moved: rows of `edges` and `triangles`, as they stand after it. */
export interface Exchanged {
  /** The four points of the parallelogram: the old diagonal, then the new one. */
  readonly points: Int32Array
  /** The row of the old diagonal, and the one in which the new diagonal stands now. */
  edgeFrom: number
  edgeTo: number
  /** Rows of the four sides. */
  readonly sides: Int32Array
  /** The two triangles moved one after the other: rows left and rows taken. */
  readonly trianglesFrom: Int32Array
  readonly trianglesTo: Int32Array
}

/**
 * A class and its intersection numbers that follow exchanges of diagonals, in the order that a computation from
 * scratch gives them. With L = L_f, the diagonal (i, j) of the parallelogram i, k, j, l, v_i + v_j = v_k + v_l,
 * giving way to (k, l), the local formulas (see `intersectionNumbers`) change by constants:
 *
 *     diagonals        kappa_kkl = kappa_kll = -L   (as kappa_iij = kappa_ijj = -L before)
 *     side (p, q)      kappa_ppq - L,  kappa_pqq + L      p = i or j, q = k or l
 *     point            kappa_iii, kappa_jjj + L;  kappa_kkk, kappa_lll - L
 *     c2 . D           i, j: - 2 L;  k, l: + 2 L
 *
 * For the side (i, k), for instance, the third corner goes from j to l, and the sum of the linear relation by
 * L (v_j - v_l) = L (v_k - v_i). The Euler number stays. All integers, hence exact.
 */
export class MovingNumbers {
  private readonly polytope: Polytope
  readonly triangles: Int32Array
  readonly faceOf: Int32Array
  readonly triangleNumbers: Float64Array
  readonly edges: Int32Array
  readonly edgeNumbers: Float64Array
  readonly cubes: Float64Array
  readonly secondChern: Float64Array
  readonly last: Exchanged
  private readonly euler: number

  /** @param numbers those of the class, in arrays that are left to the motion */
  constructor(cls: TwoFaceClass, numbers: IntersectionNumbers = intersectionNumbers(cls)) {
    this.polytope = cls.polytope
    this.triangles = cls.triangles.slice()
    this.faceOf = cls.faceOf.slice()
    this.triangleNumbers = numbers.triangleNumbers
    this.edges = numbers.edges
    this.edgeNumbers = numbers.edgeNumbers
    this.cubes = numbers.cubes
    this.secondChern = numbers.secondChern
    this.euler = numbers.euler
    this.last = {
      points: new Int32Array(4),
      edgeFrom: 0,
      edgeTo: 0,
      sides: new Int32Array(4),
      trianglesFrom: new Int32Array(2),
      trianglesTo: new Int32Array(2),
    }
  }

  /** The same, to move on by itself. */
  copy(): MovingNumbers {
    const numbers = this.numbersNow()
    return new MovingNumbers(this.classNow(), {
      ...numbers,
      triangleNumbers: numbers.triangleNumbers.slice(),
      edges: numbers.edges.slice(),
      edgeNumbers: numbers.edgeNumbers.slice(),
      cubes: numbers.cubes.slice(),
      secondChern: numbers.secondChern.slice(),
    })
  }

  /** The class as it stands: the arrays are ours and change with the next exchange. */
  classNow(): TwoFaceClass {
    const { polytope, triangles, faceOf } = this
    return { polytope, triangles, faceOf }
  }

  /** The numbers as they stand: the arrays are ours and change with the next exchange. */
  numbersNow(): IntersectionNumbers {
    const { triangles, triangleNumbers, edges, edgeNumbers, cubes, secondChern, euler } = this
    const { pointCount } = this.polytope
    return { pointCount, triangles, triangleNumbers, edges, edgeNumbers, cubes, secondChern, euler }
  }

  /** The diagonal (i, j) of the parallelogram i, k, j, l on a 2-face gives way to (k, l). */
  exchange(i: number, j: number, k: number, l: number, face: number): void {
    const { last, cubes, secondChern } = this
    const number = this.polytope.twoFaces[face].dualLength
    last.points[0] = i
    last.points[1] = j
    last.points[2] = k
    last.points[3] = l
    this.moveDiagonal(i, j, k, l)
    this.changeSide(0, i, k, number)
    this.changeSide(1, i, l, number)
    this.changeSide(2, j, k, number)
    this.changeSide(3, j, l, number)
    cubes[i] += number
    cubes[j] += number
    cubes[k] -= number
    cubes[l] -= number
    secondChern[i] -= 2 * number
    secondChern[j] -= 2 * number
    secondChern[k] += 2 * number
    secondChern[l] += 2 * number
    this.moveTriangle(0, i, j, k, k, l, i)
    this.moveTriangle(1, i, j, l, k, l, j)
  }

  private moveDiagonal(i: number, j: number, k: number, l: number): void {
    const { edges, last } = this
    const p = Math.min(k, l)
    const q = Math.max(k, l)
    const from = lowerBound(edges, 2, Math.min(i, j), Math.max(i, j), 0)
    const place = lowerBound(edges, 2, p, q, 0)
    const to = place > from ? place - 1 : place
    moveRow(edges, 2, from, to)
    // Those of a diagonal are the same in the old place and in the new one.
    moveRow(this.edgeNumbers, 2, from, to)
    edges[2 * to] = p
    edges[2 * to + 1] = q
    last.edgeFrom = from
    last.edgeTo = to
  }

  /** kappa_ppq loses what kappa_pqq gains. */
  private changeSide(side: number, p: number, q: number, number: number): void {
    const { edges, edgeNumbers, last } = this
    const row = lowerBound(edges, 2, Math.min(p, q), Math.max(p, q), 0)
    edgeNumbers[2 * row + (p < q ? 0 : 1)] -= number
    edgeNumbers[2 * row + (p < q ? 1 : 0)] += number
    last.sides[side] = row
  }

  /** The triangle of i, j, k gives way to that of p, q, r on the same face. */
  private moveTriangle(n: number, i: number, j: number, k: number, p: number, q: number, r: number): void {
    const { triangles, last } = this
    const from = this.placeOfTriangle(i, j, k)
    const place = this.placeOfTriangle(p, q, r)
    const to = place > from ? place - 1 : place
    moveRow(triangles, 3, from, to)
    moveRow(this.faceOf, 1, from, to)
    moveRow(this.triangleNumbers, 1, from, to)
    const low = Math.min(p, q, r)
    const high = Math.max(p, q, r)
    triangles[3 * to] = low
    triangles[3 * to + 1] = p + q + r - low - high
    triangles[3 * to + 2] = high
    last.trianglesFrom[n] = from
    last.trianglesTo[n] = to
  }

  private placeOfTriangle(i: number, j: number, k: number): number {
    const low = Math.min(i, j, k)
    const high = Math.max(i, j, k)
    return lowerBound(this.triangles, 3, low, i + j + k - low - high, high)
  }
}
