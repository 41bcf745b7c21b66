import type { NormalForm } from '../normalForm.ts'
import type { TwoFaceClass } from '../twoFaceClass.ts'

/** Largest automorphism group for which the sums are kept, one per automorphism. */
export const mostSums = 64

/**
 * Whether the classes of a polytope are told apart by sums; else (many automorphisms, hence few points) by their
 * full key.
 */
export const hasSums = (form: NormalForm): boolean => form.automorphisms.length <= mostSums

/**
 * 64 bits that tell classes apart within a run, for one class that follows exchanges: every triangle has a fixed
 * pair of 32-bit words, a hash of its points; the words of a class's triangles are added, each modulo 2^32, once for
 * every automorphism applied to them; the least of these pairs is the same for equivalent classes. An exchange
 * changes four summands of each.
 *
 * Two classes that are not equivalent have the same words with probability |G| 2^-64 per pair, as far as the hash is
 * random: among a million classes, 3e-8 times the order |G| of the group. A search would then take one for the
 * other, as it would with the first 64 bits of a key: it loses a candidate, and reports none that is wrong, because
 * what enters a list is addressed by its full key.
 */
export class ClassSums {
  private readonly group: readonly Int32Array[]
  private readonly pointCount: number
  private readonly high: Int32Array
  private readonly low: Int32Array

  /** @param of a class on `form.polytope`, or its sums */
  constructor(
    private readonly form: NormalForm,
    of: TwoFaceClass | ClassSums,
  ) {
    this.group = form.automorphisms
    this.pointCount = form.polytope.pointCount
    if (of instanceof ClassSums) {
      this.high = of.high.slice()
      this.low = of.low.slice()
      return
    }
    this.high = new Int32Array(this.group.length)
    this.low = new Int32Array(this.group.length)
    const { triangles } = of
    for (let t = 0; t < triangles.length; t += 3) {
      this.add(1, triangles[t], triangles[t + 1], triangles[t + 2])
    }
  }

  /** The same, to move on by itself. */
  copy(): ClassSums {
    return new ClassSums(this.form, this)
  }

  /** The diagonal (i, j) of the parallelogram i, k, j, l gives way to (k, l). */
  exchange(i: number, j: number, k: number, l: number): void {
    this.add(-1, i, j, k)
    this.add(-1, i, j, l)
    this.add(1, k, l, i)
    this.add(1, k, l, j)
  }

  /** The two words, unsigned, the more significant first. */
  words(): [number, number] {
    const { high, low } = this
    let least = 0
    for (let g = 1; g < high.length; g++) {
      if (((high[g] >>> 0) - (high[least] >>> 0) || (low[g] >>> 0) - (low[least] >>> 0)) < 0) least = g
    }
    return [high[least] >>> 0, low[least] >>> 0]
  }

  private add(sign: 1 | -1, i: number, j: number, k: number): void {
    const { group, pointCount: n, high, low } = this
    for (let g = 0; g < group.length; g++) {
      const image = group[g]
      const p = image[i]
      const q = image[j]
      const r = image[k]
      const first = p < q ? (p < r ? p : r) : q < r ? q : r
      const last = p > q ? (p > r ? p : r) : q > r ? q : r
      // Below 2^31, see `canonicalClass`.
      const code = (first * n + (p + q + r - first - last)) * n + last
      high[g] += sign * highWord(code)
      low[g] += sign * lowWord(code)
    }
  }
}

/** Two scramblings of 32-bit words, each one to one: multiplications and shifts of the usual kind. */
function highWord(code: number): number {
  let z = (code + 0x9e3779b9) | 0
  z = Math.imul(z ^ (z >>> 16), 0x21f0aaad)
  z = Math.imul(z ^ (z >>> 15), 0x735a2d97)
  return z ^ (z >>> 15)
}

function lowWord(code: number): number {
  let z = (code + 0x3c6ef372) | 0
  z = Math.imul(z ^ (z >>> 16), 0x7feb352d)
  z = Math.imul(z ^ (z >>> 15), 0x846ca68b)
  return z ^ (z >>> 16)
}
