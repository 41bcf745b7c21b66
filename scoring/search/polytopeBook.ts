import { base64Of, bytesOf } from './base64.ts'
import type { Run } from './method.ts'

const refused = 0xffff
const spent = 0xfffe

/**
 * What a chain knows of each polytope of the scope: how many proposals in a row brought no new class there, that
 * it is spent (as many as the run's patience), or that the rule's requirements on the polytope refuse it.
 */
export class PolytopeBook {
  private readonly entries: Uint16Array
  private spentCount = 0
  private refusedCount = 0

  constructor(
    private readonly run: Run,
    code?: string,
  ) {
    this.entries =
      code === undefined ? new Uint16Array(run.polytopeCount) : new Uint16Array(bytesOf(code).buffer)
    for (const entry of this.entries) {
      if (entry === spent) this.spentCount++
      if (entry === refused) this.refusedCount++
    }
  }

  code(): string {
    return base64Of(new Uint8Array(this.entries.buffer))
  }

  /** Polytopes that may still hold new classes. */
  get open(): number {
    return this.entries.length - this.spentCount - this.refusedCount
  }

  /** Polytopes that the rule has not refused. */
  get passing(): number {
    return this.entries.length - this.refusedCount
  }

  isSpent(polytope: number): boolean {
    return this.entries[polytope] >= spent
  }

  /** A polytope drawn uniformly among the open ones; -1 when none is left. */
  draw(): number {
    while (this.open > 0) {
      let nth = this.run.stream.below(this.open)
      let polytope = -1
      do {
        polytope++
        if (this.entries[polytope] < spent) nth--
      } while (nth >= 0)
      if (this.run.polytopePasses(polytope)) return polytope
      this.entries[polytope] = refused
      this.refusedCount++
    }
    return -1
  }

  found(polytope: number): void {
    if (!this.isSpent(polytope)) this.entries[polytope] = 0
  }

  stall(polytope: number): void {
    if (this.isSpent(polytope)) return
    this.entries[polytope]++
    if (this.entries[polytope] >= Math.min(this.run.patience, spent - 1)) this.spend(polytope)
  }

  spend(polytope: number): void {
    if (this.isSpent(polytope)) return
    this.entries[polytope] = spent
    this.spentCount++
  }
}
