import { pointsByCarrier } from '../geometry/polytopeSummary.ts'
import type { RigidDivisors } from '../geometry/rigidDivisors.ts'
import { rigidDivisors } from '../geometry/rigidDivisors.ts'
import type { Candidate } from './candidate.ts'
import { ofShape, SOURCES } from './described.ts'
import type { Described, ScalarObservable, ValueType } from './observable.ts'

/** What is read: the polytope, and what is computed from it alone. */
type View = Pick<Candidate, 'polytope' | 'sections' | 'normalisedVolumes'>

const scalar = (
  entry: Omit<Parameters<typeof ofShape>[0], 'name'> & { readonly name: string },
  read: (view: View) => number,
  type: ValueType = 'integer',
): ScalarObservable => ({
  kind: 'scalar',
  type,
  ...(ofShape({ ...entry, name: `polytope.${entry.name}` }) satisfies Described),
  read,
})

const carried = (name: string, dimension: 1 | 2, where: string, formula: string): ScalarObservable =>
  scalar(
    { name, description: `Number of lattice points inside ${where}.`, formula },
    ({ polytope }) => pointsByCarrier(polytope)[dimension],
  )

const rigid = (
  name: string,
  description: string,
  formula: string,
  value: (found: RigidDivisors, h11: number) => number,
  type: ValueType = 'integer',
): ScalarObservable =>
  scalar(
    { name, description, formula, convention: 'rigid means h^i(O) = (1, 0, 0)', source: SOURCES.divisors },
    ({ polytope }) => value(rigidDivisors(polytope), polytope.hodge.h11),
    type,
  )

/** Counts and sizes that the polytope alone decides. */
export const polytopeCounts: readonly ScalarObservable[] = [
  carried('edgePoints', 1, 'edges', '\\sum_{e} \\ell^*(e)'),
  carried('facePoints', 2, '2-faces', '\\sum_{f} \\ell^*(f)'),
  scalar(
    {
      name: 'facetPoints',
      description: 'Number of lattice points inside facets. They give no divisors.',
      formula: '\\sum_{F} \\ell^*(F)',
    },
    ({ polytope }) => polytope.latticePoints - 1 - polytope.pointCount,
  ),
  scalar(
    {
      name: 'normalisedVolume',
      description: 'Normalised volume of the polytope.',
      convention: '24 times the Euclidean volume, an integer',
      formula: '4!\\,\\mathrm{vol}(\\Delta)',
    },
    (view) => view.normalisedVolumes().own,
  ),
  scalar(
    {
      name: 'dualNormalisedVolume',
      description: 'Normalised volume of the dual polytope.',
      convention: '24 times the Euclidean volume, an integer',
      formula: '4!\\,\\mathrm{vol}(\\Delta^\\circ)',
    },
    (view) => view.normalisedVolumes().dual,
  ),
  scalar(
    {
      name: 'planarSections',
      description: 'Number of planes through the origin that cut out a reflexive polygon.',
      convention: 'they propose genus-one fibrations; whether one is there depends on the triangulation',
      formula: '\\#\\{\\Pi : \\dim \\Pi = 2,\\ \\Delta \\cap \\Pi \\text{ reflexive}\\}',
      source: SOURCES.sections,
    },
    (view) => view.sections().planar.length,
  ),
  scalar(
    {
      name: 'solidSections',
      description:
        'Number of hyperplanes through the origin that cut out a three-dimensional reflexive polytope.',
      convention: 'they propose K3 fibrations; whether one is there depends on the triangulation',
      formula: '\\#\\{\\Pi : \\dim \\Pi = 3,\\ \\Delta \\cap \\Pi \\text{ reflexive}\\}',
      source: SOURCES.sections,
    },
    (view) => view.sections().solid.length,
  ),
  scalar(
    {
      name: 'nestedSections',
      description: 'Number of pairs of a reflexive polygon inside a three-dimensional reflexive section.',
      formula: '\\#\\{\\Pi_2 \\subset \\Pi_3\\}',
      source: SOURCES.sections,
    },
    (view) => view.sections().nested.reduce((sum, inside) => sum + inside.length, 0),
  ),
  rigid(
    'rigidDivisors',
    'Number of prime toric divisors of one component that are rigid.',
    '\\#\\{i : h^\\bullet(\\mathcal O_{D_i}) = (1,0,0)\\}',
    ({ prime }) => prime,
  ),
  rigid(
    'rigidComponents',
    'Number of components of split divisors, all of them rigid. Zero on favourable polytopes.',
    '\\sum_{f : L_f > 1} \\ell^*(f)\\, L_f',
    ({ components }) => components,
  ),
  rigid(
    'rigidRank',
    'Number of independent classes among rigid prime toric divisors and components of split ones.',
    '\\mathrm{rank}\\,\\langle [D] : D \\text{ rigid}\\rangle',
    ({ rank }) => rank,
  ),
  rigid(
    'rigidBasis',
    'Rigid toric divisors, components of split ones included, span all divisor classes: h11 independent ones exist.',
    '\\mathrm{rank} = h^{1,1}',
    ({ rank }, h11) => (rank === h11 ? 1 : 0),
    'truth',
  ),
]
