import { InvariantError } from '../errors.ts'
import { compareLexicographic } from './integers.ts'
import type { PointIndex } from './pointIndex.ts'
import { affineDimension } from './polytopeInput.ts'

/**
 * Automorphisms as permutations of all points, from orderings of the vertices that a lattice isomorphism carries
 * into each other. Lexicographic order, so the identity is first.
 *
 * @param points 4 coordinates each, vertices first
 * @param orders each lists the same vertices; the linear map that takes the first ordering to another one is in
 *   GL(4,Z)
 */
export function automorphismsFrom(
  points: ArrayLike<number>,
  index: PointIndex,
  orders: readonly (readonly number[])[],
): Int32Array[] {
  const [first] = orders
  const frame = independentPositions(points, first)
  const inverse = inverseOf(frame.map((position) => coordinates(points, first[position])))
  const image = new Float64Array(4)
  return orders
    .map((order) => {
      const matrix = matrixTaking(
        inverse,
        frame.map((position) => coordinates(points, order[position])),
      )
      const permutation = new Int32Array(points.length / 4)
      for (let i = 0; i < permutation.length; i++) {
        for (let axis = 0; axis < 4; axis++) {
          let sum = 0
          for (let k = 0; k < 4; k++) sum += matrix[axis][k] * points[4 * i + k]
          image[axis] = sum
        }
        permutation[i] = index.find(image, 0)
      }
      return permutation
    })
    .sort(compareLexicographic)
}

const coordinates = (points: ArrayLike<number>, i: number): number[] =>
  [0, 1, 2, 3].map((axis) => points[4 * i + axis])

/** Positions of the first four linearly independent points in the ordering. */
function independentPositions(points: ArrayLike<number>, order: readonly number[]): number[] {
  const chosen: number[] = []
  const rows = [[0, 0, 0, 0]]
  for (let position = 0; chosen.length < 4; position++) {
    const candidate = coordinates(points, order[position])
    if (affineDimension([...rows, candidate]) < rows.length) continue
    rows.push(candidate)
    chosen.push(position)
  }
  return chosen
}

/** The matrix that takes four independent vectors to four others, integral by assumption. */
function matrixTaking(from: Inverse, to: readonly (readonly number[])[]): number[][] {
  return [0, 1, 2, 3].map((row) =>
    [0, 1, 2, 3].map((column) => {
      let sum = 0
      for (let k = 0; k < 4; k++) sum += to[k][row] * from.adjugate[k][column]
      const entry = sum / from.determinant
      if (!Number.isInteger(entry))
        throw new InvariantError('An automorphism has a matrix that is not integral.')
      return entry
    }),
  )
}

/** Inverse of the matrix whose columns are given vectors: adjugate over determinant. */
interface Inverse {
  readonly adjugate: readonly (readonly number[])[]
  readonly determinant: number
}

function inverseOf(columns: readonly (readonly number[])[]): Inverse {
  const adjugate = columns.map((_, k) => {
    const [a, b, c] = columns.filter((_column, other) => other !== k)
    const sign = k % 2 === 0 ? 1 : -1
    return [0, 1, 2, 3].map((axis) => {
      const [p, q, r] = [0, 1, 2, 3].filter((other) => other !== axis)
      const minor =
        a[p] * (b[q] * c[r] - b[r] * c[q]) -
        a[q] * (b[p] * c[r] - b[r] * c[p]) +
        a[r] * (b[p] * c[q] - b[q] * c[p])
      return (axis % 2 === 0 ? sign : -sign) * minor
    })
  })
  return {
    adjugate,
    determinant: adjugate[0].reduce((sum, entry, axis) => sum + entry * columns[0][axis], 0),
  }
}
