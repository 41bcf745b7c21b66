import type { CubicForm, ToricPart } from './cubicForm.ts'

/** The metric along one direction, from values of the Kaehler potential alone. */
export interface MeasuredLength {
  /** s^T G s. */
  readonly value: number
  /** Difference of the last two extrapolations, or what rounding can do if that is more, relative to the value. */
  readonly error: number
}

/** First step: as a length in the metric, and as the share by which the curvature of the map bends it. */
const longest = 0.02
const bend = 0.01
/** The step is halved while the last extrapolation moves the value by more than this, relatively. */
const settled = 2e-8
const halvings = 6

/**
 * Measures G = 1/4 d^2 K / d tau d tau by central differences of K = -2 log V along straight lines tau + e s in the
 * space of divisor volumes. The Kaehler class w + d at a point of the line solves
 *
 *     tau(w + d) - tau(w) = A d + 1/2 kappa d d = e s
 *
 * by iteration until it stands still, with residuals formed from the intersection numbers, and V(w + d) - V(w) = tau . d + 1/2 d A d + 1/6
 * kappa d d d is added up without subtracting nearly equal volumes. Second differences at the steps e, e/2 and e/4
 * are extrapolated twice (Richardson), which leaves an error of the sixth order in e; the step starts small against
 * the curvature of the map and is halved while the last extrapolation still matters. Rounding is of the order of 1e-16
 * over the length of the step in the metric, 1e-12 to 1e-9.
 */
export class PotentialDifferences {
  private readonly tau: Float64Array
  private readonly total: number
  /** tau on the toric part, M^-1 tau, and 1 - 4 tau M^-1 tau. */
  private readonly projected: Float64Array
  private readonly dual: Float64Array
  private readonly pole: number
  private readonly metric: Float64Array[]
  /** Rows of A: places and values of its non-zero entries. */
  private readonly sparse: readonly { readonly at: Int32Array; readonly values: Float64Array }[]

  /**
   * @param pairs A at w, over all points
   * @param vectors eigenvectors of M = 4 (tau tau^T - V A) on the toric part, orthonormal, and
   * @param inverses the inverse of each eigenvalue; they only steer the iteration
   */
  constructor(
    private readonly form: CubicForm,
    private readonly part: ToricPart,
    pairs: readonly Float64Array[],
    w: readonly number[],
    vectors: readonly Float64Array[],
    inverses: ArrayLike<number>,
  ) {
    this.tau = form.divisorVolumes(w)
    this.total = form.volume(w, this.tau)
    this.sparse = pairs.map((row) => {
      const at = Int32Array.from(row.keys()).filter((p) => row[p] !== 0)
      return { at, values: Float64Array.from(at, (p) => row[p]) }
    })
    this.metric = weightedSum(vectors, inverses)
    this.projected = part.project(this.tau)
    this.dual = this.timesMetric(this.projected)
    this.pole = 1 - 4 * dot(this.projected, this.dual)
  }

  /**
   * @param direction s on the toric part
   * @param expected rough value of s^T G s, for the size of the steps
   */
  along(direction: ArrayLike<number>, expected: number): MeasuredLength {
    const s = this.part.lift(direction)
    const straight = this.solve(s)
    const bent = this.solve(this.form.divisorVolumes(straight))
    let step = Math.min(longest / Math.sqrt(expected), (bend * largest(straight)) / largest(bent))
    let best = this.extrapolated(s, step)
    for (let n = 0; n < halvings && best.error > settled; n++) {
      step /= 2
      const next = this.extrapolated(s, step)
      if (next.error < best.error) best = next
    }
    return best
  }

  private extrapolated(s: Float64Array, step: number): MeasuredLength {
    const second = [step, step / 2, step / 4].map(
      // K(+) + K(-) - 2 K(0), divided by 4 e^2.
      (e) => (-2 * (this.logVolumeRatio(s, e) + this.logVolumeRatio(s, -e))) / (4 * e * e),
    )
    const first = [1, 2].map((n) => second[n] + (second[n] - second[n - 1]) / 3)
    const value = first[1] + (first[1] - first[0]) / 15
    // Terms of V(w + d) - V(w) that cancel carry the rounding; at the last step it counts for most.
    const moved = this.solve(s.map((entry) => (step / 4) * entry))
    const terms = moved.reduce((sum, entry, p) => sum + Math.abs(entry * this.tau[p]), 0) / this.total
    const rounding = (2 ** -52 * terms) / (step / 4) ** 2 / value
    return { value, error: Math.max(Math.abs(value - first[1]) / Math.abs(value), Math.abs(rounding)) }
  }

  /** log V(tau + e s) - log V(tau). */
  private logVolumeRatio(s: Float64Array, e: number): number {
    const { form } = this
    const moved = new Float64Array(s.length)
    let before = Infinity
    for (let round = 0; round < 50; round++) {
      const first = this.timesPairs(moved)
      const second = form.divisorVolumes(moved)
      const step = this.solve(s.map((entry, p) => e * entry - first[p] - second[p]))
      const size = largest(step)
      // Rounding has been reached when steps no longer shrink.
      if (!(size < before)) break
      for (let p = 0; p < moved.length; p++) moved[p] += step[p]
      before = size
    }
    const gain = dot(this.tau, moved) + dot(moved, this.timesPairs(moved)) / 2 + form.volume(moved)
    return Math.log1p(gain / this.total)
  }

  /** A^-1 on the toric part, from A = (4 tau tau^T - M) / (4 V) by the formula of Sherman and Morrison. */
  private solve(vector: ArrayLike<number>): Float64Array {
    const { dual, total, pole } = this
    const own = this.timesMetric(this.part.project(vector))
    const share = (4 * dot(this.projected, own)) / pole
    return this.part.lift(own.map((entry, n) => -4 * total * (entry + share * dual[n])))
  }

  /** M^-1. */
  private timesMetric(x: Float64Array): Float64Array {
    return Float64Array.from(this.metric, (row) => dot(row, x))
  }

  private timesPairs(x: Float64Array): Float64Array {
    return Float64Array.from(this.sparse, ({ at, values }) => {
      let sum = 0
      for (let n = 0; n < at.length; n++) sum += values[n] * x[at[n]]
      return sum
    })
  }
}

/** Sum of weight * vector vector^T. */
function weightedSum(vectors: readonly Float64Array[], weights: ArrayLike<number>): Float64Array[] {
  const sum = vectors.map(() => new Float64Array(vectors.length))
  vectors.forEach((vector, n) => {
    for (let r = 0; r < sum.length; r++) {
      const row = sum[r]
      const factor = weights[n] * vector[r]
      for (let c = 0; c < row.length; c++) row[c] += factor * vector[c]
    }
  })
  return sum
}

function dot(x: Float64Array, y: Float64Array): number {
  let sum = 0
  for (let p = 0; p < x.length; p++) sum += x[p] * y[p]
  return sum
}

const largest = (x: Float64Array): number => x.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0)
