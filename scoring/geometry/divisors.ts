/** Topology of each prime toric divisor, read off the polytope alone (all points). */
export interface DivisorTopology {
  readonly chi: Int32Array
  readonly h1: Int32Array
  readonly h2: Int32Array
  readonly components: Int32Array
  /** One component and h^1(O) = h^2(O) = 0. */
  readonly rigid: Uint8Array
}
