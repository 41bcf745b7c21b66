import { facetGenericHeights } from '../geometry/fans/facetGenericHeights.ts'
import type { Outcome } from '../rules/outcome.ts'
import { heightsOfCode } from './heightsCode.ts'
import type { PolytopeSource } from './polytopeSource.ts'

/** A candidate that a search keeps. */
export interface Find {
  readonly polytopeKey: string
  readonly classKey: string
  readonly outcome: Outcome
  /**
   * Integer heights that give exactly the canonical class and one fan, one per point of the polytope in normal
   * form: no circuit of a 2-face nor of a facet's triangulation is zero.
   */
  readonly heights: readonly number[]
}

/** The same inside a state, heights in short; they may still tie in facets. */
export interface KeptFind {
  readonly polytopeKey: string
  readonly classKey: string
  readonly outcome: Outcome
  readonly heights: string
}

/**
 * A candidate on its way out of the search. Only here are its heights made free of ties in facets, which takes some
 * 50 ms at h11 = 491: most candidates that enter a list of the best are pushed out again.
 *
 * @param source the polytopes of the search; without it heights are left as they are
 */
export function findOf({ polytopeKey, classKey, outcome, heights }: KeptFind, source?: PolytopeSource): Find {
  const kept = heightsOfCode(heights)
  if (source === undefined) return { polytopeKey, classKey, outcome, heights: [...kept] }
  const { polytope } = source.at(source.keys.indexOf(polytopeKey))
  return { polytopeKey, classKey, outcome, heights: [...facetGenericHeights(polytope, kept)] }
}
