import type { Candidate } from '../observables/candidate.ts'
import type { Stage } from '../observables/observable.ts'
import { timedCandidate, type Clock, type StageCosts } from './stageClock.ts'

interface Kept {
  readonly candidate: Candidate
  /** Time per stage since the candidate was built. */
  readonly costs: StageCosts
  readonly bytes: number
}

/** A candidate under the clock, and what its stages cost in the end. */
export interface TimedEvaluation {
  readonly candidate: Candidate
  /** Costs of the stages that were asked for since; of those that were known already, what they cost at first. */
  costs(): StageCosts
}

/** What a candidate holds when all its stages are computed, roughly: a few matrices over its points. */
const bytesOf = (points: number): number => 20_000 + 24 * points * points

/**
 * Candidates whose stages stay computed from one rule to the next, so that a rule that changes a little is answered
 * at once on the same null sample. A candidate's numbers are functions of its class, so no value depends on it.
 */
export class CandidateCache {
  private readonly kept = new Map<string, Kept>()
  private bytes = 0

  constructor(private readonly byteLimit = 96 * 2 ** 20) {}

  /** The candidate kept for the class, or this one from now on, timed by `clock`. */
  timed(built: Candidate, clock: Clock): TimedEvaluation {
    const known = this.keep(built)
    const spent: StageCosts = {}
    return {
      candidate: timedCandidate(known.candidate, clock, spent),
      costs: () => {
        const costs: StageCosts = {}
        for (const stage of Object.keys(spent) as Stage[]) {
          known.costs[stage] = (known.costs[stage] ?? 0) + (spent[stage] ?? 0)
          costs[stage] = known.costs[stage]
        }
        return costs
      },
    }
  }

  private keep(built: Candidate): Kept {
    const { classKey, polytope } = built
    const known = this.kept.get(classKey) ?? {
      candidate: built,
      costs: {},
      bytes: bytesOf(polytope.pointCount),
    }
    if (this.kept.delete(classKey)) this.bytes -= known.bytes
    this.kept.set(classKey, known)
    this.bytes += known.bytes
    for (const [oldest, { bytes }] of this.kept) {
      if (this.bytes <= this.byteLimit || oldest === classKey) break
      this.kept.delete(oldest)
      this.bytes -= bytes
    }
    return known
  }
}
