import type { NormalForm } from '../geometry/normalForm.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import type { Stage } from './extensions.ts'
import type { Motion } from './lines/motion.ts'
import type { Merit } from './merit.ts'
import type { RandomStream } from './randomStream.ts'
import type { PlacedHeights } from './sampling.ts'
import type { SearchSettings } from './settings.ts'
import type { Start } from './givenStarts.ts'
import type { Json, RunEnd } from './state.ts'

/** What the run says of a proposed class. */
export interface Judgement {
  readonly merit: Merit
  /** The candidate's permanent address. */
  readonly key: string
  /** True when it was scored now: one evaluation of the budget. */
  readonly isNew: boolean
}

/** A class that a method wants judged. */
export interface Proposal {
  readonly class: TwoFaceClass
  /**
   * Integer heights that give the class (strictly, or with ties that are broken towards it); undefined when it is
   * not regular, hence no candidate. Asked for only when needed, since finding them may cost a linear program.
   */
  heights(): Float64Array | undefined
  /** The method knows that the class has not been proposed before: the table of classes seen is left alone. */
  readonly distinct?: true
}

/** A class on a polytope of the run that could be proposed. */
export interface Prospective {
  readonly polytope: number
  readonly class: TwoFaceClass
}

/** What a method may see and use of its run. Randomness comes from `stream` only. */
export interface Run {
  readonly stream: RandomStream
  readonly polytopeCount: number
  readonly settings: SearchSettings
  readonly island: number
  /** The island's share of the budget, and how much of it is used. */
  readonly budget: number
  readonly evaluations: number
  /** The part of the run since the last extension of the budget. */
  readonly stage: Stage
  /** Classes looked at so far. */
  readonly proposals: number
  readonly patience: number
  /** Fresh starts that share the budget. */
  readonly descents: number
  /** Proposals in a row without a new class. */
  readonly stalled: number
  /** Given candidates of this island that were scored, the best first by the rule of this run. */
  readonly starts: readonly Start[]
  /** Scores the island's next given candidate, or passes it over; false when none is left. Calls `judge`. */
  judgeStart(): boolean
  /** The first of the island's given candidates on a polytope, scored or not. */
  startOn(polytope: number): PlacedHeights | undefined
  form(polytope: number): NormalForm
  /** False when the rule's requirements on the polytope alone fail: no candidate on it can be feasible. */
  polytopePasses(polytope: number): boolean
  /**
   * Looks a proposed class up among the classes seen, else scores it; null when it is not regular. A step of a
   * method calls this at most once, since a segment may end after any evaluation.
   */
  judge(polytope: number, proposal: Proposal): Judgement | null
  /**
   * One of the classes that `draw` gives: the one that the run's surrogate finds most promising among a few draws, or
   * simply the next draw. Draws have no effect but on the stream.
   *
   * @param placeOf where a draw leads; null when nowhere new
   */
  choose<T>(draw: () => T, placeOf: (drawn: T) => Prospective | null): T
  /** A class of the polytope that can be moved along lines of heights, ready to be judged at every wall. */
  motion(polytope: number, place: PlacedHeights): Motion
  /** As `judge`, for the present class of a motion on the polytope. */
  judgeMotion(polytope: number, motion: Motion): Omit<Judgement, 'key'> | null
  /** Counts a class that was looked at without being judged: progress for what ends segments. */
  look(): void
  /** Replaces the island's share of the budget by the number of classes that it is going to score. */
  resize(budget: number): void
  countAccepted(): void
  countRestart(): void
  end(reason: RunEnd): void
}

/** A method at work on one island. */
export interface Chain {
  /** One step: at most one call of `Run.judge`. All that the next step depends on is in `state()`. */
  step(): void
  state(): Json
}

/** A way to search. One file per method; `methods.ts` lists them. */
export interface Method {
  readonly name: string
  /** Raised whenever the same state would go on differently; states of another version are refused. */
  readonly version: number
  /** One line, for people. */
  readonly description: string
  /** The law by which its candidates are drawn, where they are a sample; a guided search draws none. */
  readonly law?: { readonly name: string; readonly description: string }
  /** False when the method never proposes a class twice, so that the table of classes seen can stay small. */
  readonly repeats?: false
  /** True when the method makes nothing of given candidates: its law allows no choice of where to begin. */
  readonly ignoresStarts?: true
  /** A chain from its stored state; null: at its start. */
  open(run: Run, state: Json | null): Chain
}
