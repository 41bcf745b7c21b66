import { InvariantError } from '../errors.ts'
import { curveRows, type CurveRows } from './curves.ts'
import { InnerCone } from './innerCone.ts'
import type { IntersectionNumbers } from './intersectionNumbers.ts'
import { leastNormPoint, type LeastNormPoint } from './quadraticProgram.ts'
import { distinctRows, rowCount, rowsBelow, stackRows } from './sparseRows.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** The point of least norm at lattice distance one inside every wall of the cone (scale 1). */
export interface ReferencePoint {
  /** Kaehler class J = sum_k w_k D_k, one number per point. */
  readonly weights: Float64Array
  /** True when the edge curves alone gave the point: then outer and inner cone agree there. */
  readonly edgeCurvesSuffice: boolean
  /** Rounds in which violated circuits were added. */
  readonly rounds: number
}

/** A circuit counts as violated when its value is below this; primitive classes have value 1 on the boundary. */
const violatedBelow = 1 - 1e-8
const maximalRounds = 60

/**
 * The Kaehler class of least Euclidean norm over all prime toric divisors with C . w >= 1 for the curve of every
 * edge and for every circuit of the inner cone. The circuits are added lazily: after each solution, of each
 * triangle the worst circuit with value below 1, until there is none; then the point is that of the program with
 * all circuits. It lies orthogonal to the linear relations, because every row is one.
 *
 * @throws InvariantError when no point satisfies all conditions
 */
export function referencePoint(
  twoFaceClass: TwoFaceClass,
  numbers: IntersectionNumbers,
  curves: CurveRows = curveRows(twoFaceClass, numbers),
): ReferencePoint {
  const cone = new InnerCone(twoFaceClass)
  let rows = distinctRows(curves)
  let solution: LeastNormPoint | undefined
  for (let rounds = 0; rounds < maximalRounds; rounds++) {
    // The rows of the round before come first, in the same order.
    solution = leastNormPoint(numbers.pointCount, rows, solution)
    const weights = solution.point
    const violated = rowsBelow(cone.violatedCircuits(weights, violatedBelow), weights, violatedBelow)
    if (rowCount(violated) === 0) return { weights, edgeCurvesSuffice: rounds === 0, rounds }
    rows = distinctRows(stackRows(rows, violated))
  }
  throw new InvariantError(`Circuits were still violated after ${maximalRounds} rounds.`)
}
