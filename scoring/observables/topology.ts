import { divisorTopology } from '../geometry/divisors.ts'
import { ofTopology, SOURCES } from './described.ts'
import type { ScalarObservable } from './observable.ts'
import { diagonalDelPezzoDegrees } from './specialDivisors.ts'

/** What the intersection numbers say of the candidate as a whole. */
export const topologyObservables: readonly ScalarObservable[] = [
  {
    kind: 'scalar',
    type: 'truth',
    ...ofTopology({
      name: 'swissCheese',
      description:
        'The volume is of diagonal (strong Swiss-cheese) form: all divisor classes but one are diagonal del Pezzo divisors.',
      convention:
        'as many diagonal del Pezzo divisors as toric divisor classes, less one; they never meet, so they are independent. Toric part where the polytope is not favourable',
      formula: 'V = a\\,\\tau_b^{3/2} - \\sum_{s=1}^{h^{1,1}-1} c_s\\,\\tau_s^{3/2}',
      source: SOURCES.diagonal,
    }),
    read: (candidate) => {
      const degrees = diagonalDelPezzoDegrees(candidate.numbers(), divisorTopology(candidate.polytope).chi)
      const small = degrees.reduce((count, degree) => count + (degree > 0 ? 1 : 0), 0)
      return small === candidate.polytope.pointCount - 5 ? 1 : 0
    },
  },
]
