import type { Candidate } from './candidate.ts'

/** The stages of a candidate, in the order they are computed. */
export const STAGES = ['polytope', 'topology', 'cone', 'metric', 'axions'] as const
export type Stage = (typeof STAGES)[number]

/** What a value is: an exact integer, a number (rounded, in doubles) or a truth value. */
export type ValueType = 'integer' | 'number' | 'truth'

/** What reading a value costs, roughly: known with the polytope; linear in the triangles; a solve; a full spectrum. */
export type CostClass = 'free' | 'cheap' | 'moderate' | 'dear'

/** What every entry of the registry says about itself. The reference page is made from it. */
export interface Described {
  /** The name in a rule; dots group, as in `metric.divisor.top`. */
  readonly name: string
  /** One line. */
  readonly description: string
  /** Unit, or '1' for pure numbers. */
  readonly unit: string
  /** Normalisation and conventions, or ''. */
  readonly convention: string
  readonly stage: Stage
  readonly cost: CostClass
  /**
   * Power of s when the Kaehler class is moved along its ray to s times the reference point, or 'computed' for what
   * follows no power: it is read at the place itself.
   */
  readonly scaling: number | 'computed'
  /** Raised when a value changes; part of the scoring hash. */
  readonly version: number
  /** TeX, without dollar signs. */
  readonly formula: string
  readonly source: string
}

/**
 * One value per candidate. Truth values are 1 and 0; NaN is an undefined value, explained by `undefinedWhen`. Here and
 * below, `scale` is the place on the ray when the scaling is 'computed'; all else is read at scale 1.
 */
export interface ScalarObservable extends Described {
  readonly kind: 'scalar'
  readonly type: ValueType
  readonly undefinedWhen?: string
  read(candidate: Candidate, scale: number): number
}

/** What a column gives for one element, where that can be read alone. */
export interface ReadsOneElement {
  /**
   * The element's entry of the column, to the bit, for fields that depend on the intersection numbers of the element
   * alone: those with the divisor itself, or with both divisors of a pair or curve, or of the triple. Where it is
   * given, a search that goes from exchange to exchange reads only the elements again that an exchange has touched.
   */
  at?(candidate: Candidate, element: number): number
}

/** One value per element of a set. Truth values are 1 and 0; NaN is an undefined value. */
export interface ValueField extends Described, ReadsOneElement {
  readonly kind: 'value'
  readonly type: ValueType
  readonly undefinedWhen?: string
  column(candidate: Candidate, scale: number): ArrayLike<number>
}

/** One element of another set per element. */
export interface ElementField extends Described, ReadsOneElement {
  readonly kind: 'element'
  readonly of: string
  column(candidate: Candidate, scale: number): ArrayLike<number>
}

/** Elements `starts[r] .. starts[r + 1]` of `items` belong to element r. */
export interface MemberLists {
  readonly starts: ArrayLike<number>
  readonly items: ArrayLike<number>
}

/** A set of elements of another set per element. */
export interface MembersField extends Described {
  readonly kind: 'members'
  readonly of: string
  members(candidate: Candidate, scale: number): MemberLists
}

export type Field = ValueField | ElementField | MembersField

/** A set of elements with fields. Elements are numbered inside, but a rule never sees a number. */
export interface RecordSet extends Described {
  readonly kind: 'records'
  readonly fields: readonly Field[]
  /** Says why when `size` is NaN: the set is undefined for this candidate. */
  readonly undefinedWhen?: string
  size(candidate: Candidate, scale: number): number
}

/** A set of plain numbers, such as a spectrum. */
export interface NumberSet extends Described {
  readonly kind: 'numbers'
  readonly type: 'integer' | 'number'
  values(candidate: Candidate, scale: number): ArrayLike<number>
}

/** A function of divisors that looks a value up in the candidate. */
export interface Relation extends Described {
  readonly kind: 'relation'
  readonly type: ValueType
  readonly parameters: readonly { readonly name: string; readonly of: string }[]
  bind(candidate: Candidate, scale: number): (...elements: number[]) => number
}

export type Observable = ScalarObservable | RecordSet | NumberSet | Relation

/** What is known of a candidate before any triangulation. */
export type PolytopeView = Pick<Candidate, 'polytope' | 'symmetryOrder'>
