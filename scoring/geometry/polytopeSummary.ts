import { normalisedVolumes } from './normalisedVolume.ts'
import type { Polytope } from './polytope.ts'
import { reflexiveSections } from './sections.ts'

/** Numbers of a polytope that do not depend on a triangulation, beside its Hodge numbers. All integers. */
export interface PolytopeSummary {
  readonly vertices: number
  readonly edges: number
  /** 2-faces. */
  readonly faces: number
  readonly facets: number
  /** Lattice points by the smallest face that contains them; the origin is left out. */
  readonly pointsOnVertices: number
  readonly pointsOnEdges: number
  readonly pointsOnFaces: number
  readonly pointsOnFacets: number
  /** 4! times the Euclidean volume. */
  readonly normalisedVolume: number
  readonly dualNormalisedVolume: number
  /** Reflexive sections through the origin of dimension 2 and 3, and pairs of one inside the other. */
  readonly planarSections: number
  readonly solidSections: number
  readonly nestedSections: number
}

/** The summary, exact: a few milliseconds for small polytopes, some tens of them at h11 = 491. */
export function polytopeSummary(polytope: Polytope): PolytopeSummary {
  const { own, dual } = normalisedVolumes(polytope)
  const { planar, solid, nested } = reflexiveSections(polytope)
  const [pointsOnVertices, pointsOnEdges, pointsOnFaces] = pointsByCarrier(polytope)
  return {
    vertices: polytope.vertexCount,
    edges: polytope.edges.length,
    faces: polytope.twoFaces.length,
    facets: polytope.facetCount,
    pointsOnVertices,
    pointsOnEdges,
    pointsOnFaces,
    pointsOnFacets: polytope.latticePoints - 1 - polytope.pointCount,
    normalisedVolume: own,
    dualNormalisedVolume: dual,
    planarSections: planar.length,
    solidSections: solid.length,
    nestedSections: nested.reduce((sum, inside) => sum + inside.length, 0),
  }
}

/** Numbers of points that are vertices, inside edges, inside 2-faces. */
export function pointsByCarrier({ carrierDimension }: Polytope): [number, number, number] {
  const counts: [number, number, number] = [0, 0, 0]
  for (const dimension of carrierDimension) counts[dimension]++
  return counts
}
