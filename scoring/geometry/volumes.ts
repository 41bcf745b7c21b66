/** Einstein-frame volumes in units 2 pi sqrt(alpha') = 1, leading order, at one Kaehler class. */
export interface Volumes {
  /** Volume of the threefold, 1/6 J^3. */
  readonly total: number
  /** tau_i per point (sum over components of a split divisor). */
  readonly divisors: Float64Array
  /** Volume of each row of CurveRows. */
  readonly curves: Float64Array
}
