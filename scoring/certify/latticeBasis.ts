import { InvariantError } from '../errors.ts'
import { crossForm, greatestCommonDivisor, pairing, type Vector } from './determinants.ts'

/**
 * The lexicographically first four points with |det| = g, g the greatest common divisor of all 4 x 4 determinants:
 * all other points form a lattice basis of the divisor classes (modulo torsion where g > 1). By trying them in order;
 * g is the determinant of a triangular basis of the lattice that the points generate.
 */
export function firstLatticeBasis(points: readonly Vector[]): { excluded: number[]; index: number } {
  const index = latticeIndex(points)
  const count = points.length
  for (let a = 0; a < count; a++) {
    for (let b = a + 1; b < count; b++) {
      for (let c = b + 1; c < count; c++) {
        const form = crossForm(points[a], points[b], points[c])
        const common = form.reduce(greatestCommonDivisor, 0)
        if (common === 0 || index % common !== 0) continue
        for (let d = c + 1; d < count; d++) {
          if (Math.abs(pairing(form, points[d])) === index) return { excluded: [a, b, c, d], index }
        }
      }
    }
  }
  throw new InvariantError(`No four points have the determinant ${index}.`)
}

function latticeIndex(points: readonly Vector[]): number {
  const rows: (bigint[] | undefined)[] = [undefined, undefined, undefined, undefined]
  for (const point of points) {
    let vector = point.map(BigInt)
    for (let axis = 0; axis < 4; axis++) {
      let row = rows[axis] ?? [0n, 0n, 0n, 0n]
      while (vector[axis] !== 0n) {
        const quotient = row[axis] / vector[axis]
        const rest = row.map((entry, n) => entry - quotient * vector[n])
        row = vector
        vector = rest
      }
      rows[axis] = row
    }
  }
  return Math.abs(Number(rows.reduce((product, row, axis) => product * (row as bigint[])[axis], 1n)))
}
