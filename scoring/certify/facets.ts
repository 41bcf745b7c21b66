import { InputError } from '../errors.ts'
import { crossForm, minus, pairing, rank, type Vector } from './determinants.ts'

/**
 * Facet normals m of a reflexive polytope, <m, v> >= -1 on it and = -1 on the facet, lexicographic order.
 *
 * By the definition: every four affinely independent points span a hyperplane, and it carries a facet when all
 * points lie on one side. With at most 36 vertices that is 58,905 quadruples. That the origin lies inside is
 * tested apart: if not, the cone over the points is no linear space, and because the points span, some three of
 * them span a hyperplane through the origin with all points on one side.
 *
 * @throws InputError certificate.origin-not-interior, certificate.not-reflexive
 */
export function facetNormals(points: readonly Vector[]): Vector[] {
  if (rank(points) < 4) {
    throw new InputError('certificate.not-four-dimensional', 'The vertices do not span four dimensions.')
  }
  const found = new Map<string, Vector>()
  const count = points.length
  for (let a = 0; a < count; a++) {
    for (let b = a + 1; b < count; b++) {
      for (let c = b + 1; c < count; c++) {
        const through = crossForm(points[a], points[b], points[c])
        if (isSupporting(through, 0, points)) {
          throw new InputError(
            'certificate.origin-not-interior',
            `The origin is not inside: all vertices lie on one side of a hyperplane through it and (${points[a].join(', ')}).`,
          )
        }
        const ab = minus(points[b], points[a])
        const ac = minus(points[c], points[a])
        for (let d = c + 1; d < count; d++) {
          const form = crossForm(ab, ac, minus(points[d], points[a]))
          const level = pairing(form, points[a])
          if (level === 0 || !isSupporting(form, level, points)) continue
          const normal = form.map((entry) => -entry / level + 0)
          if (!normal.every(Number.isInteger)) {
            throw new InputError(
              'certificate.not-reflexive',
              `The facet through (${points[a].join(', ')}) is not at lattice distance one.`,
            )
          }
          found.set(normal.join(), normal)
        }
      }
    }
  }
  return [...found.values()].sort(lexicographic)
}

/** True when the form is not zero and all values on the points are at most, or all at least, `level`. */
function isSupporting(form: Vector, level: number, points: readonly Vector[]): boolean {
  let below = false
  let above = false
  for (const point of points) {
    const value = pairing(form, point)
    if (value < level) below = true
    else if (value > level) above = true
    if (below && above) return false
  }
  return below || above
}

export function lexicographic(a: Vector, b: Vector): number {
  for (let n = 0; n < a.length; n++) if (a[n] !== b[n]) return a[n] - b[n]
  return 0
}
