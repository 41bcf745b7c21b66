import { InputError } from '../errors.ts'

/** Four integers: a point of N, or a linear form on it. */
export type Vector = readonly number[]

/**
 * Largest coordinate of a point. Differences of such points are below 4000, minors of three differences below
 * 6 * 4000^3 < 2^39, and a form made of them takes values below 4 * 2000 * 6 * 4000^3 < 2^52 on points: all
 * determinants and forms below are exact in doubles.
 */
export const coordinateBound = 2000

/**
 * @throws InputError certificate.not-points, certificate.coordinates-too-large
 */
export function checkCoordinates(points: readonly Vector[], path: string): void {
  points.forEach((point, n) => {
    if (point.length !== 4 || !point.every(Number.isInteger)) {
      throw new InputError(
        'certificate.not-points',
        `${path}[${n}] is (${point.join(', ')}); a point has four integers.`,
        `${path}[${n}]`,
        point,
      )
    }
    if (point.some((entry) => Math.abs(entry) > coordinateBound)) {
      throw new InputError(
        'certificate.coordinates-too-large',
        `${path}[${n}] has a coordinate beyond ${coordinateBound}; give the polytope in its normal form.`,
        `${path}[${n}]`,
        point,
      )
    }
  })
}

/** The linear form x -> det(a, b, c, x). */
export function crossForm(a: Vector, b: Vector, c: Vector): [number, number, number, number] {
  const ab01 = a[0] * b[1] - a[1] * b[0]
  const ab02 = a[0] * b[2] - a[2] * b[0]
  const ab03 = a[0] * b[3] - a[3] * b[0]
  const ab12 = a[1] * b[2] - a[2] * b[1]
  const ab13 = a[1] * b[3] - a[3] * b[1]
  const ab23 = a[2] * b[3] - a[3] * b[2]
  return [
    -(ab12 * c[3] - ab13 * c[2] + ab23 * c[1]),
    ab02 * c[3] - ab03 * c[2] + ab23 * c[0],
    -(ab01 * c[3] - ab03 * c[1] + ab13 * c[0]),
    ab01 * c[2] - ab02 * c[1] + ab12 * c[0],
  ]
}

/** Value of a linear form on a vector. */
export const pairing = (form: Vector, v: Vector): number =>
  form[0] * v[0] + form[1] * v[1] + form[2] * v[2] + form[3] * v[3]

export const determinant = (a: Vector, b: Vector, c: Vector, d: Vector): number =>
  pairing(crossForm(a, b, c), d)

export const minus = (a: Vector, b: Vector): number[] => a.map((entry, axis) => entry - b[axis])

/** Rank over Q, by elimination in integers of any size. */
export function rank(vectors: readonly Vector[]): number {
  const pivots: { readonly lead: number; readonly row: readonly bigint[] }[] = []
  for (const vector of vectors) {
    let row: readonly bigint[] = vector.map(BigInt)
    for (const { lead, row: pivot } of pivots) {
      const factor = row[lead]
      if (factor !== 0n) row = row.map((entry, n) => entry * pivot[lead] - factor * pivot[n])
    }
    const lead = row.findIndex((entry) => entry !== 0n)
    if (lead < 0) continue
    pivots.push({ lead, row })
    if (pivots.length === vector.length) break
  }
  return pivots.length
}

export function greatestCommonDivisor(a: number, b: number): number {
  let [p, q] = [Math.abs(a), Math.abs(b)]
  while (q !== 0) [p, q] = [q, p % q]
  return p
}
