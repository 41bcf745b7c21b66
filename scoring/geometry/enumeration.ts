import { InvariantError } from '../errors.ts'
import { canonicalClass, type CanonicalClass } from './classKey.ts'
import { flip, flippableEdges } from './flips.ts'
import type { NormalForm } from './normalForm.ts'
import type { Polytope } from './polytope.ts'
import { isRegular } from './regularity.ts'
import { referenceClass, type TwoFaceClass } from './twoFaceClass.ts'

export interface EnumeratedClasses {
  /** All fine regular classes, before symmetry, in the order of the walk. */
  readonly classes: readonly TwoFaceClass[]
  /** Integer heights that give each class. */
  readonly heights: readonly Float64Array[]
  /** Pairs (class, flip) whose result is not regular, counted once per pair. */
  readonly irregularFlips: number
  /** Distinct classes reached by one flip from a regular one that are not regular. */
  readonly irregularNeighbours: number
  /** False when the limit ended the walk before all classes were found. */
  readonly complete: boolean
}

/**
 * All fine regular classes of a polytope, walking flips breadth first from the reference class. Complete
 * because the flip graph of regular fine classes is connected (it is the graph of a fan of cones that fill the
 * convex cone of fine heights). Only for small polytopes: their number grows exponentially with h11.
 *
 * @param limit stop after so many classes
 */
export function enumerateClasses(polytope: Polytope, limit = Infinity): EnumeratedClasses {
  const first = referenceClass(polytope)
  const classes = [first]
  const start = isRegular(first)
  if (!start.regular) throw new InvariantError('The reference class is not regular.')
  const heights = [start.heights]
  const seen = new Set([name(first)])
  const irregular = new Set<string>()
  let irregularFlips = 0
  for (let n = 0; n < classes.length; n++) {
    for (const edge of flippableEdges(classes[n])) {
      const neighbour = flip(classes[n], edge)
      if (neighbour === undefined) continue
      const named = name(neighbour)
      if (seen.has(named)) continue
      if (irregular.has(named)) {
        irregularFlips++
        continue
      }
      const answer = isRegular(neighbour, { near: heights[n] })
      if (!answer.regular) {
        irregular.add(named)
        irregularFlips++
        continue
      }
      if (classes.length >= limit)
        return { classes, heights, irregularFlips, irregularNeighbours: irregular.size, complete: false }
      seen.add(named)
      classes.push(neighbour)
      heights.push(answer.heights)
    }
  }
  return { classes, heights, irregularFlips, irregularNeighbours: irregular.size, complete: true }
}

/** One canonical representative per orbit of the automorphism group, by key; the order of first appearance. */
export function orbitsOf(form: NormalForm, classes: Iterable<TwoFaceClass>): Map<string, CanonicalClass> {
  const orbits = new Map<string, CanonicalClass>()
  for (const cls of classes) {
    const canonical = canonicalClass(form, cls)
    if (!orbits.has(canonical.key)) orbits.set(canonical.key, canonical)
  }
  return orbits
}

/** The triangles as a string, for sets. */
function name(cls: TwoFaceClass): string {
  return String.fromCharCode(...cls.triangles)
}
