import type { RandomStream } from './randomStream.ts'

/** How fast a move's worth follows its latest rewards. */
const pace = 0.04

/** Share of all draws that is spread evenly, whatever the moves are worth. */
const common = 0.3

/**
 * What each kind of move has been worth lately; moves are drawn in proportion to it (probability matching). Far
 * from an optimum wide steps pay, near it narrow ones, and how far that is depends on the polytope.
 */
export class MoveBook {
  private readonly worth: number[]

  /** @param worth one number per move, 0 to 1: as `state()` gave it, or to begin with */
  constructor(worth: readonly number[]) {
    this.worth = [...worth]
  }

  state(): readonly number[] {
    return [...this.worth]
  }

  /** So many moves, all worth the same. */
  static even(count: number): readonly number[] {
    return new Array<number>(count).fill(0.5)
  }

  /** Index of a move. */
  draw(stream: RandomStream): number {
    const count = this.worth.length
    const total = this.worth.reduce((sum, worth) => sum + worth, 0)
    let rest = stream.uniform()
    for (let move = 0; move < count - 1; move++) {
      const share = total > 0 ? this.worth[move] / total : 1 / count
      rest -= common / count + (1 - common) * share
      if (rest < 0) return move
    }
    return count - 1
  }

  /** @param reward of one use of a move, 0 to 1 */
  learn(move: number, reward: number): void {
    this.worth[move] += pace * (reward - this.worth[move])
  }
}
