/** Fills in the minors of the vectors a, b (indices into `points`, 4 coordinates each) in the coordinate pairs 01, 02, 03, 12, 13, 23. */
export function planeMinors(
  points: ArrayLike<number>,
  a: number,
  b: number,
  minors: Float64Array,
): Float64Array {
  let at = 0
  for (let i = 0; i < 4; i++) {
    for (let j = i + 1; j < 4; j++) {
      minors[at++] = points[4 * a + i] * points[4 * b + j] - points[4 * a + j] * points[4 * b + i]
    }
  }
  return minors
}

/** Normal n of a, b, c with <n, v> = det(a, b, c, v) up to sign, from the minors of a and b. */
export function spaceNormal(
  points: ArrayLike<number>,
  minors: Float64Array,
  c: number,
  normal: Float64Array,
): void {
  const [m01, m02, m03, m12, m13, m23] = minors
  const c0 = points[4 * c]
  const c1 = points[4 * c + 1]
  const c2 = points[4 * c + 2]
  const c3 = points[4 * c + 3]
  normal[0] = m12 * c3 - m13 * c2 + m23 * c1
  normal[1] = -(m02 * c3 - m03 * c2 + m23 * c0)
  normal[2] = m01 * c3 - m03 * c1 + m13 * c0
  normal[3] = -(m01 * c2 - m02 * c1 + m12 * c0)
}
