import { InvariantError } from '../errors.ts'
import { determinant, type Vector } from './determinants.ts'
import { lexicographic } from './facets.ts'

/**
 * All lattice points on the boundary of a reflexive polytope, from a triangulation of the boundary by vertices.
 *
 * A boundary point lies in a simplex (a, b, c, d) of a facet and has there coordinates that are multiples of 1/D,
 * D = |det|, non-negative, with sum 1. The D classes of Z^4 modulo the sublattice spanned by a, b, c, d are gone
 * through by their representatives in a triangular basis; reduced to coordinates in [0, 1), the class belongs to a
 * point of the simplex if and only if its coordinates add up to 1. These are
 * all lattice points but the origin: one on no facet has <m, p> >= 0 for all normals, which surround the origin.
 */
export function boundaryLatticePoints(
  vertices: readonly Vector[],
  simplices: readonly (readonly number[])[],
): Vector[] {
  const found = new Map<string, Vector>()
  for (const simplex of simplices) {
    const corners = simplex.map((v) => vertices[v])
    for (const corner of corners) found.set(corner.join(), corner)
    for (const point of pointsInSimplex(corners)) found.set(point.join(), point)
  }
  return [...found.values()].sort(lexicographic)
}

function* pointsInSimplex(corners: readonly Vector[]): Generator<Vector> {
  const [a, b, c, d] = corners
  const whole = determinant(a, b, c, d)
  const size = Math.abs(whole)
  if (size === 1) return
  for (const x of representatives(corners, size)) {
    const shares = [
      determinant(x, b, c, d),
      determinant(a, x, c, d),
      determinant(a, b, x, d),
      determinant(a, b, c, x),
    ].map((share) => positiveRest(whole < 0 ? -share : share, size))
    if (shares.reduce((sum, share) => sum + share, 0) !== size) continue
    yield [0, 1, 2, 3].map((axis) => {
      const entry = corners.reduce((sum, corner, n) => sum + shares[n] * corner[axis], 0) / size
      if (!Number.isInteger(entry))
        throw new InvariantError('A point of a lattice simplex is no lattice point.')
      return entry + 0
    })
  }
}

/** One vector of every class of Z^4 modulo the lattice spanned by four vectors: a box of the triangular basis. */
function* representatives(basis: readonly Vector[], size: number): Generator<Vector> {
  const sides = triangularDiagonal(basis)
  if (sides.reduce((product, side) => product * side, 1) !== size) {
    throw new InvariantError('A triangular basis has another determinant than its lattice.')
  }
  for (let x = 0; x < sides[0]; x++) {
    for (let y = 0; y < sides[1]; y++) {
      for (let z = 0; z < sides[2]; z++) {
        for (let t = 0; t < sides[3]; t++) yield [x, y, z, t]
      }
    }
  }
}

/** Diagonal of an upper triangular basis of the same lattice (Euclid's algorithm on rows). */
function triangularDiagonal(basis: readonly Vector[]): number[] {
  const rows = basis.map((row) => row.map(BigInt))
  for (let column = 0; column < 4; column++) {
    for (let other = column + 1; other < 4; other++) {
      while (rows[other][column] !== 0n) {
        const quotient = rows[column][column] / rows[other][column]
        const rest = rows[column].map((entry, n) => entry - quotient * rows[other][n])
        rows[column] = rows[other]
        rows[other] = rest
      }
    }
  }
  return rows.map((row, n) => Math.abs(Number(row[n])))
}

function positiveRest(value: number, modulus: number): number {
  const rest = value % modulus
  return rest < 0 ? rest + modulus : rest
}
