import { compareOutcomes, type Outcome } from '../rules/outcome.ts'
import type { KeptFind } from './find.ts'

/**
 * The best distinct candidates, at most `size`, in the order of `compareOutcomes`. Candidates without a value
 * (undefined) are not kept. Class keys tell candidates apart, also across polytopes.
 */
export class TopList {
  private readonly rows: KeptFind[]

  constructor(
    readonly size: number,
    rows: readonly KeptFind[] = [],
  ) {
    this.rows = [...rows]
  }

  list(): readonly KeptFind[] {
    return this.rows
  }

  /** Replaces rows by others that say the same. */
  replace(by: (row: KeptFind) => KeptFind): void {
    for (const [n, row] of this.rows.entries()) this.rows[n] = by(row)
  }

  /** True when a candidate with this outcome would enter. */
  admits(outcome: Outcome, classKey: string): boolean {
    if (outcome.kind === 'undefined' || this.size === 0) return false
    const last = this.rows.at(-1)
    if (this.rows.length < this.size || last === undefined) return true
    return compareOutcomes(outcome, classKey, last.outcome, last.classKey) < 0
  }

  /** Puts a candidate where it belongs, unless it is there already; the last one drops out when all are taken. */
  insert(row: KeptFind): void {
    if (row.outcome.kind === 'undefined' || this.size === 0) return
    let low = 0
    let high = this.rows.length
    while (low < high) {
      const middle = (low + high) >> 1
      if (compareRows(this.rows[middle], row) < 0) low = middle + 1
      else high = middle
    }
    // The same class always has the same outcome, so it would stand exactly here.
    if (low < this.rows.length && compareRows(this.rows[low], row) === 0) return
    this.rows.splice(low, 0, row)
    if (this.rows.length > this.size) this.rows.pop()
  }
}

/** As `compareOutcomes`; keys, which may have to be worked out, are asked for only where outcomes are equal. */
function compareRows(a: KeptFind, b: KeptFind): number {
  return (
    compareOutcomes(a.outcome, '', b.outcome, '') ||
    compareOutcomes(a.outcome, a.classKey, b.outcome, b.classKey)
  )
}
