import { InvariantError } from '../errors.ts'
import { gcd } from './integers.ts'
import { edgeRow, type IntersectionNumbers } from './intersectionNumbers.ts'
import type { Polytope } from './polytope.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * Primitive classes of the curves C_ij = D_i . D_j, one row per edge of the class (rows may repeat), as
 * compressed sparse rows: entries `starts[r] .. starts[r+1]` of `points` and `coefficients`.
 */
export interface CurveRows {
  readonly starts: Int32Array
  readonly points: Int32Array
  readonly coefficients: Float64Array
}

/**
 * The curve of every edge (i, j), in the order of `numbers.edges`: C_ij . D_k = kappa_ijk for all k, divided by
 * the greatest integer that divides the class; non-zero entries only, points ascending.
 *
 * The divisor D_k of a point interior to a 2-face is a sum of L_f components. A curve on an edge of the
 * polytope meets each component once, so the class pairs to kappa_ijk / L_f with a component, and the greatest
 * common divisor is taken over these. On an edge inside a 2-face the curve itself has L_f components, each
 * meeting one component of D_k, and the plain entries serve. The entries of a row stay the pairings with the
 * whole D_k, as J = sum_k w_k D_k needs, and the row is a linear relation of the points.
 */
export function curveRows(twoFaceClass: TwoFaceClass, numbers: IntersectionNumbers): CurveRows {
  const { triangles, faceOf, polytope } = twoFaceClass
  const { edges, edgeNumbers, triangleNumbers } = numbers
  const edgeCount = edges.length / 2

  const starts = new Int32Array(edgeCount + 1)
  const onTriangle = new Int32Array(triangles.length)
  const face = new Int32Array(edgeCount).fill(-1)
  const insideFace = new Uint8Array(edgeCount).fill(1)
  for (let t = 0; t < faceOf.length; t++) {
    const [i, j, k] = [triangles[3 * t], triangles[3 * t + 1], triangles[3 * t + 2]]
    onTriangle[3 * t] = edgeRow(edges, j, k)
    onTriangle[3 * t + 1] = edgeRow(edges, i, k)
    onTriangle[3 * t + 2] = edgeRow(edges, i, j)
    for (let side = 0; side < 3; side++) {
      const e = onTriangle[3 * t + side]
      starts[e + 1]++
      if (face[e] < 0) face[e] = faceOf[t]
      else if (face[e] !== faceOf[t]) insideFace[e] = 0
    }
  }
  for (let e = 0; e < edgeCount; e++) {
    starts[e + 1] += starts[e] + (edgeNumbers[2 * e] !== 0 ? 1 : 0) + (edgeNumbers[2 * e + 1] !== 0 ? 1 : 0)
  }

  const points = new Int32Array(starts[edgeCount])
  const coefficients = new Float64Array(starts[edgeCount])
  const filled = starts.slice(0, edgeCount)
  for (let t = 0; t < faceOf.length; t++) {
    for (let side = 0; side < 3; side++) {
      insert(onTriangle[3 * t + side], triangles[3 * t + side], triangleNumbers[t])
    }
  }
  for (let e = 0; e < edgeCount; e++) {
    if (edgeNumbers[2 * e] !== 0) insert(e, edges[2 * e], edgeNumbers[2 * e])
    if (edgeNumbers[2 * e + 1] !== 0) insert(e, edges[2 * e + 1], edgeNumbers[2 * e + 1])
    let divisor = 0
    for (let q = starts[e]; q < starts[e + 1]; q++) {
      divisor = gcd(
        divisor,
        insideFace[e] ? coefficients[q] : perComponent(polytope, coefficients[q], points[q]),
      )
    }
    for (let q = starts[e]; q < starts[e + 1]; q++) coefficients[q] /= divisor
  }
  return { starts, points, coefficients }

  function insert(e: number, point: number, coefficient: number): void {
    let q = filled[e]++
    for (; q > starts[e] && points[q - 1] > point; q--) {
      points[q] = points[q - 1]
      coefficients[q] = coefficients[q - 1]
    }
    points[q] = point
    coefficients[q] = coefficient
  }
}

/** The coefficients of one row of `curveRows`, in any order. */
export function curveRow(
  { triangles, faceOf, polytope }: TwoFaceClass,
  { edges, edgeNumbers, triangleNumbers }: IntersectionNumbers,
  e: number,
): number[] {
  const i = edges[2 * e]
  const j = edges[2 * e + 1]
  const points: number[] = []
  const coefficients: number[] = []
  let face = -1
  let insideFace = true
  for (let t = 0; t < faceOf.length; t++) {
    const p = triangles[3 * t]
    // Triangles are sorted, i < j: beyond i none has both.
    if (p > i) break
    const q = triangles[3 * t + 1]
    const r = triangles[3 * t + 2]
    const third = p === i ? (q === j ? r : r === j ? q : -1) : q === i && r === j ? p : -1
    if (third < 0) continue
    points.push(third)
    coefficients.push(triangleNumbers[t])
    if (face >= 0 && face !== faceOf[t]) insideFace = false
    face = faceOf[t]
  }
  for (const at of [2 * e, 2 * e + 1]) {
    if (edgeNumbers[at] === 0) continue
    points.push(edges[at])
    coefficients.push(edgeNumbers[at])
  }
  let divisor = 0
  for (let n = 0; n < points.length; n++) {
    divisor = gcd(divisor, insideFace ? coefficients[n] : perComponent(polytope, coefficients[n], points[n]))
  }
  return coefficients.map((coefficient) => coefficient / divisor)
}

function perComponent({ components }: Polytope, coefficient: number, point: number): number {
  const share = coefficient / components[point]
  if (!Number.isInteger(share)) {
    throw new InvariantError(
      `A curve meets D_${point} ${coefficient} times, not a multiple of its ${components[point]} components.`,
    )
  }
  return share
}
