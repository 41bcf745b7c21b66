import { divisorTopology } from './divisors.ts'
import { PointSpan } from './pointSpan.ts'
import type { Polytope } from './polytope.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'

/** Rigid divisors of a polytope's threefolds, h^.(O) = (1, 0, 0), among the prime toric divisors and their components. */
export interface RigidDivisors {
  /** Prime toric divisors of one component that are rigid. */
  readonly prime: number
  /** Components of split divisors: all of them are rigid. */
  readonly components: number
  /** Dimension of what the classes of both span in H^{1,1}; at most h11. */
  readonly rank: number
}

const known = new WeakMap<Polytope, RigidDivisors>()

/**
 * Counts rigid divisors and the rank of their classes, exact. The relations among the classes of all prime toric
 * divisors are sum_p <m, p> D_p = 0, one for each m; those among a subset R are the m that vanish on all other points,
 * 4 - rank(others) of them, so R spans |R| - 4 + rank(others) dimensions. A divisor that splits into L components adds
 * L - 1 dimensions beyond the toric ones, independent of all others (Batyrev, alg-geom/9310003).
 */
export function rigidDivisors(polytope: Polytope): RigidDivisors {
  const before = known.get(polytope)
  if (before) return before
  const { components, rigid } = divisorTopology(polytope)
  const others = new PointSpan(reducedCoordinates(polytope))
  const count = { prime: 0, components: 0 }
  let rank = -4
  for (let p = 0; p < polytope.pointCount; p++) {
    if (rigid[p] === 1) count.prime++
    else if (components[p] > 1) count.components += components[p]
    else {
      others.add(p)
      continue
    }
    rank += components[p]
  }
  const result = { ...count, rank: rank + others.rank }
  known.set(polytope, result)
  return result
}
