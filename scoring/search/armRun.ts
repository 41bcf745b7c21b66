import type { NormalForm } from '../geometry/normalForm.ts'
import type { Motion } from './lines/motion.ts'
import { compareMerits, type Merit } from './merit.ts'
import type { Stage } from './extensions.ts'
import type { Judgement, Proposal, Prospective, Run } from './method.ts'
import type { RandomStream } from './randomStream.ts'
import type { PlacedHeights } from './sampling.ts'
import type { SearchSettings } from './settings.ts'
import type { Start } from './givenStarts.ts'
import type { RunEnd } from './state.ts'

/** What an arm has counted for itself. */
export interface ArmCounts {
  readonly evaluations: number
  readonly proposals: number
  readonly stalled: number
  readonly ended: RunEnd | null
  /** The best candidate the arm has come by. */
  readonly best: Merit | null
}

export const noCounts: ArmCounts = { evaluations: 0, proposals: 0, stalled: 0, ended: null, best: null }

/**
 * An island as one of several chains on it sees it: some of the polytopes, a budget and counts of its own. The
 * classes seen are the island's, so what another chain has scored costs an arm nothing.
 */
export class ArmRun implements Run {
  readonly descents = 1
  readonly polytopeCount: number
  evaluations: number
  proposals: number
  stalled: number
  ended: RunEnd | null
  best: Merit | null

  /** @param polytopes indices in the island's scope; null: all of them */
  constructor(
    private readonly run: Run,
    private readonly polytopes: readonly number[] | null,
    public budget: number,
    counts: ArmCounts,
  ) {
    this.polytopeCount = polytopes === null ? run.polytopeCount : polytopes.length
    this.evaluations = counts.evaluations
    this.proposals = counts.proposals
    this.stalled = counts.stalled
    this.ended = counts.ended
    this.best = counts.best
  }

  counts(): ArmCounts {
    const { evaluations, proposals, stalled, ended, best } = this
    return { evaluations, proposals, stalled, ended, best }
  }

  get stream(): RandomStream {
    return this.run.stream
  }

  get settings(): SearchSettings {
    return this.run.settings
  }

  get island(): number {
    return this.run.island
  }

  get patience(): number {
    return this.run.patience
  }

  /** An arm goes on with more budget; nothing begins anew. */
  get stage(): Stage {
    return { number: 0, begun: 0, budget: this.budget }
  }

  get starts(): readonly Start[] {
    const { run, polytopes } = this
    if (polytopes === null) return run.starts
    return run.starts.flatMap((start) => {
      const polytope = polytopes.indexOf(start.polytope)
      return polytope < 0 ? [] : [{ ...start, polytope }]
    })
  }

  /** They have been scored before the arms begin. */
  judgeStart(): boolean {
    return false
  }

  startOn(polytope: number): PlacedHeights | undefined {
    return this.run.startOn(this.indexOf(polytope))
  }

  form(polytope: number): NormalForm {
    return this.run.form(this.indexOf(polytope))
  }

  polytopePasses(polytope: number): boolean {
    return this.run.polytopePasses(this.indexOf(polytope))
  }

  judge(polytope: number, proposal: Proposal): Judgement | null {
    return this.counted(this.run.judge(this.indexOf(polytope), proposal))
  }

  motion(polytope: number, place: PlacedHeights): Motion {
    return this.run.motion(this.indexOf(polytope), place)
  }

  judgeMotion(polytope: number, motion: Motion): Omit<Judgement, 'key'> | null {
    return this.counted(this.run.judgeMotion(this.indexOf(polytope), motion))
  }

  private counted<J extends Omit<Judgement, 'key'>>(judgement: J | null): J | null {
    this.proposals++
    if (judgement?.isNew) {
      this.evaluations++
      this.stalled = 0
    } else {
      this.stalled++
    }
    if (judgement !== null && (this.best === null || compareMerits(judgement.merit, this.best) < 0))
      this.best = judgement.merit
    return judgement
  }

  choose<T>(draw: () => T, placeOf: (drawn: T) => Prospective | null): T {
    return this.run.choose(draw, (drawn) => {
      const place = placeOf(drawn)
      return place && { ...place, polytope: this.indexOf(place.polytope) }
    })
  }

  look(): void {
    this.proposals++
    this.run.look()
  }

  resize(budget: number): void {
    this.budget = budget
    this.run.resize(budget)
  }

  countAccepted(): void {
    this.run.countAccepted()
  }

  countRestart(): void {
    this.run.countRestart()
  }

  end(reason: RunEnd): void {
    this.ended = reason
  }

  private indexOf(polytope: number): number {
    return this.polytopes === null ? polytope : this.polytopes[polytope]
  }
}
