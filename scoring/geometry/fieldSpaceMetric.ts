import { orthonormalColumns } from './orthonormal.ts'
import type { Polytope } from './polytope.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'
import type { PairNumbers, Volumes } from './volumes.ts'

/**
 * The inverse field-space metric M_ij = 4 (tau_i tau_j - V A_ij), the inverse of
 * G_ij = 1/4 d^2 K / d tau_i d tau_j with K = -2 log V, over the given points: packed lower triangle, row a at
 * a (a + 1) / 2. Over all points it has the four linear relations as its kernel and is positive definite beside.
 */
export function inverseMetric(pairs: PairNumbers, volumes: Volumes, points: Int32Array): Float64Array {
  const { total, divisors } = volumes
  const size = points.length
  const place = new Int32Array(divisors.length).fill(-1)
  for (let a = 0; a < size; a++) place[points[a]] = a
  const packed = new Float64Array((size * (size + 1)) / 2)
  for (let a = 0; a < size; a++) {
    const row = (a * (a + 1)) / 2
    const factor = 4 * divisors[points[a]]
    for (let b = 0; b <= a; b++) packed[row + b] = factor * divisors[points[b]]
    packed[row + a] -= 4 * total * pairs.diagonal[points[a]]
  }
  for (let e = 0; e < pairs.offDiagonal.length; e++) {
    const a = place[pairs.edges[2 * e]]
    const b = place[pairs.edges[2 * e + 1]]
    if (a < 0 || b < 0) continue
    const row = Math.max(a, b)
    packed[(row * (row + 1)) / 2 + Math.min(a, b)] -= 4 * total * pairs.offDiagonal[e]
  }
  return packed
}

const known = new WeakMap<Polytope, readonly Float64Array[]>()

/**
 * Orthonormal basis (four vectors over the points) of the linear relations <m, v_k>, m in R^4: the kernel of the
 * metric over all points. Computed once per polytope.
 */
export function linearRelations(polytope: Polytope): readonly Float64Array[] {
  const before = known.get(polytope)
  if (before) return before
  const points = reducedCoordinates(polytope)
  const columns = [0, 1, 2, 3].map((axis) =>
    Float64Array.from({ length: polytope.pointCount }, (_, p) => points[4 * p + axis]),
  )
  const relations = orthonormalColumns(columns)
  known.set(polytope, relations)
  return relations
}
