import { edgeRow, intersectionNumber } from '../geometry/intersectionNumbers.ts'
import { ofTopology, TOTAL_OF_COMPONENTS } from './described.ts'
import type { Relation } from './observable.ts'

const divisor = (name: string) => ({ name, of: 'divisors' })

/** Functions of divisors. Symmetric in their arguments, so that no index shows. */
export const relations: readonly Relation[] = [
  {
    kind: 'relation',
    type: 'integer',
    parameters: [divisor('x'), divisor('y'), divisor('z')],
    ...ofTopology({
      name: 'kappa',
      description: 'Intersection number of three divisors, which may be equal.',
      convention: TOTAL_OF_COMPONENTS,
      formula: '\\kappa_{xyz} = D_x \\cdot D_y \\cdot D_z',
    }),
    bind: (candidate) => {
      const numbers = candidate.numbers()
      return (x, y, z) => intersectionNumber(numbers, x, y, z)
    },
  },
  {
    kind: 'relation',
    type: 'truth',
    parameters: [divisor('x'), divisor('y')],
    ...ofTopology({
      name: 'meet',
      description: 'Two divisors have a point in common. A divisor meets itself.',
      formula: 'D_x \\cap D_y \\ne \\emptyset',
    }),
    bind: (candidate) => {
      const { edges } = candidate.numbers()
      return (x, y) => (x === y || edgeRow(edges, Math.min(x, y), Math.max(x, y)) >= 0 ? 1 : 0)
    },
  },
]
