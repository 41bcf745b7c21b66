import type { Vector } from './determinants.ts'
import type { Wall } from './fan.ts'
import { LiftedSimplex, type LiftedPoints } from './liftedSimplex.ts'
import { commonDenominator, equal, rational, sumOf, zero, type Rational } from './rational.ts'

/** Triple intersection numbers on the hypersurface, from quadruple ones of the toric variety. */
export interface RingNumbers {
  /** [i, j, k, kappa_ijk] with i <= j <= k, all non-zero ones, lexicographic order. */
  readonly triples: readonly (readonly [number, number, number, number])[]
  /** Linear relations that were checked, and those that have no solution. */
  readonly relations: number
  readonly broken: readonly (readonly number[])[]
  /** Triples whose number is no integer. */
  readonly fractional: readonly (readonly number[])[]
}

/**
 * Intersection numbers by the global road: on the toric variety of a complete simplicial fan
 *
 *     kappa_ijkl = 1 / |det(v_i, v_j, v_k, v_l)|           on maximal cones
 *     kappa = 0 when the points in it span no cone          (Stanley-Reisner ideal)
 *     sum_l <m, v_l> kappa_ijkl = 0                          for all i, j, k and all m (linear relations)
 *
 * and kappa_ijk = sum_l kappa_ijkl, because the hypersurface is anticanonical (Fulton, Introduction to toric
 * varieties, section 5.2; Batyrev, alg-geom/9310003). Solved in exact fractions whatever h11:
 *
 *     wall (i, j, k):   kappa_iijk, kappa_ijjk, kappa_ijkk from the relations with D_i D_j D_k
 *     edge (i, j):      kappa_iiij, kappa_iijj from those with D_i^2 D_j; kappa_iijj, kappa_ijjj with D_i D_j^2
 *     point i:          kappa_iiii from those with D_i^3
 *
 * Uniqueness: at each step the unknown numbers multiply the points of one cone, which are independent, so the four
 * relations determine them from numbers already found, and all numbers on cones are reached. Triples that span no
 * cone give relations among zeros only. So the system has at most one solution; every relation is checked (four
 * equations for three, two or one unknowns, and kappa_iijj found twice), which shows that it has this one. No
 * reduction modulo primes is needed: each step is local and the fractions stay small.
 */
export function ringNumbers(
  lifted: LiftedPoints,
  simplices: readonly (readonly number[])[],
  walls: readonly Wall[],
): RingNumbers {
  const { points } = lifted
  const count = points.length
  const cones = simplices.map((corners) => new LiftedSimplex(lifted, corners))
  const broken: number[][] = []
  const fractional: number[][] = []
  const triples: [number, number, number, number][] = []
  let relations = 0
  const put = (i: number, j: number, k: number, value: Rational): void => {
    if (value.under !== 1n) fractional.push([i, j, k])
    else if (value.over !== 0n) triples.push([i, j, k, Number(value.over)])
  }

  // Terms of the relations with D_i^2 D_j, per ordered pair (i, j): kappa_iijk at every k.
  const onPairs = new Map<number, Term[]>()
  const addTerm = (i: number, j: number, point: number, value: Rational): void => {
    const terms = onPairs.get(i * count + j)
    if (terms === undefined) onPairs.set(i * count + j, [{ point, value }])
    else terms.push({ point, value })
  }
  for (const { corners, cones: sides, opposite } of walls) {
    const [i, j, k] = corners
    const first = cones[sides[0]]
    const second = cones[sides[1]].volume
    const product = BigInt(first.volume) * BigInt(second)
    // v_q in the basis of the first cone; the part along its own opposite point must cancel.
    const share = (p: number): number => first.share(first.corners.indexOf(p), opposite[1])
    relations += 4
    if (share(opposite[0]) !== -second) broken.push([i, j, k])
    const [x, y, z] = corners.map((p) => rational(BigInt(-share(p)), product))
    addTerm(i, j, k, x)
    addTerm(i, k, j, x)
    addTerm(j, i, k, y)
    addTerm(j, k, i, y)
    addTerm(k, i, j, z)
    addTerm(k, j, i, z)
    put(i, j, k, sumOf([rational(1n, BigInt(first.volume)), rational(1n, BigInt(second)), x, y, z]))
  }

  const onPoints: Term[][] = points.map(() => [])
  for (const [code, terms] of onPairs) {
    const [i, j] = [Math.floor(code / count), code % count]
    if (i > j) continue
    const opposite = onPairs.get(j * count + i) as Term[]
    relations += 8
    const [iiij, iijj] = solved([i, j], terms, [i, i, j])
    const [ijjj, again] = solved([j, i], opposite, [i, j, j])
    if (!equal(iijj, again)) broken.push([i, i, j, j])
    put(i, i, j, sumOf([iiij, iijj, ...terms.map(({ value }) => value)]))
    put(i, j, j, sumOf([ijjj, again, ...opposite.map(({ value }) => value)]))
    onPoints[i].push({ point: j, value: iiij })
    onPoints[j].push({ point: i, value: ijjj })
  }
  for (const [i, terms] of onPoints.entries()) {
    relations += 4
    const [iiii] = solved([i], terms, [i, i, i])
    put(i, i, i, sumOf([iiii, ...terms.map(({ value }) => value)]))
  }
  triples.sort((a, b) => a[0] - b[0] || a[1] - b[1] || a[2] - b[2])
  return { triples, relations, broken, fractional }

  /** The numbers at `unknown` (one or two points) that make the terms add up to zero. */
  function solved(
    unknown: readonly number[],
    terms: readonly Term[],
    relation: readonly number[],
  ): Rational[] {
    const under = commonDenominator(terms.map(({ value }) => value))
    const sums = [0n, 0n, 0n, 0n]
    for (const { point, value } of terms) {
      const weight = value.over * (under / value.under)
      for (let axis = 0; axis < 4; axis++) sums[axis] -= weight * BigInt(points[point][axis])
    }
    const solution = solveOn(
      unknown.map((p) => points[p]),
      sums,
    )
    if (solution === undefined) {
      broken.push([...relation])
      return unknown.map(() => zero)
    }
    return solution.map(({ over, under: own }) => rational(over, own * under))
  }
}

interface Term {
  readonly point: number
  readonly value: Rational
}

/** x v (or x v + y w) = s for one or two independent vectors, undefined when some coordinate disagrees. */
function solveOn(vectors: readonly Vector[], s: readonly bigint[]): Rational[] | undefined {
  const [v, w] = vectors.map((vector) => vector.map(BigInt))
  const axes = [0, 1, 2, 3]
  const found = (minor: bigint, x: bigint, y: bigint): Rational[] | undefined => {
    const holds = axes.every((axis) => x * v[axis] + (w === undefined ? 0n : y * w[axis]) === minor * s[axis])
    if (!holds) return undefined
    return w === undefined ? [rational(x, minor)] : [rational(x, minor), rational(y, minor)]
  }
  if (w === undefined) {
    const c = axes.find((axis) => v[axis] !== 0n)
    return c === undefined ? undefined : found(v[c], s[c], 0n)
  }
  for (const c of axes) {
    for (let d = c + 1; d < 4; d++) {
      const minor = v[c] * w[d] - v[d] * w[c]
      if (minor !== 0n) return found(minor, s[c] * w[d] - s[d] * w[c], v[c] * s[d] - v[d] * s[c])
    }
  }
  return undefined
}
