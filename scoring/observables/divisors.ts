import { type DivisorTopology, divisorTopology } from '../geometry/divisors.ts'
import type { Candidate } from './candidate.ts'
import { ofCone, ofPolytope, ofTopology, SOURCES, TOTAL_OF_COMPONENTS } from './described.ts'
import type { Described, RecordSet, ValueField, ValueType } from './observable.ts'
import {
  abelianFibres,
  diagonalDelPezzoDegree,
  diagonalDelPezzoDegrees,
  enriquesHalfFibres,
  isSquareZeroWith,
  k3Fibres,
  neighbours,
} from './specialDivisors.ts'

const field = (
  entry: Described,
  column: (candidate: Candidate) => ArrayLike<number>,
  type: ValueType = 'integer',
  undefinedWhen?: string,
): ValueField => ({ kind: 'value', type, ...entry, column, ...(undefinedWhen ? { undefinedWhen } : {}) })

/** Adds how one divisor's entry is read alone. */
const local = (of: ValueField, at: NonNullable<ValueField['at']>): ValueField => ({ ...of, at })

/** Read off the polytope, so that a rule can turn a polytope away before anything is triangulated. */
const topological = (
  name: 'chi' | 'h1' | 'h2' | 'components' | 'rigid',
  description: string,
  formula: string,
  type: ValueType = 'integer',
): ValueField =>
  field(
    ofPolytope({ name, description, formula, source: SOURCES.divisors }),
    (candidate) => divisorTopology(candidate.polytope)[name satisfies keyof DivisorTopology],
    type,
  )

const degrees = (candidate: Candidate) =>
  diagonalDelPezzoDegrees(candidate.numbers(), candidate.divisorTopology().chi)

const degree = (candidate: Candidate, i: number) =>
  diagonalDelPezzoDegree(candidate.numbers(), candidate.divisorTopology().chi, i)

