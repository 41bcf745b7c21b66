import { InvariantError } from '../errors.ts'
import type { Candidate } from '../observables/candidate.ts'
import type { MemberLists } from '../observables/observable.ts'
import type { PlaceOnRay } from './checkedRule.ts'
import type { Span } from './ast.ts'
import { TextPositions } from './issues.ts'

/** Why a value is undefined, and where in the rule that happens. */
export interface Reason extends Span {
  readonly text: string
  readonly line: number
  readonly column: number
}

/** Makes located reasons for one text. */
export class ReasonMaker {
  private readonly positions: TextPositions

  constructor(text: string) {
    this.positions = new TextPositions(text)
  }

  at(span: Span, text: string): Reason {
    return { text, from: span.from, to: span.to, ...this.positions.locate(span.from) }
  }
}

/** A reason as people read it. */
export const reasonText = ({ text, line, column }: Reason): string =>
  `${text} (line ${line}, column ${column})`

/** Ends an evaluation that takes too many steps. */
export class StepLimitReached extends Error {
  constructor(readonly reason: Reason) {
    super(reason.text)
  }
}

/** How many of each thing a program keeps per evaluation. */
export interface FrameLayout {
  readonly slots: number
  readonly memos: number
  readonly resources: number
  readonly place: PlaceOnRay
}

/** A column, a list of members, a looked-up function or a scalar, loaded once per evaluation. */
export type Resource =
  | { readonly kind: 'values'; readonly values: ArrayLike<number> }
  | { readonly kind: 'members'; readonly lists: MemberLists }
  | { readonly kind: 'lookup'; readonly lookup: (...elements: number[]) => number }
  | { readonly kind: 'failed'; readonly message: string }

/**
 * The working memory of one evaluation. Values are doubles: truth values 1 and 0, elements their index in the
 * set, and NaN for undefined; `reason` then says why.
 */
export class Frame {
  readonly slots: number[]
  readonly memos: Float64Array
  readonly memoKnown: Uint8Array
  readonly memoReasons: (Reason | null)[] = []
  readonly resources: (Resource | undefined)[]
  reason: Reason | null = null
  steps = 0
  /** Set by a fold's source just before its loop reads them. */
  start = 0
  end = 0
  items: ArrayLike<number> | null = null
  private readonly place: PlaceOnRay
  private scaleFactor = NaN

  constructor(
    readonly candidate: Candidate,
    layout: FrameLayout,
    readonly stepLimit: number,
  ) {
    this.slots = new Array<number>(layout.slots).fill(0)
    this.memos = new Float64Array(layout.memos)
    this.memoKnown = new Uint8Array(layout.memos)
    this.resources = new Array<Resource | undefined>(layout.resources).fill(undefined)
    this.place = layout.place
  }

  /** The undefined value, with its reason. */
  undefinedBecause(reason: Reason): number {
    this.reason = reason
    return NaN
  }

  /**
   * The factor s that takes the reference point to the rule's place on its ray. With V the volume and tau the
   * divisor volumes at scale 1: `at volume v` gives s = (v / V)^(1/3), `at smallest divisor t` gives
   * s = sqrt(t / min tau).
   */
  scale(): number {
    if (this.scaleFactor === this.scaleFactor) return this.scaleFactor
    const { kind, value } = this.place
    if (kind === 'scale') this.scaleFactor = value
    else if (kind === 'volume') this.scaleFactor = Math.cbrt(value / this.candidate.volumes().total)
    else {
      let least = Infinity
      for (const volume of this.candidate.volumes().divisors) if (volume < least) least = volume
      this.scaleFactor = Math.sqrt(value / least)
    }
    if (!(this.scaleFactor > 0 && Number.isFinite(this.scaleFactor)))
      throw new InvariantError(
        `The scale for "at ${kind} ${value}" is ${this.scaleFactor}, which is no positive number.`,
      )
    return this.scaleFactor
  }

  /** Factor for a quantity that goes with the given power of s. */
  power(scaling: number): number {
    return scaling === 0 ? 1 : this.scale() ** scaling
  }
}
