import type { MovingNumbers } from '../../geometry/moving/movingNumbers.ts'
import type { Evaluate } from '../compile.ts'
import type { FoldName } from '../folds.ts'
import type { Frame } from '../frame.ts'
import type { Alignment } from './alignment.ts'

/** The folds whose value does not depend on the order of the elements and can be mended by element. */
export type LiveFoldName = Exclude<FoldName, 'quantile'>

/** What an element left out by `where` contributes; values are finite, and NaN is an undefined one. */
const LEFT_OUT = Infinity

/**
 * What an element's contribution depends on: on its own numbers, or on numbers of the divisors that belong to it, too.
 */
export type Dependence = 'own' | 'incident'

/** The compiled parts of a fold over the elements of one set, each judged by itself. */
export interface ElementParts {
  readonly dependence: Dependence
  readonly name: LiveFoldName
  readonly slot: number
  readonly condition: Evaluate | undefined
  readonly body: Evaluate
}

/**
 * A fold that keeps what each element contributes: after an exchange only the touched ones are evaluated again, and
 * the result is mended. Sums are of integers and exact; when one goes beyond 2^53 the fold is `broken` and has to be
 * computed whole from then on.
 */
export class LiveFold {
  broken = false
  private readonly kept: Float64Array
  private undefinedCount = 0
  private leftOut = 0
  private total = 0
  /** Least or greatest contribution and how often it occurs; 0 times: not known. */
  private extreme = 0
  private atExtreme = 0

  /** Evaluates all elements. */
  constructor(
    private readonly parts: ElementParts,
    private readonly alignment: Alignment,
    moving: MovingNumbers,
    frame: Frame,
  ) {
    this.kept = new Float64Array(alignment.size(moving))
    for (let n = 0; n < this.kept.length; n++) {
      this.kept[n] = this.contribution(frame, n)
      this.count(this.kept[n], 1)
    }
  }

  /** To be called after every exchange, when the columns have followed it. */
  exchanged(moving: MovingNumbers, frame: Frame): void {
    const { kept, alignment, parts } = this
    alignment.move(moving, kept)
    const affected = parts.dependence === 'own' ? 'touched' : 'incident'
    alignment[affected](moving, (n) => {
      const value = this.contribution(frame, n)
      if (value === kept[n]) return
      this.count(kept[n], -1)
      kept[n] = value
      this.count(value, 1)
    })
  }

  /** The value of the fold: NaN when it is undefined. */
  value(): number {
    const { name } = this.parts
    const defined = this.kept.length - this.leftOut - this.undefinedCount
    switch (name) {
      case 'any':
      case 'all': {
        const decisive = name === 'any' ? 1 : 0
        if (this.total > 0) return decisive
        return this.undefinedCount > 0 ? NaN : 1 - decisive
      }
      case 'count':
      case 'sum':
        return this.undefinedCount > 0 ? NaN : this.total
      case 'mean':
        return this.undefinedCount > 0 || defined === 0 ? NaN : this.total / defined
      case 'min':
      case 'max':
        if (this.undefinedCount > 0 || defined === 0) return NaN
        if (this.atExtreme === 0) this.findExtreme(name === 'min')
        return this.extreme
    }
  }

  /** What an element contributes: to `count` 0 or 1, to `any` and `all` 1 where it decides. */
  private contribution(frame: Frame, n: number): number {
    const { name, slot, condition, body } = this.parts
    frame.slots[slot] = n
    const holds = condition === undefined ? 1 : condition(frame)
    if (holds === 0) return LEFT_OUT
    if (name === 'count' || name === 'any' || name === 'all') {
      const value = body(frame)
      const idle = name === 'all' ? 1 : 0
      if (value === idle) return 0
      return holds !== holds || value !== value ? NaN : 1
    }
    return holds !== holds ? NaN : body(frame)
  }

  private count(value: number, sign: 1 | -1): void {
    if (value !== value) {
      this.undefinedCount += sign
    } else if (value === LEFT_OUT) {
      this.leftOut += sign
    } else if (this.parts.name === 'min' || this.parts.name === 'max') {
      if (this.atExtreme === 0) return
      if (value === this.extreme) this.atExtreme += sign
      else if (sign > 0 && value < this.extreme === (this.parts.name === 'min')) {
        this.extreme = value
        this.atExtreme = 1
      }
    } else {
      this.total += sign * value
      if (!Number.isSafeInteger(this.total)) this.broken = true
    }
  }

  private findExtreme(least: boolean): void {
    let found = NaN
    let times = 0
    for (const value of this.kept) {
      if (value === LEFT_OUT || value !== value) continue
      if (value === found) times++
      else if (times === 0 || value < found === least) {
        found = value
        times = 1
      }
    }
    this.extreme = found
    this.atExtreme = times
  }
}
