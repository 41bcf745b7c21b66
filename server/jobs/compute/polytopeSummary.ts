import {
  divisorTopology,
  polytopeFromPoints,
  polytopeSummary as engineSummary,
  type Polytope,
} from '../../../scoring/index.ts'

/** Raised when a number is added or changes: rows of an older version are then computed anew. */
export const summaryVersion = 1

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
  readonly summaryVersion: number
}

export function polytopeSummary(polytope: Polytope): PolytopeSummary {
  const summary = engineSummary(polytope)
  const { rigid, components } = divisorTopology(polytope)
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
    rigidDivisors: rigid.reduce((count, one) => count + one, 0),
    splitDivisors: components.reduce((count, of) => count + (of > 1 ? 1 : 0), 0),
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
