import type { Polytope } from './polytope.ts'

/**
 * A candidate's 2-face class: the set of its triangles, a fine regular unimodular triangulation of every
 * 2-face at once. Two FRSTs that agree here give the same threefold topology.
 */
export interface TwoFaceClass {
  readonly polytope: Polytope
  /** 3 point indices per triangle, i < j < k; triangles in lexicographic order. */
  readonly triangles: Int32Array
  /** The 2-face (index into polytope.twoFaces) of each triangle. */
  readonly faceOf: Int32Array
}
