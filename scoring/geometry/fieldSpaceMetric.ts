import { innerProduct, orthonormalColumns, removeComponents } from './orthonormal.ts'
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

/** What the metric over all points needs of the polytope alone. */
export interface RelationSpace {
  /** Orthonormal basis (four vectors over the points) of the linear relations: the kernel of the metric. */
  readonly relations: readonly Float64Array[]
  /** Four points whose vectors are independent, chosen far from dependent; and all others, ascending. */
  readonly anchors: Int32Array
  readonly others: Int32Array
}

const known = new WeakMap<Polytope, RelationSpace>()

/**
 * The linear relations <m, v_k>, m in R^4, over the points. A relation that vanishes on the four anchors is zero,
 * so the metric over the other points is regular; the anchors are picked greedily by the largest part of their
 * row in the relations that is orthogonal to the rows before (pivoted orthogonalisation), which keeps it well
 * conditioned. Computed once per polytope.
 */
export function relationSpace(polytope: Polytope): RelationSpace {
  const before = known.get(polytope)
  if (before) return before
  const points = reducedCoordinates(polytope)
  const count = polytope.pointCount
  const columns = [0, 1, 2, 3].map((axis) =>
    Float64Array.from({ length: count }, (_, p) => points[4 * p + axis]),
  )
  const relations = orthonormalColumns(columns)
  const anchors = Int32Array.from(independentRows(relations, count)).sort()
  const others = Int32Array.from({ length: count }, (_, p) => p).filter((p) => !anchors.includes(p))
  const space = { relations, anchors, others }
  known.set(polytope, space)
  return space
}

function independentRows(relations: readonly Float64Array[], count: number): number[] {
  const rows = Array.from({ length: count }, (_, p) => Float64Array.from(relations, (column) => column[p]))
  const chosen: number[] = []
  while (chosen.length < relations.length) {
    let best = -1
    let length = 0
    for (let p = 0; p < count; p++) {
      const own = innerProduct(rows[p], rows[p])
      if (own > length) {
        best = p
        length = own
      }
    }
    chosen.push(best)
    const direction = rows[best].map((entry) => entry / Math.sqrt(length))
    for (const row of rows) removeComponents([direction], row)
  }
  return chosen
}
