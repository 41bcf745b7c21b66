import type { Fibrations, GenusOneFibration, K3Fibration } from '../geometry/fibrations.ts'
import type { ReflexiveSections } from '../geometry/sections.ts'
import { ofTopology, SOURCES } from './described.ts'
import type { Field, MemberLists, RecordSet, ValueType } from './observable.ts'
import { memberLists } from './sections.ts'

type Entry = Omit<Parameters<typeof ofTopology>[0], 'source'>

const described = (entry: Entry) => ofTopology({ ...entry, source: SOURCES.sections })

/** A value per element of one of the two lists of fibrations. */
const valueOf =
  <T>(list: (found: Fibrations) => readonly T[]) =>
  (
    entry: Entry,
    value: (element: T, sections: ReflexiveSections) => number,
    type: ValueType = 'integer',
  ): Field => ({
    kind: 'value',
    type,
    ...described(entry),
    column: (candidate) =>
      list(candidate.fibrations()).map((element) => value(element, candidate.sections())),
  })

const ofK3 = valueOf<K3Fibration>(({ k3 }) => k3)
const ofGenusOne = valueOf<GenusOneFibration>(({ genusOne }) => genusOne)

/** Per element of one list, the elements of the other that are nested with it. */
function nestedLists({ nested }: Fibrations, count: number, own: 0 | 1): MemberLists {
  return memberLists(
    Array.from({ length: count }, (_, at) =>
      nested.filter((pair) => pair[own] === at).map((pair) => pair[1 - own]),
    ),
  )
}

const SECTION = 'The reflexive section of the polytope that the fibre comes from.'
const TORIC = 'toric fibrations: those the triangulation shows; others may exist'

/** Fibrations of the candidate by K3 surfaces. */
export const k3Fibrations: RecordSet = {
  kind: 'records',
  ...described({
    name: 'k3Fibrations',
    description: 'The fibrations of the threefold by K3 surfaces over a line.',
    convention: TORIC,
    formula: 'D_f = \\sum_{f(p)>0} f(p)\\,D_p,\\quad D_f^2 = 0,\\ c_2 \\cdot D_f = 24',
  }),
  size: (candidate) => candidate.fibrations().k3.length,
  fields: [
    {
      kind: 'element',
      of: 'sections',
      ...described({ name: 'section', description: SECTION, formula: '\\Delta \\cap \\Pi_3' }),
      column: (candidate) => {
        const polygons = candidate.sections().planar.length
        return candidate.fibrations().k3.map(({ section }) => polygons + section)
      },
    },
    ofK3(
      {
        name: 'points',
        description: 'Number of lattice points but the origin on the section.',
        formula: '\\ell(\\Delta \\cap \\Pi_3) - 1',
      },
      ({ section }, { solid }) => solid[section].points.length,
    ),
    {
      kind: 'members',
      of: 'genusOneFibrations',
      ...described({
        name: 'genusOneFibrations',
        description: 'The genus-one fibrations whose fibre lies in this K3 fibre.',
        formula: '\\{\\Pi_2 \\subset \\Pi_3\\}',
      }),
      members: (candidate) => {
        const found = candidate.fibrations()
        return nestedLists(found, found.k3.length, 0)
      },
    },
  ],
}

/** Fibrations of the candidate by curves of genus one. */
export const genusOneFibrations: RecordSet = {
  kind: 'records',
  ...described({
    name: 'genusOneFibrations',
    description: 'The fibrations of the threefold by curves of genus one over a surface.',
    convention: `${TORIC}; elliptic when there is a section, see hasSection`,
    formula: 'N \\to N/\\Pi_2 \\text{ maps the cones into a fan}',
  }),
  size: (candidate) => candidate.fibrations().genusOne.length,
  fields: [
    {
      kind: 'element',
      of: 'sections',
      ...described({ name: 'section', description: SECTION, formula: '\\Delta \\cap \\Pi_2' }),
      column: (candidate) => candidate.fibrations().genusOne.map(({ section }) => section),
    },
    ofGenusOne(
      {
        name: 'type',
        description: 'Number of the fibre polygon among the 16 reflexive ones.',
        convention: 'F_1 to F_16 as in arXiv:1408.4808 (from memory)',
        formula: 'F_n',
      },
      ({ section }, { planar }) => planar[section].type,
    ),
    ofGenusOne(
      {
        name: 'points',
        description: 'Number of lattice points but the origin on the fibre polygon.',
        formula: '\\ell(\\Delta \\cap \\Pi_2) - 1',
      },
      ({ section }, { planar }) => planar[section].points.length,
    ),
    ofGenusOne(
      {
        name: 'baseRays',
        description: "Number of rays of the base's fan; a smooth base has h11 = baseRays - 2.",
        formula: '\\#\\Sigma_B(1)',
      },
      ({ baseRays }) => baseRays.length / 2,
    ),
    ofGenusOne(
      {
        name: 'degree',
        description:
          'Least number of points in which a prime toric divisor, or a component of one, meets the fibre.',
        formula: '\\min_p D_p \\cdot E',
      },
      ({ degree }) => degree,
    ),
    ofGenusOne(
      {
        name: 'hasSection',
        description:
          'A prime toric divisor, or a component of one, meets the fibre once: the fibration is elliptic.',
        convention: 'false does not exclude a section that is not toric',
        formula: '\\min_p D_p \\cdot E = 1',
      },
      ({ degree }) => (degree === 1 ? 1 : 0),
      'truth',
    ),
    {
      kind: 'members',
      of: 'k3Fibrations',
      ...described({
        name: 'k3Fibrations',
        description: 'The K3 fibrations whose fibre contains this fibre.',
        formula: '\\{\\Pi_3 \\supset \\Pi_2\\}',
      }),
      members: (candidate) => {
        const found = candidate.fibrations()
        return nestedLists(found, found.genusOne.length, 1)
      },
    },
  ],
}
