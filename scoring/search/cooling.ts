import type { Temperatures } from './acceptance.ts'
import { feasibleKind, undefinedKind, type Merit } from './merit.ts'

/** Differences that the first moves made, of scores and of shortfalls. */
export interface CoolingState {
  readonly scores: readonly number[]
  readonly shortfalls: readonly number[]
}

/** Differences of each kind that are looked at. */
const enough = 16

/** First and last temperature in units of the median difference. Found by trial, and not critical. */
const [hot, cold] = [0.15, 0.04]

/**
 * Temperatures of a descent. The scale is set by the rule itself: the median of the first differences between
 * neighbouring candidates. From there they fall geometrically with the evaluations used. While nothing new is
 * found they rise again, so that a chain leaves a region it knows by heart.
 */
export class Cooling {
  private readonly scores: number[]
  private readonly shortfalls: number[]

  constructor(state: CoolingState = { scores: [], shortfalls: [] }) {
    this.scores = [...state.scores]
    this.shortfalls = [...state.shortfalls]
  }

  state(): CoolingState {
    return { scores: [...this.scores], shortfalls: [...this.shortfalls] }
  }

  /** Learns from a proposed step between neighbours, while there is something to learn. */
  learn(current: Merit, proposed: Merit): void {
    if (current.kind !== proposed.kind || current.kind === undefinedKind) return
    const differences = current.kind === feasibleKind ? this.scores : this.shortfalls
    const difference = Math.abs(proposed.value - current.value)
    if (difference > 0 && differences.length < enough) differences.push(difference)
  }

  /** How much better a proposed step is, 0 to 1: in units of the usual difference, and 1 for a better kind. */
  gain(current: Merit, proposed: Merit): number {
    if (proposed.kind !== current.kind) return proposed.kind > current.kind ? 1 : 0
    const gain = proposed.value - current.value
    if (!(gain > 0)) return 0
    return Math.min(1, gain / medianOr(current.kind === feasibleKind ? this.scores : this.shortfalls, gain))
  }

  /**
   * @param progress of the descent, 0 to 1
   * @param stall proposals in a row without a new class, in units of the number of neighbours
   */
  temperatures(progress: number, stall: number): Temperatures {
    return this.at(hot * (cold / hot) ** Math.min(1, progress) * 2 ** Math.min(16, stall))
  }

  /** @param factor in units of the median difference between neighbours */
  at(factor: number): Temperatures {
    return { score: factor * medianOr(this.scores, 1), shortfall: factor * medianOr(this.shortfalls, 0.3) }
  }
}

function medianOr(values: readonly number[], otherwise: number): number {
  if (values.length === 0) return otherwise
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[sorted.length >> 1]
}