/** The prime toric divisors, one per point. */
export const divisors: RecordSet = {
  kind: 'records',
  ...ofPolytope({
    name: 'divisors',
    description: 'The prime toric divisors, one for each lattice point that is not inside a facet.',
    convention: TOTAL_OF_COMPONENTS,
    formula: '\\{D_i\\}',
  }),
  size: ({ polytope }) => polytope.pointCount,
  fields: [
    field(
      ofCone({
        name: 'volume',
        description: 'Volume of the four-cycle.',
        unit: 'l_s^4',
        convention: `units 2 pi sqrt(alpha') = 1, Einstein frame, leading order; ${TOTAL_OF_COMPONENTS}`,
        scaling: 2,
        formula: '\\tau_i = \\tfrac12 \\kappa_{ijk} w_j w_k',
        source: SOURCES.volumes,
      }),
      (candidate) => candidate.volumes().divisors,
      'number',
    ),
    local(
      field(
        ofTopology({
          name: 'cubic',
          description: 'Triple self-intersection.',
          convention: TOTAL_OF_COMPONENTS,
          formula: 'D_i^3 = \\kappa_{iii}',
        }),
        (candidate) => candidate.numbers().cubes,
      ),
      (candidate, i) => candidate.numbers().cubes[i],
    ),
    local(
      field(
        ofTopology({
          name: 'c2',
          description: 'Second Chern class of the threefold on the divisor.',
          convention: TOTAL_OF_COMPONENTS,
          formula: 'c_2(X) \\cdot D_i = \\sum_{j<k} \\kappa_{ijk}',
        }),
        (candidate) => candidate.numbers().secondChern,
      ),
      (candidate, i) => candidate.numbers().secondChern[i],
    ),
    local(
      field(
        ofTopology({
          name: 'euler',
          description: 'Topological Euler number of the divisor.',
          convention: TOTAL_OF_COMPONENTS,
          formula: '\\chi(D_i) = \\kappa_{iii} + c_2 \\cdot D_i',
        }),
        (candidate) => {
          const { cubes, secondChern } = candidate.numbers()
          return cubes.map((cube, i) => cube + secondChern[i])
        },
      ),
      (candidate, i) => candidate.numbers().cubes[i] + candidate.numbers().secondChern[i],
    ),
    topological('chi', 'Holomorphic Euler characteristic.', '\\chi(\\mathcal O_D) = 1 - h^1 + h^2'),
    topological('h1', 'h^1 of the structure sheaf.', 'h^1(\\mathcal O_D)'),
    topological('h2', 'h^2 of the structure sheaf: deformations.', 'h^2(\\mathcal O_D)'),
    topological('components', 'Number of connected components.', '1 \\text{ or } L_f'),
    topological(
      'rigid',
      'One component with h^1 = h^2 = 0. The rigid components of a split divisor do not count here.',
      'h^\\bullet(\\mathcal O_D) = (1,0,0)',
      'truth',
    ),
    field(
      ofPolytope({
        name: 'carrier',
        description: 'Dimension of the smallest face that contains the point: 0 vertex, 1 edge, 2 two-face.',
        formula: '\\dim c(p)',
      }),
      ({ polytope }) => polytope.carrierDimension,
    ),
    local(
      field(
        ofTopology({
          name: 'k3',
          description: 'The divisor is a K3 fibre.',
          formula: '\\kappa_{iij} = 0\\ \\forall j,\\quad c_2 \\cdot D_i = 24',
          source: 'Oguiso 1993 (from memory)',
        }),
        (candidate) => k3Fibres(candidate.numbers()),
        'truth',
      ),
      (candidate, i) => isSquareZeroWith(24, candidate.numbers(), i),
    ),
    local(
      field(
        ofTopology({
          name: 'enriques',
          description: 'The divisor is an Enriques surface: half the fibre of a K3 fibration.',
          formula: '\\kappa_{iij} = 0\\ \\forall j,\\quad c_2 \\cdot D_i = 12',
          source: 'Oguiso 1993 (from memory)',
        }),
        (candidate) => enriquesHalfFibres(candidate.numbers()),
        'truth',
      ),
      (candidate, i) => isSquareZeroWith(12, candidate.numbers(), i),
    ),
    local(
      field(
        ofTopology({
          name: 'abelian',
          description:
            'The divisor is an abelian surface (a four-torus) and a fibre. No prime toric divisor can be one: this is always false.',
          convention: 'an abelian surface has h^i(O) = (1, 2, 1), which no lattice point gives',
          formula: '\\kappa_{iij} = 0\\ \\forall j,\\quad c_2 \\cdot D_i = 0',
          source: 'Oguiso 1993 (from memory)',
        }),
        (candidate) => abelianFibres(candidate.numbers()),
        'truth',
      ),
      (candidate, i) => isSquareZeroWith(0, candidate.numbers(), i),
    ),
    local(
      field(
        ofTopology({
          name: 'delPezzo',
          description: 'The divisor is a diagonal del Pezzo surface.',
          formula:
            '\\kappa_{iii}\\kappa_{ijl} = \\kappa_{iij}\\kappa_{iil},\\ 1 \\le \\kappa_{iii} \\le 9,\\ \\chi(\\mathcal O) = 1,\\ \\kappa_{iij} \\le 0',
          source: SOURCES.diagonal,
        }),
        (candidate) => degrees(candidate).map((degree) => (Number.isNaN(degree) ? 0 : 1)),
        'truth',
      ),
      (candidate, i) => (Number.isNaN(degree(candidate, i)) ? 0 : 1),
    ),
    local(
      field(
        ofTopology({
          name: 'delPezzoDegree',
          description: 'Degree of a diagonal del Pezzo divisor; undefined for the others.',
          formula: 'k = \\kappa_{iii}',
          source: SOURCES.diagonal,
        }),
        degrees,
        'integer',
        'the divisor is no diagonal del Pezzo surface',
      ),
      degree,
    ),
    {
      kind: 'members',
      of: 'divisors',
      ...ofTopology({
        name: 'neighbours',
        description: 'The other divisors that meet this one.',
        formula: '\\{D_j : D_i \\cap D_j \\ne \\emptyset,\\ j \\ne i\\}',
      }),
      members: (candidate) => neighbours(candidate.numbers()),
    },
  ],
}
