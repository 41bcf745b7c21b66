/** An exact computation would leave the safe integers. */
export class TooLarge extends Error {}

/** The vector of signed 3 x 3 minors of three rows: orthogonal to each of them. */
export function orthogonalTo(rows: readonly (readonly number[])[]): number[] {
  const [a, b, c] = rows
  if (6 * largest(a) * largest(b) * largest(c) > Number.MAX_SAFE_INTEGER) throw new TooLarge()
  const minor = (i: number, j: number, k: number): number =>
    a[i] * (b[j] * c[k] - b[k] * c[j]) -
    a[j] * (b[i] * c[k] - b[k] * c[i]) +
    a[k] * (b[i] * c[j] - b[j] * c[i])
  return [minor(1, 2, 3), -minor(0, 2, 3), minor(0, 1, 3), -minor(0, 1, 2)]
}

/** <m, p> in four dimensions. */
export const value4 = (m: readonly number[], p: readonly number[]): number =>
  m[0] * p[0] + m[1] * p[1] + m[2] * p[2] + m[3] * p[3]

/** Greatest size of an entry. */
export const largest = (row: readonly number[]): number =>
  row.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0)

export const difference = (a: readonly number[], b: readonly number[]): number[] =>
  a.map((entry, i) => entry - b[i])
