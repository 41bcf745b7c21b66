/**
 * Primitive classes of the curves C_ij = D_i . D_j, one row per edge of the class (rows may repeat), as
 * compressed sparse rows: entries `starts[r] .. starts[r+1]` of `points` and `coefficients`.
 */
export interface CurveRows {
  readonly starts: Int32Array
  readonly points: Int32Array
  readonly coefficients: Float64Array
}
