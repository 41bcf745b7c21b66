import type { Polytope } from './polytope.ts'

/**
 * The normal form of a polytope under GL(4,Z): equal for equivalent polytopes, computed exactly. All stored
 * candidates, class keys and floating-point values refer to `polytope`, the one in normal-form coordinates.
 */
export interface NormalForm {
  /** The polytope in normal-form coordinates, with its points in its own fixed order. */
  readonly polytope: Polytope
  /** Point i of the polytope it was computed from is point `relabelling[i]` of `polytope`. */
  readonly relabelling: Int32Array
  /** 32 hexadecimal digits: hash of the normal form. The permanent address of the polytope. */
  readonly key: string
  /**
   * The automorphism group as permutations of the points: point i goes to `perm[i]`. The identity is first;
   * the order is fixed by the normal form.
   */
  readonly automorphisms: readonly Int32Array[]
}
