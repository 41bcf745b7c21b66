import type { CostClass, Described, Stage } from './observable.ts'

/** What most entries share; an entry overrides what differs. */
const usual = {
  unit: '1',
  convention: '',
  scaling: 0,
  version: 1,
  source: 'common practice, no source',
}

type Particular = Partial<Described> & Pick<Described, 'name' | 'description' | 'formula'>

/** Completes the description of an entry of a stage with the usual unit, convention, scaling, version and source. */
const describe =
  (stage: Stage, cost: CostClass) =>
  (particular: Particular): Described => ({ stage, cost, ...usual, ...particular })

export const ofPolytope = describe('polytope', 'free')
/** What is computed from the polytope on first use. */
export const ofShape = describe('polytope', 'cheap')
export const ofTopology = describe('topology', 'cheap')
export const ofCone = describe('cone', 'moderate')
export const ofMetric = describe('metric', 'moderate')
export const ofAxions = (particular: Particular): Described =>
  describe('axions', 'dear')({ scaling: 'computed', ...particular })

/** Where the formulas of more than one entry come from. */
export const SOURCES = {
  batyrev: 'Batyrev 1993, alg-geom/9310003',
  axions:
    'Demirtas, Long, McAllister, Stillman 2018, arXiv:1808.01282; Mehta et al. 2021, arXiv:2103.06812 (from memory)',
  divisors: 'arXiv:1712.04946',
  volumes: 'Grimm, Louis 2004, hep-th/0403067 (from memory)',
  sections: 'Avram, Kreuzer, Mandelberg, Skarke 1997, hep-th/9610154 (from memory)',
  diagonal: 'Cicoli, Ciupke, Mayrhofer, Shukla 2018, arXiv:1801.05434 (from memory)',
} as const

export const TOTAL_OF_COMPONENTS =
  'for a divisor of several components: the sum over them (polytopes that are not favourable)'
