import { InputError } from '../../errors.ts'
import { classFromTriangles } from '../classFromTriangles.ts'
import { listed, type PointNames } from '../pointNames.ts'
import type { Polytope } from '../polytope.ts'
import { isRegular } from '../regularity.ts'
import { inShort, type ProvedTriangulation } from './heightsOfSimplices.ts'

/**
 * Heights for a class that is given by the triangles of its 2-faces, found by linear feasibility, exactly. They
 * give the class with every circuit of a 2-face positive; in a facet they may tie (see `facetGenericHeights`).
 *
 * @param triangles three point indices each, in any order
 * @param names how messages name points
 * @throws InputError as `classFromTriangles`, or triangles.not-regular with the edges that contradict each other
 *   and the weights with which their circuits add up to zero
 */
export function heightsOfTriangles(
  polytope: Polytope,
  triangles: readonly (readonly number[])[],
  names: PointNames = String,
): ProvedTriangulation {
  triangles.forEach((triangle, t) => {
    if (triangle.length === 3) return
    throw new InputError(
      'triangles.wrong-size',
      `Triangle ${t} ${listed(triangle, names)} has ${triangle.length} vertices; give three.`,
      `triangles[${t}]`,
      [...triangle],
    )
  })
  const cls = classFromTriangles(polytope, triangles.flat(), names)
  const answer = isRegular(cls)
  if (answer.regular) return { class: cls, heights: answer.heights }
  const edges = answer.edges.map(([i, j], n) => {
    const times = answer.weights[n] === 1n ? '' : `${answer.weights[n]} times `
    return `${times}${listed([i, j], names)}`
  })
  throw new InputError(
    'triangles.not-regular',
    'The triangles are not regular: no heights make the 2-faces convex at these edges all at once, as their ' +
      `circuits add up to zero: ${inShort(edges)}.`,
    'triangles',
    answer.edges.map((edge, n) => ({ edge: [...edge], weight: String(answer.weights[n]) })),
  )
}
