/**
 * Triple intersection numbers and second Chern class of a class, sparse. All entries are exact integers
 * (asserted), held in doubles.
 */
export interface IntersectionNumbers {
  /** Number of points. */
  readonly pointCount: number
  /** i < j < k per triangle, as in the class, and kappa_ijk = L_f. */
  readonly triangles: Int32Array
  readonly triangleNumbers: Float64Array
  /** i < j per edge of the class, lexicographic order. */
  readonly edges: Int32Array
  /** kappa_iij, kappa_ijj per edge. */
  readonly edgeNumbers: Float64Array
  /** kappa_iii per point. */
  readonly cubes: Float64Array
  /** c2 . D_i per point. */
  readonly secondChern: Float64Array
  /** Euler number from these numbers; equals 2 (h11 - h21). */
  readonly euler: number
}
