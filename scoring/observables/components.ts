import { componentNumbers, componentsOf, type Components } from '../geometry/componentNumbers.ts'
import { divisorTopology } from '../geometry/divisors.ts'
import type { IntersectionNumbers } from '../geometry/intersectionNumbers.ts'
import type { Polytope } from '../geometry/polytope.ts'
import type { Candidate } from './candidate.ts'
import { ofCone, ofPolytope, ofTopology, SOURCES } from './described.ts'
import type { RecordSet, ValueField, ValueType } from './observable.ts'
import { diagonalDelPezzoDegrees } from './specialDivisors.ts'

const layouts = new WeakMap<Polytope, Components>()
const forms = new WeakMap<IntersectionNumbers, IntersectionNumbers>()

function layoutOf(polytope: Polytope): Components {
  const known = layouts.get(polytope) ?? componentsOf(polytope)
  layouts.set(polytope, known)
  return known
}

function formOf(candidate: Candidate): IntersectionNumbers {
  const numbers = candidate.numbers()
  const known = forms.get(numbers) ?? componentNumbers(candidate.class, numbers)
  forms.set(numbers, known)
  return known
}

/** A value per component from one per point, shared among the components of a split divisor or common to them. */
const perComponent = (
  polytope: Polytope,
  values: ArrayLike<number>,
  take: (value: number, sheets: number) => number,
): number[] => Array.from(layoutOf(polytope).pointOf, (p) => take(values[p], polytope.components[p]))

const field = (
  entry: ReturnType<typeof ofTopology>,
  column: (candidate: Candidate) => ArrayLike<number>,
  type: ValueType = 'integer',
  undefinedWhen?: string,
): ValueField => ({ kind: 'value', type, ...entry, column, ...(undefinedWhen ? { undefinedWhen } : {}) })

const topological = (
  name: 'chi' | 'h1' | 'h2' | 'rigid',
  description: string,
  formula: string,
  ofSplit: number,
  type: ValueType = 'integer',
): ValueField =>
  field(
    ofPolytope({ name, description, formula, source: SOURCES.divisors }),
    ({ polytope }) =>
      perComponent(polytope, divisorTopology(polytope)[name], (value, sheets) =>
        sheets > 1 ? ofSplit : value,
      ),
    type,
  )

const degrees = (candidate: Candidate): Float64Array => {
  const { polytope } = candidate
  const chi = perComponent(polytope, divisorTopology(polytope).chi, (value, sheets) => value / sheets)
  return diagonalDelPezzoDegrees(formOf(candidate), chi)
}

/** The connected components of the prime toric divisors: the irreducible ones, which span all of H^{1,1}. */
export const components: RecordSet = {
  kind: 'records',
  ...ofPolytope({
    name: 'components',
    description:
      'The connected components of the prime toric divisors, h11 + 4 of them; on favourable polytopes the divisors themselves.',
    convention:
      'a divisor inside a 2-face f with L_f > 1 has L_f disjoint components, each with 1 / L_f of its numbers; the Kaehler class stays in the toric part',
    formula: '\\{D_i^a\\},\\quad D_i = \\textstyle\\sum_a D_i^a',
  }),
  size: ({ polytope }) => layoutOf(polytope).count,
  fields: [
    field(
      ofCone({
        name: 'volume',
        description: 'Volume of the four-cycle.',
        unit: 'l_s^4',
        convention:
          "units 2 pi sqrt(alpha') = 1, Einstein frame, leading order; equal for the components of one divisor",
        scaling: 2,
        formula: '\\tau_i / L_f',
        source: SOURCES.volumes,
      }),
      (candidate) =>
        perComponent(candidate.polytope, candidate.volumes().divisors, (value, sheets) => value / sheets),
      'number',
    ),
    field(
      ofTopology({
        name: 'cubic',
        description: 'Triple self-intersection.',
        formula: '(D_i^a)^3 = \\kappa_{iii} / L_f',
      }),
      (candidate) => formOf(candidate).cubes,
    ),
    field(
      ofTopology({
        name: 'c2',
        description: 'Second Chern class of the threefold on the component.',
        formula: 'c_2(X) \\cdot D_i^a',
      }),
      (candidate) => formOf(candidate).secondChern,
    ),
    field(
      ofTopology({
        name: 'euler',
        description: 'Topological Euler number.',
        formula: '(D_i^a)^3 + c_2 \\cdot D_i^a',
      }),
      (candidate) => {
        const { cubes, secondChern } = formOf(candidate)
        return cubes.map((cube, i) => cube + secondChern[i])
      },
    ),
    topological('chi', 'Holomorphic Euler characteristic.', '\\chi(\\mathcal O_D) = 1 - h^1 + h^2', 1),
    topological('h1', 'h^1 of the structure sheaf.', 'h^1(\\mathcal O_D)', 0),
    topological('h2', 'h^2 of the structure sheaf: deformations.', 'h^2(\\mathcal O_D)', 0),
    topological(
      'rigid',
      'h^1 = h^2 = 0. Every component of a split divisor is rigid, and counts.',
      'h^\\bullet(\\mathcal O_D) = (1,0,0)',
      1,
      'truth',
    ),
    field(
      ofTopology({
        name: 'delPezzo',
        description: 'The component is a diagonal del Pezzo surface with respect to all components.',
        formula:
          '\\kappa_{iii}\\kappa_{ijl} = \\kappa_{iij}\\kappa_{iil},\\ 1 \\le \\kappa_{iii} \\le 9,\\ \\chi(\\mathcal O) = 1,\\ \\kappa_{iij} \\le 0',
        source: SOURCES.diagonal,
      }),
      (candidate) => degrees(candidate).map((degree) => (Number.isNaN(degree) ? 0 : 1)),
      'truth',
    ),
    field(
      ofTopology({
        name: 'delPezzoDegree',
        description: 'Degree of a component that is a diagonal del Pezzo surface; undefined for the others.',
        formula: 'k = \\kappa_{iii}',
        source: SOURCES.diagonal,
      }),
      degrees,
      'integer',
      'the component is no diagonal del Pezzo surface',
    ),
    {
      kind: 'element',
      of: 'divisors',
      ...ofPolytope({
        name: 'whole',
        description: 'The prime toric divisor it is a component of.',
        formula: 'D_i',
      }),
      column: ({ polytope }) => layoutOf(polytope).pointOf,
    },
  ],
}
