import { canonicalClass } from '../geometry/classKey.ts'
import { ClassSums, hasSums } from '../geometry/moving/classSums.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { seenKey } from './seenTable.ts'

/** Raised when classes are remembered by other words: states of another version are refused. */
export const seenWordsVersion = 2

/**
 * The 64 bits by which a run remembers a class: the sums of its triangles (see `ClassSums`), or on polytopes with
 * many automorphisms the first 16 hexadecimal digits of its key, with those of its polytope's key folded in.
 *
 * @param classKey its key, where it is known already
 */
export function classWords(form: NormalForm, cls: TwoFaceClass, classKey?: string): [number, number] {
  if (hasSums(form)) return wordsOfSums(form, new ClassSums(form, cls))
  return seenKey(form.key, classKey ?? canonicalClass(form, cls).key)
}

/** The same from sums that are kept. */
export function wordsOfSums(form: NormalForm, sums: ClassSums): [number, number] {
  const [high, low] = sums.words()
  const [first, second] = seenKey(form.key, noClass)
  return [(high ^ first) >>> 0, (low ^ second) >>> 0]
}

/** Leaves the polytope's digits as they are. */
const noClass = '0'.repeat(32)
