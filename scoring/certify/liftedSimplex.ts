import { InputError } from '../errors.ts'
import { crossForm, type Vector } from './determinants.ts'

/** Points with integer heights, laid out for fast exact comparison. */
export interface LiftedPoints {
  readonly points: readonly Vector[]
  readonly flat: Float64Array
  /** height = high * 2^26 + low with 0 <= low < 2^26. */
  readonly high: Float64Array
  readonly low: Float64Array
}

const radix = 2 ** 26

/**
 * Largest |height|, and largest determinant of four points: with these every sum below is exact, since each of
 * its five products stays below 2^22 * 2^27 = 2^49. The simplex of four points and the origin lies in the polytope,
 * so its lattice volume |det| is at most that of the polytope.
 */
export const heightLimit = 2 ** 52
const determinantLimit = 2 ** 22

/** @throws InputError certificate.too-large for a polytope of greater lattice volume than arithmetic here allows */
export function checkVolume(latticeVolume: number): void {
  if (latticeVolume <= determinantLimit) return
  throw new InputError(
    'certificate.too-large',
    `The polytope's lattice volume is ${latticeVolume}; up to ${determinantLimit} the comparisons are exact.`,
    'vertices',
    latticeVolume,
  )
}

export function liftedPoints(points: readonly Vector[], heights: ArrayLike<number>): LiftedPoints {
  const high = Float64Array.from(heights, (height) => Math.floor(height / radix))
  const low = Float64Array.from(heights, (height, p) => height - high[p] * radix)
  return { points, flat: Float64Array.from(points.flat()), high, low }
}

/**
 * A simplicial cone spanned by four points, lifted: coordinates of any point in its basis and the height of the
 * point above the cone's linear extension. Both are multiplied by |det| of the basis, so that they are integers.
 */
export class LiftedSimplex {
  /** |det| of the four points. */
  readonly volume: number
  private readonly forms: Float64Array
  private readonly high: readonly number[]
  private readonly low: readonly number[]

  /** @param corners four indices of independent points */
  constructor(
    private readonly lifted: LiftedPoints,
    readonly corners: readonly number[],
  ) {
    const [a, b, c, d] = corners.map((p) => lifted.points[p])
    const forms = [crossForm(d, c, b), crossForm(a, c, d), crossForm(b, a, d), crossForm(a, b, c)]
    const determinant = forms[3][0] * d[0] + forms[3][1] * d[1] + forms[3][2] * d[2] + forms[3][3] * d[3]
    const sign = determinant < 0 ? -1 : 1
    this.volume = Math.abs(determinant)
    this.forms = Float64Array.from(forms.flat(), (entry) => sign * entry)
    this.high = corners.map((p) => lifted.high[p])
    this.low = corners.map((p) => lifted.low[p])
  }

  /** |det| times the coordinate of point p at corner `at` (0..3): p = sum over corners of coordinate * corner. */
  share(at: number, p: number): number {
    const { forms } = this
    const { flat } = this.lifted
    return (
      forms[4 * at] * flat[4 * p] +
      forms[4 * at + 1] * flat[4 * p + 1] +
      forms[4 * at + 2] * flat[4 * p + 2] +
      forms[4 * at + 3] * flat[4 * p + 3]
    )
  }

  /**
   * |det| times (height of p minus the height at p of the linear function through the corners), rounded once:
   * the sign is exact, and zero means zero.
   */
  excess(p: number): number {
    const { volume, high, low, lifted } = this
    let highSum = volume * lifted.high[p]
    let lowSum = volume * lifted.low[p]
    for (let at = 0; at < 4; at++) {
      const share = this.share(at, p)
      highSum -= share * high[at]
      lowSum -= share * low[at]
    }
    return highSum * radix + lowSum
  }

  /** The same without rounding. */
  exactExcess(p: number): bigint {
    const { volume, high, low, lifted } = this
    const height = (h: number, l: number): bigint => BigInt(h) * BigInt(radix) + BigInt(l)
    let sum = BigInt(volume) * height(lifted.high[p], lifted.low[p])
    for (let at = 0; at < 4; at++) sum -= BigInt(this.share(at, p)) * height(high[at], low[at])
    return sum
  }

  /**
   * Turns the lifted hyperplane around the wall opposite to corner `at` until it meets the first point on the
   * given side: the p of least excess(p) / |share(at, p)| among the candidates whose share at that corner has the
   * sign `side`. Undefined when there is none; `ties` lists others that are met at the same moment.
   */
  pivot(
    at: number,
    side: 1 | -1,
    candidates: ArrayLike<number>,
  ): { first: number; ties: number[] } | undefined {
    let first = -1
    let least = Infinity
    let firstShare = 1
    let ties: number[] = []
    for (let n = 0; n < candidates.length; n++) {
      const p = candidates[n]
      const share = side * this.share(at, p)
      if (share <= 0) continue
      const ratio = this.excess(p) / share
      // Both ratios carry two roundings; beyond this distance their order is certain.
      const doubt = 2 ** -50 * (Math.abs(ratio) + Math.abs(least))
      if (first >= 0 && ratio > least + doubt) continue
      let order = -1n
      if (first >= 0 && ratio >= least - doubt) {
        order = this.exactExcess(p) * BigInt(firstShare) - this.exactExcess(first) * BigInt(share)
      }
      if (order > 0n) continue
      if (order === 0n) {
        ties.push(p)
        continue
      }
      ties = []
      first = p
      least = ratio
      firstShare = share
    }
    return first < 0 ? undefined : { first, ties }
  }
}
