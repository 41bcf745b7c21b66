import { circuits } from '../../geometry/circuits.ts'
import { intersectionNumbers } from '../../geometry/intersectionNumbers.ts'
import type { NormalForm } from '../../geometry/normalForm.ts'
import type { TwoFaceClass } from '../../geometry/twoFaceClass.ts'
import { polytopeFeatures } from './polytopeFeatures.ts'

/** Upper ends of the bins, inclusive; values above the last have a bin of their own. */
const bins = {
  neighbours: [3, 4, 5, 6, 7, 9, 12],
  cubes: [-30, -9, -5, -3, -1, 0, 1, 3, 5, 7, 8],
  secondChern: [-20, -8, -4, -1, 2, 4, 6, 8, 12, 24],
  edges: [-8, -4, -3, -2, -1, 0, 1, 2, 4, 8],
  circuits: [0, 2, 4, 6],
} as const

/** Sums over points that are told apart by their orbits, so that a model can learn what single points do. */
const orbitSums = 32

const known = new WeakMap<TwoFaceClass, Float32Array>()

/**
 * What the surrogate sees of a class, without its reference point: the numbers of its polytope; how many points have
 * so many neighbours, how kappa_iii, c2 . D_i and kappa_iij are distributed, how many circuits
 * v_k + v_l = a v_i + b v_j have |a - b| = 0, 2, 4, ..; and 32 sums of the numbers of neighbours over orbits of points,
 * with signs. Counts and sums are exact integers, so equivalent classes have equal features to the bit. Always of the
 * same length, `featureCount`.
 *
 * @param cls a class on `form.polytope`; any representative
 */
export function classFeatures(form: NormalForm, cls: TwoFaceClass): Float32Array {
  let features = known.get(cls)
  if (features === undefined) {
    features = Float32Array.from([...polytopeFeatures(form), ...localFeatures(form, cls)])
    known.set(cls, features)
  }
  return features
}

function localFeatures(form: NormalForm, cls: TwoFaceClass): number[] {
  const { edges, edgeNumbers, cubes, secondChern } = intersectionNumbers(cls)
  const neighbours = new Int32Array(cls.polytope.pointCount)
  for (const point of edges) neighbours[point]++
  const { count, a, b } = circuits(cls)
  const skews = Int32Array.from({ length: count }, (_, row) => Math.abs(a[row] - b[row]))
  return [
    ...histogram(neighbours, bins.neighbours),
    Math.sqrt(squareSum(neighbours)),
    neighbours.reduce((most, n) => Math.max(most, n), 0),
    ...histogram(cubes, bins.cubes),
    Math.sqrt(squareSum(cubes)),
    squashed(cubes.reduce((most, n) => Math.max(most, n), -Infinity)),
    squashed(cubes.reduce((least, n) => Math.min(least, n), Infinity)),
    ...histogram(secondChern, bins.secondChern),
    Math.sqrt(squareSum(secondChern)),
    ...histogram(edgeNumbers, bins.edges),
    Math.sqrt(squareSum(edgeNumbers)),
    ...histogram(skews, bins.circuits),
    ...neighboursByOrbit(form, neighbours),
  ]
}

function histogram(values: ArrayLike<number>, ends: readonly number[]): number[] {
  const counts = new Array<number>(ends.length + 1).fill(0)
  for (let n = 0; n < values.length; n++) {
    let bin = 0
    while (bin < ends.length && values[n] > ends[bin]) bin++
    counts[bin]++
  }
  return counts
}

function squareSum(values: ArrayLike<number>): number {
  let sum = 0
  for (let n = 0; n < values.length; n++) sum += values[n] * values[n]
  return sum
}

/** Sign and logarithm of the size: intersection numbers reach from 1 to thousands. */
export function squashed(value: number): number {
  return Math.sign(value) * Math.log1p(Math.abs(value))
}

function neighboursByOrbit(form: NormalForm, neighbours: Int32Array): number[] {
  const sums = new Array<number>(orbitSums).fill(0)
  const places = orbitPlaces(form)
  for (let p = 0; p < neighbours.length; p++) {
    const { sum, sign } = places[p]
    sums[sum] += sign * neighbours[p]
  }
  return sums
}

interface OrbitPlace {
  readonly sum: number
  readonly sign: 1 | -1
}

const placesOf = new WeakMap<NormalForm, readonly OrbitPlace[]>()

/** To which of the sums, and with which sign, each point's orbit contributes: scattered by a fixed hash. */
function orbitPlaces(form: NormalForm): readonly OrbitPlace[] {
  let places = placesOf.get(form)
  if (places === undefined) {
    places = Array.from({ length: form.polytope.pointCount }, (_, p) => {
      const first = form.automorphisms.reduce((least, image) => Math.min(least, image[p]), p)
      let mixed = Math.imul(first + 1, 0x9e3779b1)
      mixed = Math.imul(mixed ^ (mixed >>> 15), 0x735a2d97)
      mixed = (mixed ^ (mixed >>> 15)) >>> 0
      return { sum: (mixed >>> 4) % orbitSums, sign: mixed & 1 ? 1 : -1 }
    })
    placesOf.set(form, places)
  }
  return places
}
