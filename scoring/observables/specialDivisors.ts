import { type IntersectionNumbers, intersectionNumber } from '../geometry/intersectionNumbers.ts'
import type { MemberLists } from './observable.ts'

/** The points joined to each point by an edge of the class, ascending. */
export function neighbours({ edges, pointCount }: IntersectionNumbers): MemberLists {
  const starts = new Int32Array(pointCount + 1)
  for (const point of edges) starts[point + 1]++
  for (let point = 0; point < pointCount; point++) starts[point + 1] += starts[point]
  const filled = starts.slice(0, pointCount)
  const items = new Int32Array(edges.length)
  for (let at = 0; at < edges.length; at += 2) {
    items[filled[edges[at]]++] = edges[at + 1]
    items[filled[edges[at + 1]]++] = edges[at]
  }
  return { starts, items }
}

/** 1 for every divisor with D^2 = 0 as a class: kappa_iij = 0 for all j, i included. */
function squareZero({ edges, edgeNumbers, cubes }: IntersectionNumbers): Uint8Array {
  const zero = Uint8Array.from(cubes, (cube) => (cube === 0 ? 1 : 0))
  for (let at = 0; at < edgeNumbers.length; at++) if (edgeNumbers[at] !== 0) zero[edges[at]] = 0
  return zero
}

/** 1 for every divisor with D^2 = 0 and c2 . D as given. (D^3 = 0 is not enough.) */
const squareZeroWith =
  (secondChern: number) =>
  (numbers: IntersectionNumbers): Uint8Array =>
    squareZero(numbers).map((zero, i) => (zero === 1 && numbers.secondChern[i] === secondChern ? 1 : 0))

/** The same for one divisor. */
export function isSquareZeroWith(secondChern: number, numbers: IntersectionNumbers, i: number): 0 | 1 {
  const { edges, edgeNumbers, cubes } = numbers
  if (cubes[i] !== 0 || numbers.secondChern[i] !== secondChern) return 0
  for (let at = 0; at < edges.length; at++) if (edges[at] === i && edgeNumbers[at] !== 0) return 0
  return 1
}

/** 1 for every divisor that is a K3 fibre. */
export const k3Fibres = squareZeroWith(24)

/** 1 for every divisor that is an Enriques surface, half the fibre of a K3 fibration. */
export const enriquesHalfFibres = squareZeroWith(12)

/** 1 for every divisor that is an abelian surface and a fibre. */
export const abelianFibres = squareZeroWith(0)

/**
 * Degree of every diagonal del Pezzo divisor, NaN for the others. Divisor i is one of degree k when
 * kappa_iii = k with 1 <= k <= 9, chi(O) = 1, kappa_iij <= 0 for all j != i, and
 * kappa_iii kappa_ijl = kappa_iij kappa_iil for all j, l. Without the condition on the signs, divisors of the
 * quintic's free quotient would pass.
 */
export function diagonalDelPezzoDegrees(numbers: IntersectionNumbers, chi: ArrayLike<number>): Float64Array {
  const { cubes, edges, edgeNumbers, pointCount } = numbers
  const degrees = new Float64Array(pointCount).fill(NaN)
  const possible = Uint8Array.from(cubes, (cube, i) => (cube >= 1 && cube <= 9 && chi[i] === 1 ? 1 : 0))
  for (let at = 0; at < edgeNumbers.length; at++) if (edgeNumbers[at] > 0) possible[edges[at]] = 0
  if (!possible.includes(1)) return degrees
  const { starts, items } = neighbours(numbers)
  for (let i = 0; i < pointCount; i++) {
    if (possible[i] === 0) continue
    const around = Array.from({ length: starts[i + 1] - starts[i] }, (_, at) => items[starts[i] + at])
    if (factorises(numbers, i, around)) degrees[i] = cubes[i]
  }
  return degrees
}

/** The same for one divisor. */
export function diagonalDelPezzoDegree(
  numbers: IntersectionNumbers,
  chi: ArrayLike<number>,
  i: number,
): number {
  const { cubes, edges, edgeNumbers } = numbers
  if (!(cubes[i] >= 1 && cubes[i] <= 9 && chi[i] === 1)) return NaN
  const around: number[] = []
  for (let at = 0; at < edges.length; at++) {
    if (edges[at] !== i) continue
    // The sign, and the condition for j = l, which few divisors meet.
    if (edgeNumbers[at] > 0 || cubes[i] * edgeNumbers[at ^ 1] !== edgeNumbers[at] ** 2) return NaN
    around.push(edges[at ^ 1])
  }
  return factorises(numbers, i, around) ? cubes[i] : NaN
}

/** kappa_iii kappa_ijl = kappa_iij kappa_iil for all j and l around i. */
function factorises(numbers: IntersectionNumbers, i: number, around: readonly number[]): boolean {
  const cube = numbers.cubes[i]
  const row = around.map((j) => intersectionNumber(numbers, i, i, j))
  return around.every((j, a) =>
    around.every((l, b) => b < a || cube * intersectionNumber(numbers, i, j, l) === row[a] * row[b]),
  )
}
