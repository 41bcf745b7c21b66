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

/** How a quantity changes along the ray: divided by one number, times another. */
export interface Move {
  readonly divisor: number
  readonly factor: number
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
  /** The volume or the smallest divisor's volume at scale 1, when the place needs it. */
  private measure: number | undefined

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

  /** Forgets the candidate's values, for the next one; resources marked in `kept` stay. */
  renew(kept: Uint8Array): void {
    this.memoKnown.fill(0)
    for (let at = 0; at < kept.length; at++) if (kept[at] === 0) this.resources[at] = undefined
    this.reason = null
    this.steps = 0
    this.measure = undefined
  }

  /** The undefined value, with its reason. */
  undefinedBecause(reason: Reason): number {
    this.reason = reason
    return NaN
  }

  /**
   * Takes a quantity that goes with a power of s from the reference point to the rule's place on its ray:
   * `value / divisor * factor`. With V the volume and tau the divisor volumes at scale 1, `at volume v` means
   * s = (v / V)^(1/3), `at smallest divisor t` means s = sqrt(t / min tau). Dividing first gives exactly v for
   * the volume and exactly t for the smallest divisor.
   */
  move(scaling: number): Move {
    if (scaling === 0) return STAY
    const { kind, value } = this.place
    if (kind === 'scale') return value === 1 ? STAY : { divisor: 1, factor: value ** scaling }
    const power = scaling / (kind === 'volume' ? 3 : 2)
    return { divisor: this.measured() ** power, factor: value ** power }
  }

  /** The place on the ray, as s. */
  scale(): number {
    const { kind, value } = this.place
    if (kind === 'scale') return value
    return (value / this.measured()) ** (1 / (kind === 'volume' ? 3 : 2))
  }

  /** What `at volume` or `at smallest divisor` names, at scale 1. */
  private measured(): number {
    const { kind } = this.place
    this.measure ??=
      kind === 'volume' ? this.candidate.volumes().total : least(this.candidate.volumes().divisors)
    if (!(this.measure > 0))
      throw new InvariantError(
        `"at ${kind}" has no meaning here: the ${kind} measures ${this.measure} at scale 1.`,
      )
    return this.measure
  }
}

/** Where the rule stands already. */
export const STAY: Move = { divisor: 1, factor: 1 }

function least(values: ArrayLike<number>): number {
  let result = Infinity
  for (let at = 0; at < values.length; at++) if (values[at] < result) result = values[at]
  return result
}
