import type { Candidate } from '../observables/candidate.ts'
import type { Stage } from '../observables/observable.ts'

/** Gives the time in any unit; only differences matter. */
export type Clock = () => number

/** Time spent per stage. */
export type StageCosts = Partial<Record<Stage, number>>

/**
 * A candidate with the same values whose stages are timed one by one: before a stage is computed, the stages it
 * builds on are, so that each pays for itself.
 */
export function timedCandidate(candidate: Candidate, clock: Clock, costs: StageCosts): Candidate {
  const time = <T>(stage: Stage, compute: () => T): T => {
    const start = clock()
    const value = compute()
    costs[stage] = (costs[stage] ?? 0) + clock() - start
    return value
  }
  const topology = <T>(compute: () => T): T => time('topology', compute)
  const cone = <T>(compute: () => T): T => {
    topology(() => candidate.curves())
    return time('cone', compute)
  }
  const metric = <T>(compute: () => T): T => {
    cone(() => candidate.volumes())
    return time('metric', compute)
  }
  const axions = <T>(compute: () => T): T => {
    cone(() => candidate.volumes())
    return time('axions', compute)
  }
  return {
    polytope: candidate.polytope,
    symmetryOrder: candidate.symmetryOrder,
    class: candidate.class,
    classKey: candidate.classKey,
    sections: () => candidate.sections(),
    normalisedVolumes: () => candidate.normalisedVolumes(),
    numbers: () => topology(() => candidate.numbers()),
    divisorTopology: () => topology(() => candidate.divisorTopology()),
    curves: () => topology(() => candidate.curves()),
    fibrations: () => topology(() => candidate.fibrations()),
    reference: () => cone(() => candidate.reference()),
    volumes: () => cone(() => candidate.volumes()),
    topEigenvalue: () => metric(() => candidate.topEigenvalue()),
    divisorSpectrum: () => metric(() => candidate.divisorSpectrum()),
    basisSpectrum: () => metric(() => candidate.basisSpectrum()),
    axions: (scale, instantons) => axions(() => candidate.axions(scale, instantons)),
  }
}
