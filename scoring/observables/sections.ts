import type { ReflexiveSections } from '../geometry/sections.ts'
import { ofShape, SOURCES } from './described.ts'
import type { MemberLists, RecordSet, ValueField } from './observable.ts'

type Entry = Omit<Parameters<typeof ofShape>[0], 'source'>

/** Elements are the planar sections, then the solid ones. */
const perSection = (
  { planar, solid }: ReflexiveSections,
  ofPlane: (section: ReflexiveSections['planar'][number]) => number,
  ofSpace: (section: ReflexiveSections['solid'][number]) => number,
): number[] => [...planar.map(ofPlane), ...solid.map(ofSpace)]

const field = (
  entry: Entry,
  ofPlane: Parameters<typeof perSection>[1],
  ofSpace: Parameters<typeof perSection>[2],
): ValueField => ({
  kind: 'value',
  type: 'integer',
  ...ofShape({ ...entry, source: SOURCES.sections }),
  column: (candidate) => perSection(candidate.sections(), ofPlane, ofSpace),
})

/** The reflexive sections of the polytope through the origin. They do not depend on the triangulation. */
export const sections: RecordSet = {
  kind: 'records',
  ...ofShape({
    name: 'sections',
    description:
      'The reflexive sections of the polytope through the origin, of dimension 2 and 3: what can be the fibre of a fibration.',
    formula: '\\{\\Delta \\cap \\Pi \\text{ reflexive}\\}',
    source: SOURCES.sections,
  }),
  size: (candidate) => candidate.sections().planar.length + candidate.sections().solid.length,
  fields: [
    field(
      {
        name: 'dimension',
        description: 'Dimension: 2 for a reflexive polygon, 3 for a three-dimensional reflexive polytope.',
        formula: '\\dim \\Pi',
      },
      () => 2,
      () => 3,
    ),
    field(
      {
        name: 'points',
        description: 'Number of lattice points but the origin. A polygon and its dual have twelve together.',
        formula: '\\ell(\\Delta \\cap \\Pi) - 1',
      },
      ({ points }) => points.length,
      ({ points }) => points.length,
    ),
    field(
      {
        name: 'corners',
        description: 'Number of vertices of the section.',
        formula: 'f_0(\\Delta \\cap \\Pi)',
      },
      ({ turns }) => turns.reduce((corners, turn) => corners + (turn === 2 ? 0 : 1), 0),
      ({ vertices }) => vertices.length,
    ),
    {
      ...field(
        {
          name: 'type',
          description: 'Number of the polygon among the 16 reflexive ones; undefined in dimension 3.',
          convention:
            'F_1 to F_16 as in arXiv:1408.4808 (from memory): F_1 is the plane, F_10 that of weights 1, 2, 3',
          formula: 'F_n',
        },
        ({ type }) => type,
        () => NaN,
      ),
      undefinedWhen: 'the section has dimension 3',
    },
    {
      kind: 'members',
      of: 'sections',
      ...ofShape({
        name: 'inside',
        description: 'The reflexive polygons inside a section of dimension 3; none for a polygon.',
        formula: '\\{\\Pi_2 \\subset \\Pi\\}',
        source: SOURCES.sections,
      }),
      members: (candidate) => {
        const { planar, nested } = candidate.sections()
        return memberLists([...planar.map(() => []), ...nested])
      },
    },
    {
      kind: 'members',
      of: 'divisors',
      ...ofShape({
        name: 'divisors',
        description: 'The divisors of the points on the section.',
        formula: '\\{D_p : p \\in \\Pi\\}',
        source: SOURCES.sections,
      }),
      members: (candidate) => {
        const { planar, solid } = candidate.sections()
        return memberLists(
          [...planar, ...solid].map(({ points }) => points.filter((p) => p < candidate.polytope.pointCount)),
        )
      },
    },
  ],
}

/** Lists of members one after the other. */
export function memberLists(lists: readonly ArrayLike<number>[]): MemberLists {
  const starts = new Int32Array(lists.length + 1)
  lists.forEach((list, at) => (starts[at + 1] = starts[at] + list.length))
  return { starts, items: Int32Array.from(lists.flatMap((list) => Array.from(list))) }
}
