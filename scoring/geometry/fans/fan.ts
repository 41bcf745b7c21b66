import { InvariantError } from '../../errors.ts'
import { checkedHeights } from '../heights.ts'
import type { Polytope } from '../polytope.ts'
import { fineClass, type TwoFaceClass } from '../twoFaceClass.ts'
import { facetPoints } from './facetPoints.ts'
import { triangulateFacet, wallCode, type Wall } from './facetTriangulation.ts'
import { simplexVolume } from './simplexFrame.ts'

/**
 * A fine star triangulation of a reflexive polytope: every facet triangulated with all its points (those interior
 * to facets are left out everywhere), coned over the origin. As a simplicial fan its maximal cones are spanned by
 * the simplices.
 */
export interface FanSimplices {
  readonly polytope: Polytope
  /** 4 point indices per simplex, ascending; simplices in lexicographic order. With the origin, the 4-simplices. */
  readonly simplices: Int32Array
  /** The facet of each simplex. */
  readonly facetOf: Int32Array
}

export interface Fan extends FanSimplices {
  /** What it is on the 2-faces. */
  readonly class: TwoFaceClass
}

/**
 * The fan that fine heights give, with the origin's height low enough; exact. A point of a facet is used exactly
 * when it is used on its 2-faces, so heights that are fine there are fine everywhere. Ties are broken by point
 * index as in `classFromHeights`; `tiedWalls` tells of them.
 *
 * @param heights one integer per point, at most `heightBound(polytope)` in size
 * @param start a class near the outcome saves time
 * @returns undefined when the heights are not fine: `classFromHeights` names the points they leave out
 * @throws InputError for heights of the wrong number, not integers or too large
 */
export function fanFromHeights(
  polytope: Polytope,
  heights: ArrayLike<number>,
  start?: TwoFaceClass,
): Fan | undefined {
  const cls = fineClass(polytope, checkedHeights(polytope, heights), start)
  return cls === undefined ? undefined : fanOverClass(cls, heights)
}

/** The fan of heights that are known to give the class, ties broken by point index. */
export function fanOverClass(cls: TwoFaceClass, heights: ArrayLike<number>): Fan {
  const { polytope } = cls
  const { points, volumes } = facetPoints(polytope)
  const boundaries = points.map(() => new Map<number, Wall>())
  for (let t = 0; t < cls.faceOf.length; t++) {
    const [i, j, k] = cls.triangles.subarray(3 * t, 3 * t + 3)
    const code = wallCode(polytope, i, j, k)
    for (const a of polytope.twoFaces[cls.faceOf[t]].facets) boundaries[a].set(code, [i, j, k])
  }
  const simplices: number[][] = []
  const facetOf: number[] = []
  boundaries.forEach((boundary, a) => {
    const [start] = boundary.values()
    const found = triangulateFacet(polytope, points[a], heights, new Set(boundary.keys()), start)
    const volume = found.reduce((sum, simplex) => sum + simplexVolume(polytope, simplex), 0)
    if (volume !== volumes[a])
      throw new InvariantError(`Facet ${a} has volume ${volumes[a]}, its simplices add up to ${volume}.`)
    for (const simplex of found) {
      simplices.push(simplex)
      facetOf.push(a)
    }
  })
  return { ...fanSimplices(polytope, simplices, facetOf), class: cls }
}

/** Puts simplices, vertices ascending, in order. They are taken on trust. */
export function fanSimplices(
  polytope: Polytope,
  simplices: readonly (readonly number[])[],
  facetOf: readonly number[],
): FanSimplices {
  const order = [...simplices.keys()].sort((s, t) => {
    const [a, b] = [simplices[s], simplices[t]]
    return a[0] - b[0] || a[1] - b[1] || a[2] - b[2] || a[3] - b[3]
  })
  return {
    polytope,
    simplices: Int32Array.from(order.flatMap((s) => simplices[s])),
    facetOf: Int32Array.from(order, (s) => facetOf[s]),
  }
}
