import {
  classCountBound,
  divisorTopology,
  polytopeFromPoints,
  polytopeSummary as engineSummary,
  reflexiveSections,
  rigidDivisors,
  type Polytope,
} from '../../../scoring/index.ts'

/** Raised when a number is added or changes: rows of an older version are then computed anew. */
export const summaryVersion = 3

/** What the library lists of a polytope beyond its facts, by column; the same in all coordinates. */
export interface PolytopeSummary {
  readonly edges: number
  readonly faces: number
  readonly edgePoints: number
  readonly facePoints: number
  readonly facetPoints: number
  readonly normalisedVolume: number
  readonly dualNormalisedVolume: number
  readonly planarSections: number
  readonly solidSections: number
  readonly nestedSections: number
  readonly rigidDivisors: number
  readonly splitDivisors: number
  readonly rigidComponents: number
  readonly rigidRank: number
  /** Types of the two-dimensional sections, each once, as ' 1 5 10 '. */
  readonly fibreTypes: string
  /** log10 of an upper bound on the number of classes. */
  readonly classBound: number
  /** Where the bound leaves but one class: it has been counted then. */
  readonly classes?: 1
  readonly classOrbits?: 1
  readonly classDigits?: '1'
  readonly summaryVersion: number
}

export function polytopeSummary(polytope: Polytope): PolytopeSummary {
  const summary = engineSummary(polytope)
  const { bound, log10 } = classCountBound(polytope)
  const { components } = divisorTopology(polytope)
  const rigid = rigidDivisors(polytope)
  const types = new Set(reflexiveSections(polytope).planar.map(({ type }) => type))
  return {
    edges: summary.edges,
    faces: summary.faces,
    edgePoints: summary.pointsOnEdges,
    facePoints: summary.pointsOnFaces,
    facetPoints: summary.pointsOnFacets,
    normalisedVolume: summary.normalisedVolume,
    dualNormalisedVolume: summary.dualNormalisedVolume,
    planarSections: summary.planarSections,
    solidSections: summary.solidSections,
    nestedSections: summary.nestedSections,
    rigidDivisors: rigid.prime,
    rigidComponents: rigid.components,
    rigidRank: rigid.rank,
    fibreTypes: ` ${[...types].sort((a, b) => a - b).join(' ')} `,
    splitDivisors: components.reduce((count, of) => count + (of > 1 ? 1 : 0), 0),
    classBound: log10,
    ...(bound === 1n ? ({ classes: 1, classOrbits: 1, classDigits: '1' } as const) : {}),
    summaryVersion,
  }
}

/** @param vertices those of stored polytopes, so that none is refused */
export function summaryOfEach({
  vertices,
}: {
  readonly vertices: readonly (readonly number[][])[]
}): PolytopeSummary[] {
  return vertices.map((rows) => polytopeSummary(polytopeFromPoints(rows)))
}
