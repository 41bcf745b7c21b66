import { uniformInt } from 'pure-rand/distribution/uniformInt'
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus'
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator'
import { InputError } from '../errors.ts'
import { heightBound, type FaceSheets } from './faceSheets.ts'
import type { Polytope } from './polytope.ts'

export interface QuadraticHeightsOptions {
  /** Seed of the noise, an integer. Default 0. */
  readonly seed?: number
  /**
   * Size of the noise in units of the quadratic form's step S, 0 <= noise < 1/2. Default 0. There is always
   * the little noise that breaks ties (`TIE_NOISE`), so that the class is determined.
   */
  readonly noise?: number
  /**
   * 'euclidean' (default): |v|^2 in the given coordinates. 'facets': sum over facets of <m_a, v>^2, which is
   * the same in all coordinates.
   */
  readonly form?: 'euclidean' | 'facets'
}

/**
 * Least noise. A parallelogram's circuit takes the noise of four points, at most
 * 4 / 64 < 1 step, so it decides ties of the quadratic form and nothing else: the class refines the
 * subdivision that the form alone gives.
 */
const TIE_NOISE = 1 / 64

/** Largest step S of the quadratic form: heights are S q(v) + noise. */
const STEP = 2 ** 20

/**
 * Integer heights w_v = S q(v) + n_v with q a positive definite quadratic form and n_v uniform integer noise,
 * |n_v| <= noise * S. They are always fine, even with 'facets' and even as heights on whole facets: let p be a
 * convex combination sum_t c_t v_t of other lattice points. Then sum_t c_t q(v_t) - q(p) = sum_t c_t q(v_t - p)
 * >= 1, because q takes integer values, at least 1, on non-zero lattice vectors: |v|^2 by definition, and
 * sum_a <m_a, v>^2 because some <m_a, v> is a non-zero integer (the normals span). The noise takes away at most
 * 2 max |n| < S, so p lies strictly below and is a vertex of the lower hull.
 *
 * S is 2^20, halved while the heights would exceed `heightBound`; the noise is clamped so that 2 |n| < S.
 *
 * @throws InputError when noise or seed are no such numbers, or the coordinates leave no room
 */
export function quadraticHeights(polytope: Polytope, options: QuadraticHeightsOptions = {}): Float64Array {
  const { seed = 0, noise = 0, form = 'euclidean' } = options
  if (!Number.isSafeInteger(seed)) {
    throw new InputError('heights.seed', `The seed of the heights is ${seed}; give an integer.`, 'seed', seed)
  }
  if (!(noise >= 0 && noise < 0.5)) {
    throw new InputError(
      'heights.noise',
      `The noise is ${noise}; at 1/2 of a step or more points could be left out. Give 0 <= noise < 0.5.`,
      'noise',
      noise,
    )
  }
  const values = form === 'facets' ? facetForm(polytope) : euclideanForm(polytope)
  const largest = values.reduce((a, b) => Math.max(a, b), 0)
  const bound = heightBound(polytope)
  let step = STEP
  while (step > 4 && (largest + 1) * step > bound) step /= 2
  if ((largest + 1) * step > bound) {
    throw new InputError(
      'heights.coordinates-too-large',
      `The quadratic form reaches ${largest} on these coordinates, which leaves no room for exact heights; ` +
        `give the polytope in smaller coordinates.`,
      '',
      largest,
    )
  }
  const amplitude = Math.min(Math.floor(step * Math.max(noise, TIE_NOISE)), Math.ceil(step / 2) - 1)
  const generator = noiseGenerator(seed)
  return values.map((value) => step * value + uniformInt(generator, -amplitude, amplitude))
}

/** A generator for a seed, past the first outputs, which neighbouring seeds have in common. */
export function noiseGenerator(seed: number): RandomGenerator {
  const generator = xoroshiro128plus(seed)
  for (let n = 0; n < 32; n++) generator.next()
  return generator
}

function euclideanForm({ points, pointCount }: Polytope): Float64Array {
  const values = new Float64Array(pointCount)
  for (let p = 0; p < pointCount; p++) {
    for (let c = 0; c < 4; c++) values[p] += points[4 * p + c] * points[4 * p + c]
  }
  return values
}

function facetForm({ points, pointCount, facets, facetCount }: Polytope): Float64Array {
  const values = new Float64Array(pointCount)
  for (let p = 0; p < pointCount; p++) {
    for (let a = 0; a < facetCount; a++) {
      let pairing = 0
      for (let c = 0; c < 4; c++) pairing += facets[4 * a + c] * points[4 * p + c]
      values[p] += pairing * pairing
    }
  }
  return values
}

/**
 * The heights themselves, once they are known to be usable.
 * @throws InputError for the wrong number of heights, a height that is no integer or one above `heightBound`
 */
export function checkedHeights<T extends ArrayLike<number>>(polytope: Polytope, heights: T): T {
  if (heights.length !== polytope.pointCount) {
    throw new InputError(
      'heights.wrong-count',
      `There are ${heights.length} heights for ${polytope.pointCount} points; give one for each point.`,
      'heights',
      heights.length,
    )
  }
  const bound = heightBound(polytope)
  for (let p = 0; p < heights.length; p++) {
    const height = heights[p]
    if (!Number.isInteger(height)) {
      throw new InputError(
        'heights.not-integers',
        `Height ${p} is ${height}; heights are integers.`,
        `heights[${p}]`,
        height,
      )
    }
    if (Math.abs(height) > bound) {
      throw new InputError(
        'heights.too-large',
        `Height ${p} is ${height}; beyond ${bound} in size the comparisons on this polytope would not be exact.`,
        `heights[${p}]`,
        height,
      )
    }
  }
  return heights
}

/** The height of each corner of the sheets: that of its point. */
export function cornerHeights(sheets: FaceSheets, heights: ArrayLike<number>): Float64Array {
  const lifted = new Float64Array(sheets.point.length)
  for (let c = 0; c < lifted.length; c++) lifted[c] = heights[sheets.point[c]]
  return lifted
}
