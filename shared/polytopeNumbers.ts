/** What a number of the library says about a polytope: the columns, filters and orders of the library follow from it. */
export interface PolytopeNumber {
  /** As a column's head and a filter's name. */
  readonly label: string
  readonly group: (typeof numberGroups)[number]
  /** One line, for the column chooser and as a title. */
  readonly description: string
  /** May be below zero, as the Euler number may. */
  readonly signed?: true
  /** Not a whole number. */
  readonly decimal?: true
  /** Shown until a person chooses columns. */
  readonly usual?: true
  /** Computed after the polytope is stored; null until then. */
  readonly later?: true
}

export const numberGroups = [
  'Hodge numbers',
  'Points',
  'Faces',
  'Volumes',
  'Fibres',
  'Divisors',
  'Classes',
] as const

const numbers = {
  h11: {
    label: 'h11',
    group: 'Hodge numbers',
    description: 'Number of Kaehler moduli of the threefold',
    usual: true,
  },
  h21: {
    label: 'h21',
    group: 'Hodge numbers',
    description: 'Number of complex-structure moduli of the threefold',
    usual: true,
  },
  euler: {
    label: 'Euler number',
    group: 'Hodge numbers',
    description: '2 (h11 - h21)',
    signed: true,
    usual: true,
  },
  points: {
    label: 'Points',
    group: 'Points',
    description: 'Prime toric divisors: lattice points but the origin and those interior to facets',
    usual: true,
  },
  edgePoints: {
    label: 'Points in edges',
    group: 'Points',
    description: 'Points interior to an edge',
    later: true,
  },
  facePoints: {
    label: 'Points in 2-faces',
    group: 'Points',
    description: 'Points interior to a 2-face',
    later: true,
  },
  facetPoints: {
    label: 'Points in facets',
    group: 'Points',
    description: 'Lattice points interior to a facet: they are no divisors of the threefold',
    later: true,
  },
  latticePoints: {
    label: 'Lattice points',
    group: 'Points',
    description: 'All lattice points, the origin and the interiors of facets included',
  },
  dualLatticePoints: {
    label: 'Dual lattice points',
    group: 'Points',
    description: 'All lattice points of the dual polytope',
  },
  vertices: { label: 'Vertices', group: 'Faces', description: 'Number of vertices', usual: true },
  edges: { label: 'Edges', group: 'Faces', description: 'Number of edges', later: true },
  faces: { label: '2-faces', group: 'Faces', description: 'Number of 2-faces', later: true },
  facets: { label: 'Facets', group: 'Faces', description: 'Number of facets', usual: true },
  symmetryOrder: {
    label: 'Symmetry',
    group: 'Faces',
    description: 'Order of the automorphism group: matrices of GL(4,Z) that permute the vertices',
    usual: true,
  },
  normalisedVolume: {
    label: 'Volume',
    group: 'Volumes',
    description: 'Normalised volume of the polytope: 4! times the Euclidean one',
    later: true,
  },
  dualNormalisedVolume: {
    label: 'Dual volume',
    group: 'Volumes',
    description: 'Normalised volume of the dual polytope',
    later: true,
  },
  planarSections: {
    label: '2-d sections',
    group: 'Fibres',
    description: 'Two-dimensional reflexive sections through the origin: they propose genus-one fibrations',
    usual: true,
    later: true,
  },
  solidSections: {
    label: '3-d sections',
    group: 'Fibres',
    description: 'Three-dimensional reflexive sections through the origin: they propose K3 fibrations',
    usual: true,
    later: true,
  },
  nestedSections: {
    label: 'Nested sections',
    group: 'Fibres',
    description: 'Pairs of a two-dimensional reflexive section inside a three-dimensional one',
    later: true,
  },
  rigidDivisors: {
    label: 'Rigid divisors',
    group: 'Divisors',
    description: 'Prime toric divisors with one component and h1(O) = h2(O) = 0',
    later: true,
  },
  splitDivisors: {
    label: 'Split divisors',
    group: 'Divisors',
    description: 'Prime toric divisors with several components on the threefold',
    later: true,
  },
  rigidComponents: {
    label: 'Rigid components',
    group: 'Divisors',
    description: 'Components of split divisors, all of them rigid; none on favourable polytopes',
    later: true,
  },
  rigidRank: {
    label: 'Rank of rigid',
    group: 'Divisors',
    description: 'Independent classes among rigid divisors and components; h11 of them span all',
    later: true,
  },
  classes: {
    label: 'Classes',
    group: 'Classes',
    description: 'Exact number of 2-face classes before symmetry, where it has been counted',
    later: true,
  },
  classBound: {
    label: 'log10 bound',
    group: 'Classes',
    description: 'log10 of an upper bound on the number of classes: the product over the 2-faces',
    decimal: true,
    later: true,
  },
  classOrbits: {
    label: 'Classes mod. sym.',
    group: 'Classes',
    description: 'Exact number of 2-face classes modulo the automorphism group, where it has been counted',
    later: true,
  },
} as const satisfies Record<string, PolytopeNumber>

export type PolytopeNumberName = keyof typeof numbers

export const polytopeNumbers: Readonly<Record<PolytopeNumberName, PolytopeNumber>> = numbers

export const polytopeNumberNames = Object.keys(numbers) as PolytopeNumberName[]

/** Names of the two ends of a number's range, in addresses and filters. */
export type RangeName = `${PolytopeNumberName}Min` | `${PolytopeNumberName}Max`
