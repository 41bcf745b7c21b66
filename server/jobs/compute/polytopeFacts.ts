import { normalForm, type Polytope } from '../../../scoring/index.ts'
import { polytopeSummary, type PolytopeSummary } from './polytopeSummary.ts'

/** What the library stores of a polytope. */
export interface PolytopeFacts extends PolytopeSummary {
  readonly key: string
  readonly h11: number
  readonly h21: number
  readonly points: number
  readonly vertices: number
  readonly facets: number
  readonly latticePoints: number
  readonly dualLatticePoints: number
  readonly favourable: boolean
  readonly symmetryOrder: number
  /** Vertices in normal-form coordinates. */
  readonly coordinates: number[][]
}

export function polytopeFacts(polytope: Polytope): PolytopeFacts {
  const { polytope: normal, key, automorphisms } = normalForm(polytope)
  return {
    key,
    h11: normal.hodge.h11,
    h21: normal.hodge.h21,
    points: normal.pointCount,
    vertices: normal.vertexCount,
    facets: normal.facetCount,
    latticePoints: normal.latticePoints,
    dualLatticePoints: normal.dualLatticePoints,
    favourable: normal.favourable,
    symmetryOrder: automorphisms.length,
    ...polytopeSummary(normal),
    coordinates: rowsOfFour(normal.points.subarray(0, 4 * normal.vertexCount)),
  }
}

/** Coordinates, 4 per point, as one row per point. */
export function rowsOfFour(flat: ArrayLike<number>): number[][] {
  return Array.from({ length: flat.length / 4 }, (_, row) => [0, 1, 2, 3].map((axis) => flat[4 * row + axis]))
}
