import { circuits, isGeneric } from './circuits.ts'
import { decideCone, decideConeInIntegers, type ConeDecision, type ConeQuestion } from './coneDecision.ts'
import { EdgeRows } from './coneRows.ts'
import { heightBound } from './faceSheets.ts'
import { quadraticHeights } from './heights.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** The answer on regularity, with its proof. */
export type Regularity =
  /** Integer heights that give the class, every circuit positive (checked exactly). */
  | { readonly regular: true; readonly heights: Float64Array }
  /**
   * Interior edges whose circuits, taken `weights` times (positive integers), add up to zero (checked exactly):
   * no heights can make all of them positive.
   */
  | {
      readonly regular: false
      readonly edges: readonly (readonly [number, number])[]
      readonly weights: bigint[]
    }

export interface RegularityOptions {
  /**
   * Heights to look near to, for instance those of a neighbouring class: the answer comes sooner and the
   * witness stays close. Default: quadratic heights.
   */
  readonly near?: ArrayLike<number>
}

/** Least circuit value asked of a witness: rounding its heights to integers cannot lose it. */
const MARGIN = 2 ** 12

/**
 * Decides exactly whether some heights give the class: w_k + w_l - a w_i - b w_j > 0 for all its circuits at
 * once. Floating point only proposes; the proposal, heights or a contradiction, is turned into integers and
 * verified, and where that fails the linear program is solved in integers.
 */
export function isRegular(cls: TwoFaceClass, options: RegularityOptions = {}): Regularity {
  const near = options.near ?? quadraticHeights(cls.polytope, { form: 'facets' })
  return regularity(cls, decideCone(questionOf(cls), near, MARGIN))
}

/** The slow road of `isRegular`: no floating point at all. */
export function decideInIntegers(cls: TwoFaceClass): Regularity {
  return regularity(cls, decideConeInIntegers(questionOf(cls)))
}

function questionOf(cls: TwoFaceClass): ConeQuestion {
  const bound = heightBound(cls.polytope)
  return {
    rows: new EdgeRows(circuits(cls)),
    pointCount: cls.polytope.pointCount,
    accepts: (heights) => heights.every((height) => Math.abs(height) <= bound) && isGeneric(cls, heights),
  }
}

function regularity(cls: TwoFaceClass, decision: ConeDecision): Regularity {
  if (decision.kind === 'inside') return { regular: true, heights: decision.heights }
  const { i, j } = circuits(cls)
  return {
    regular: false,
    edges: decision.rows.map((row) => [i[row], j[row]] as const),
    weights: decision.weights,
  }
}
