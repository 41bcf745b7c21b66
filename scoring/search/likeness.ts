import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'

/** Number of triangles that two classes of one polytope have in common; -1 for classes of different polytopes. */
export function commonTriangles(one: TwoFaceClass, other: TwoFaceClass): number {
  if (one.polytope !== other.polytope) return -1
  const [s, t] = [one.triangles, other.triangles]
  let common = 0
  let [p, q] = [0, 0]
  while (p < s.length && q < t.length) {
    const order = s[p] - t[q] || s[p + 1] - t[q + 1] || s[p + 2] - t[q + 2]
    if (order === 0) common++
    if (order <= 0) p += 3
    if (order >= 0) q += 3
  }
  return common
}
