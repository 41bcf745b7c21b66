import { ofPolytope } from './described.ts'
import type { RecordSet } from './observable.ts'

/** The 2-faces of the polytope, lattice polygons. They do not depend on the triangulation. */
export const faces: RecordSet = {
  kind: 'records',
  ...ofPolytope({ name: 'faces', description: 'The 2-faces of the polytope.', formula: '\\{f\\}' }),
  size: ({ polytope }) => polytope.twoFaces.length,
  fields: [
    {
      kind: 'value',
      type: 'integer',
      ...ofPolytope({
        name: 'area',
        description: 'Normalised area: the number of triangles in a unimodular triangulation.',
        formula: '2\\,\\mathrm{vol}(f)',
      }),
      column: ({ polytope }) => polytope.twoFaces.map((face) => face.area),
    },
    {
      kind: 'value',
      type: 'integer',
      ...ofPolytope({
        name: 'dualLength',
        description:
          'Lattice length of the dual edge; the intersection number of every triangle on the face.',
        formula: 'L_f = \\gcd(m_a - m_b)',
      }),
      column: ({ polytope }) => polytope.twoFaces.map((face) => face.dualLength),
    },
    {
      kind: 'value',
      type: 'integer',
      ...ofPolytope({
        name: 'points',
        description: 'Number of lattice points on the face.',
        formula: '\\ell(f)',
      }),
      column: ({ polytope }) => polytope.twoFaces.map((face) => face.points.length),
    },
    {
      kind: 'value',
      type: 'integer',
      ...ofPolytope({
        name: 'interior',
        description: 'Number of lattice points inside the face.',
        formula: '\\ell^*(f)',
      }),
      column: ({ polytope }) =>
        polytope.twoFaces.map((face) =>
          face.points.reduce((count, point) => count + (polytope.carrierDimension[point] === 2 ? 1 : 0), 0),
        ),
    },
    {
      kind: 'value',
      type: 'integer',
      ...ofPolytope({ name: 'corners', description: 'Number of corners.', formula: 'f_0(f)' }),
      column: ({ polytope }) => polytope.twoFaces.map((face) => face.corners.length),
    },
    {
      kind: 'members',
      of: 'divisors',
      ...ofPolytope({
        name: 'divisors',
        description: 'The divisors of the points on the face.',
        formula: '\\{D_p : p \\in f\\}',
      }),
      members: ({ polytope }) => {
        const starts = [0]
        for (const face of polytope.twoFaces) starts.push(starts[starts.length - 1] + face.points.length)
        return { starts, items: polytope.twoFaces.flatMap((face) => [...face.points]) }
      },
    },
  ],
}
