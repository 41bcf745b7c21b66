import { InvariantError } from '../errors.ts'
import { classOfMesh, meshOfClass } from './classMesh.ts'
import { copyMesh, sweptMesh } from './faceMesh.ts'
import { faceSheets } from './faceSheets.ts'
import { checkedHeights, cornerHeights, quadraticHeights } from './heights.ts'
import { lowerHull } from './lowerHull.ts'
import { circuitValue, flattenedPoints, regularise } from './polygonTriangulation.ts'
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

/** What heights decide: a class, or the points they leave out. */
export type HeightsOutcome =
  | { readonly fine: true; readonly class: TwoFaceClass }
  | {
      readonly fine: false
      /** Points that some 2-face's lower hull does not have as a vertex, ascending. */
      readonly unused: Int32Array
      /** Triangles of the regular triangulations of the used points, as in a class; not all unimodular. */
      readonly triangles: Int32Array
    }

const references = new WeakMap<Polytope, TwoFaceClass>()

/**
 * The regular triangulation that heights induce on every 2-face, exact. Ties between two fine triangulations
 * are broken by point index (see `regularise`), so the class is always determined; `tiedCircuits` tells.
 *
 * @param heights one integer per point, at most `heightBound(polytope)` in size
 * @param start a class of the same polytope to start from; one near the outcome saves time, and the class
 *   itself (the same object) is returned when nothing changes
 * @throws InputError for heights of the wrong number, not integers or too large
 */
export function classFromHeights(
  polytope: Polytope,
  heights: ArrayLike<number>,
  start?: TwoFaceClass,
): HeightsOutcome {
  const cls = fineClass(polytope, heights, start)
  if (cls !== undefined) return { fine: true, class: cls }
  const sheets = faceSheets(polytope)
  return { fine: false, ...lowerHull(sheets, cornerHeights(sheets, heights)) }
}

/** Like `classFromHeights`, without the account of what is unused: undefined when the heights are not fine. */
export function fineClass(
  polytope: Polytope,
  heights: ArrayLike<number>,
  start: TwoFaceClass = referenceClass(polytope),
): TwoFaceClass | undefined {
  if (start.polytope !== polytope) throw new InvariantError('The class to start from is of another polytope.')
  const lifted = cornerHeights(faceSheets(polytope), checkedHeights(polytope, heights))
  const sign = circuitValue(lifted)
  const mesh = copyMesh(meshOfClass(start))
  const exchanges = regularise(mesh, sign)
  if (exchanges < 0 || flattenedPoints(mesh, sign).length > 0) return undefined
  return exchanges === 0 ? start : classOfMesh(mesh)
}

/**
 * The class of the quadratic heights 'facets' (least noise, seed 0): always the same for a polytope and its
 * order of points, whatever the coordinates. A start for flips.
 */
export function referenceClass(polytope: Polytope): TwoFaceClass {
  let reference = references.get(polytope)
  if (reference === undefined) {
    const sheets = faceSheets(polytope)
    const mesh = sweptMesh(sheets)
    const heights = quadraticHeights(polytope, { form: 'facets' })
    if (regularise(mesh, circuitValue(cornerHeights(sheets, heights))) < 0) {
      throw new InvariantError('Quadratic heights are not fine.')
    }
    reference = classOfMesh(mesh)
    references.set(polytope, reference)
  }
  return reference
}
