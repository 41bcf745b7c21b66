import { ofPolytope, SOURCES } from './described.ts'
import type { Described, ScalarObservable, ValueType } from './observable.ts'
import type { Candidate } from './candidate.ts'

const scalar = (
  entry: Described,
  read: (candidate: Candidate) => number,
  type: ValueType = 'integer',
): ScalarObservable => ({
  kind: 'scalar',
  type,
  ...entry,
  read,
})

/** What is known with the polytope, before any triangulation. */
export const polytopeObservables: readonly ScalarObservable[] = [
  scalar(
    ofPolytope({
      name: 'favourable',
      description: 'All of H^{1,1} comes from the toric divisors.',
      formula: '\\sum_f \\ell^*(f)\\,(L_f - 1) = 0',
      source: SOURCES.batyrev,
    }),
    ({ polytope }) => (polytope.favourable ? 1 : 0),
    'truth',
  ),
  scalar(
    ofPolytope({
      name: 'h11',
      description: 'Hodge number h^{1,1}: the number of Kaehler moduli.',
      formula:
        'h^{1,1} = \\ell(\\Delta) - 5 - \\sum_{\\text{facets}} \\ell^*(F) + \\sum_{2\\text{-faces}} \\ell^*(f)(L_f - 1)',
      source: SOURCES.batyrev,
    }),
    ({ polytope }) => polytope.hodge.h11,
  ),
  scalar(
    ofPolytope({
      name: 'h21',
      description: 'Hodge number h^{2,1}: the number of complex-structure moduli.',
      formula: 'h^{2,1}(\\Delta) = h^{1,1}(\\Delta^\\circ)',
      source: SOURCES.batyrev,
    }),
    ({ polytope }) => polytope.hodge.h21,
  ),
  scalar(
    ofPolytope({
      name: 'euler',
      description: 'Euler number of the threefold.',
      formula: '\\chi = 2\\,(h^{1,1} - h^{2,1})',
      source: SOURCES.batyrev,
    }),
    ({ polytope }) => polytope.hodge.euler,
  ),
  scalar(
    ofPolytope({
      name: 'polytope.points',
      description:
        'Number of prime toric divisors: lattice points but the origin and the interiors of facets.',
      formula: 'N',
    }),
    ({ polytope }) => polytope.pointCount,
  ),
  scalar(
    ofPolytope({ name: 'polytope.vertices', description: 'Number of vertices.', formula: 'f_0(\\Delta)' }),
    ({ polytope }) => polytope.vertexCount,
  ),
  scalar(
    ofPolytope({ name: 'polytope.edges', description: 'Number of edges.', formula: 'f_1(\\Delta)' }),
    ({ polytope }) => polytope.edges.length,
  ),
  scalar(
    ofPolytope({ name: 'polytope.faces', description: 'Number of 2-faces.', formula: 'f_2(\\Delta)' }),
    ({ polytope }) => polytope.twoFaces.length,
  ),
  scalar(
    ofPolytope({ name: 'polytope.facets', description: 'Number of facets.', formula: 'f_3(\\Delta)' }),
    ({ polytope }) => polytope.facetCount,
  ),
  scalar(
    ofPolytope({
      name: 'polytope.latticePoints',
      description: 'Number of all lattice points, the origin and the interiors of facets included.',
      formula: '\\ell(\\Delta)',
    }),
    ({ polytope }) => polytope.latticePoints,
  ),
  scalar(
    ofPolytope({
      name: 'polytope.dualLatticePoints',
      description: 'Number of all lattice points of the dual polytope.',
      formula: '\\ell(\\Delta^\\circ)',
    }),
    ({ polytope }) => polytope.dualLatticePoints,
  ),
  scalar(
    ofPolytope({
      name: 'polytope.symmetry',
      description: 'Order of the automorphism group: matrices of GL(4,Z) that permute the vertices.',
      formula: '|\\mathrm{Aut}(\\Delta)|',
    }),
    (candidate) => candidate.symmetryOrder,
  ),
]
