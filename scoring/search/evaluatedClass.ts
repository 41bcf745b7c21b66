import { isGeneric } from '../geometry/circuits.ts'
import type { CanonicalClass } from '../geometry/classKey.ts'
import { transportHeights } from '../geometry/transport.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import type { Outcome } from '../rules/outcome.ts'
import { witnessHeights } from './witness.ts'

/** A class that is evaluated, as far as lists need it. Parts are worked out when asked for. */
export interface EvaluatedClass {
  /**
   * Its key, which decides among equal outcomes where the list of the best is full; null where working it out takes
   * much longer than the evaluation: then those stay that came first.
   */
  readonly key: string | null
  /** To be called before the search goes on, where parts are going to be asked for later. */
  hold(): void
  class(): TwoFaceClass
  canonical(): CanonicalClass
  /** Integer heights that give the class, perhaps only with ties or next to it. */
  heights(): Float64Array
  /** With the report. */
  outcome(): Outcome
}

/** Integer heights of the canonical class. */
export interface Witnesses {
  /** Strictly inside the class and in general position. */
  heights(): Float64Array
  /** The same at less cost: strictly inside the class, and no more. */
  plainHeights(): Float64Array
}

/** Heights of the canonical class, to be worked out when wanted. */
export function witnesses(evaluated: EvaluatedClass): Witnesses {
  evaluated.hold()
  const moved = (heights: ArrayLike<number>): Float64Array =>
    transportHeights(heights, evaluated.canonical().relabelling)
  const heights = (): Float64Array => moved(witnessHeights(evaluated.class(), evaluated.heights()))
  const isPlain = (): boolean => isGeneric(evaluated.class(), evaluated.heights())
  return { heights, plainHeights: () => (isPlain() ? moved(evaluated.heights()) : heights()) }
}

/** Computes a value on the first call and keeps it. */
export function once<T>(compute: () => T): () => T {
  let kept: { readonly value: T } | undefined
  return () => (kept ??= { value: compute() }).value
}
