import fc from 'fast-check'
import { InputError } from '../../../scoring/errors.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'

/** The code of the InputError that a call throws; anything else is thrown on. */
export function codeOf(call: () => unknown): string {
  try {
    call()
  } catch (error) {
    if (error instanceof InputError) return error.code
    throw error
  }
  return 'no error'
}

type Matrix = readonly (readonly number[])[]

/** A 4 x 4 integer matrix of determinant +-1: a few row operations, a permutation, signs. */
export const unimodular: fc.Arbitrary<Matrix> = fc
  .tuple(
    fc.array(fc.tuple(fc.nat(3), fc.nat(3), fc.integer({ min: -2, max: 2 })), { maxLength: 5 }),
    fc.shuffledSubarray([0, 1, 2, 3], { minLength: 4 }),
    fc.array(fc.constantFrom(1, -1), { minLength: 4, maxLength: 4 }),
  )
  .map(([operations, order, signs]) => {
    const rows: number[][] = order.map((place, r) => [0, 1, 2, 3].map((c) => (c === place ? signs[r] : 0)))
    for (const [from, to, factor] of operations) {
      if (from !== to) rows[to] = rows[to].map((entry, c) => entry + factor * rows[from][c])
    }
    return rows
  })

export interface IsomorphicCopy {
  readonly polytope: Polytope
  /** Point i of the original is point `permutation[i]` of the copy. */
  readonly permutation: Int32Array
}

export function isomorphicCopy(polytope: Polytope, matrix: Matrix): IsomorphicCopy {
  const image = (p: number): number[] =>
    matrix.map((row) => row.reduce((sum, entry, c) => sum + entry * polytope.points[4 * p + c], 0))
  const copy = polytopeFromPoints(Array.from({ length: polytope.vertexCount }, (_, p) => image(p)))
  const place = new Map<string, number>()
  for (let p = 0; p < copy.pointCount; p++) place.set(copy.points.slice(4 * p, 4 * p + 4).join(), p)
  const permutation = Int32Array.from(
    { length: polytope.pointCount },
    (_, p) => place.get(image(p).join()) ?? -1,
  )
  if (permutation.includes(-1)) throw new Error('the copy lacks a point')
  return { polytope: copy, permutation }
}
