/** The point of least norm at lattice distance one inside every wall of the cone (scale 1). */
export interface ReferencePoint {
  /** Kaehler class J = sum_k w_k D_k, one number per point. */
  readonly weights: Float64Array
  /** True when the edge curves alone gave the point: then outer and inner cone agree there. */
  readonly edgeCurvesSuffice: boolean
  /** Rounds in which violated circuits were added. */
  readonly rounds: number
}
