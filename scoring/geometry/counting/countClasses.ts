import { canonicalClass } from '../classKey.ts'
import { enumerateClasses } from '../enumeration.ts'
import type { NormalForm } from '../normalForm.ts'
import type { Polytope } from '../polytope.ts'
import { classCountBound, type ClassCountBound } from './classCountBound.ts'
import { independentFaces } from './faceGroups.ts'

/** How many 2-face classes, fine and regular, a polytope has; exact where it was feasible. */
export interface ClassCount {
  /** Before symmetry; null when the limit was met. */
  readonly classes: bigint | null
  /** Modulo automorphisms, the number of distinct candidates; null when not known. */
  readonly candidates: bigint | null
  /** There are at least so many before symmetry; all of them when `classes` is known. */
  readonly atLeast: bigint
  /** There are at most so many before symmetry. */
  readonly bound: ClassCountBound
}

/** A walk to the limit is not even begun when the bound is so many times as large. */
const HOPELESS = 1_000_000n

/**
 * Counts classes by walking them all, but for independent sets of 2-faces each set on its own: then the walks are
 * short and the number is a product. Modulo automorphisms it is known when there are none but the identity, or
 * when all classes together stay below the limit and are walked.
 *
 * @param limit most classes walked; a class costs 0.1 to 2 ms
 */
export function countClasses(form: NormalForm, limit = 5_000): ClassCount {
  const { polytope, automorphisms } = form
  const bound = classCountBound(polytope)
  const { classes, atLeast } = walkedCount(polytope, limit, bound)
  if (classes === null) return { classes, candidates: null, atLeast, bound }
  if (classes === 1n || automorphisms.length === 1) return { classes, candidates: classes, atLeast, bound }
  if (classes > BigInt(limit)) return { classes, candidates: null, atLeast, bound }
  const keys = new Set<string>()
  for (const cls of enumerateClasses(polytope).classes) keys.add(canonicalClass(form, cls).key)
  return { classes, candidates: BigInt(keys.size), atLeast, bound }
}

function walkedCount(
  polytope: Polytope,
  limit: number,
  { bound }: ClassCountBound,
): Pick<ClassCount, 'classes' | 'atLeast'> {
  if (bound === 1n) return { classes: 1n, atLeast: 1n }
  const groups = independentFaces(polytope)
  if (groups.length === 1 && bound > BigInt(limit) * HOPELESS) return { classes: null, atLeast: 1n }
  let product = 1n
  let walked = 0
  let all = true
  for (const faces of groups) {
    // All else that a walk needs of a polytope are its points.
    const part = { ...polytope, twoFaces: faces.map((f) => polytope.twoFaces[f]) }
    const { classes, complete } = enumerateClasses(part, Math.max(1, limit - walked))
    walked += classes.length
    product *= BigInt(classes.length)
    if (!complete) {
      all = false
      break
    }
  }
  return { classes: all ? product : null, atLeast: product }
}
