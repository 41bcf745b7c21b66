import { PointSpan } from '../pointSpan.ts'
import { reducedCoordinates } from '../reducedCoordinates.ts'
import type { Polytope } from '../polytope.ts'

/**
 * Sets of 2-faces whose regular triangulations can be chosen independently: a class is regular exactly when it is so
 * on each set, so the number of classes is the product of their numbers. Faces that are unit triangles do not
 * constrain anything and are left out.
 *
 * Why. A linear function of the points changes no circuit. Let S be the points that a face f has in common with the
 * other faces of a list, and let them be linearly independent. Given heights for the others, and heights that make
 * any regular triangulation of f, a linear function added to the latter makes the two agree on S: together they are
 * heights for both. So f can be taken off the list, and so on; what is left falls into parts without a common
 * point.
 *
 * @returns lists of indices into polytope.twoFaces
 */
export function independentFaces(polytope: Polytope): number[][] {
  const coordinates = reducedCoordinates(polytope)
  const faces = polytope.twoFaces
  const list = new Set(faces.keys())
  for (const f of faces.keys()) if (faces[f].area === 1) list.delete(f)
  /** Number of faces on the list through each point. */
  const through = new Int32Array(polytope.pointCount)
  for (const f of list) for (const p of faces[f].points) through[p]++
  const groups: number[][] = []
  for (let peeled = true; peeled;) {
    peeled = false
    for (const f of list) {
      const span = new PointSpan(coordinates)
      const shared = [...faces[f].points].filter((p) => through[p] > 1)
      if (shared.length > 3 || !shared.every((p) => span.add(p))) continue
      list.delete(f)
      for (const p of faces[f].points) through[p]--
      groups.push([f])
      peeled = true
    }
  }
  return [...groups, ...connectedParts(polytope, list)]
}

function connectedParts({ twoFaces }: Polytope, list: ReadonlySet<number>): number[][] {
  const left = new Set(list)
  const parts: number[][] = []
  for (const first of list) {
    if (!left.delete(first)) continue
    const part = [first]
    for (const f of part) {
      const points = new Set(twoFaces[f].points)
      for (const g of left) {
        if (!twoFaces[g].points.some((p) => points.has(p))) continue
        left.delete(g)
        part.push(g)
      }
    }
    parts.push(part.sort((f, g) => f - g))
  }
  return parts
}
