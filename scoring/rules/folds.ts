import type { ValueType } from '../observables/observable.ts'

export type FoldName = 'count' | 'any' | 'all' | 'sum' | 'min' | 'max' | 'mean' | 'quantile'

/** A quantifier or fold over a set: `name(x in set where condition : body)`. */
export interface Fold {
  readonly name: FoldName
  /** What the body must be. */
  readonly body: 'truth' | 'number'
  /** 'common': what the body is. */
  readonly result: ValueType | 'common'
  /** Takes a first operand, the order p of a quantile. */
  readonly ordered?: boolean
  readonly description: string
  readonly formula: string
  /** Value for an empty set; absent when there is none. */
  readonly empty?: number
}

export const FOLDS: readonly Fold[] = [
  {
    name: 'count',
    body: 'truth',
    result: 'integer',
    empty: 0,
    description: 'Number of elements for which a condition holds.',
    formula: '\\#\\{x : B(x)\\}',
  },
  {
    name: 'any',
    body: 'truth',
    result: 'truth',
    empty: 0,
    description: 'True when a condition holds for some element; false for an empty set.',
    formula: '\\exists x : B(x)',
  },
  {
    name: 'all',
    body: 'truth',
    result: 'truth',
    empty: 1,
    description: 'True when a condition holds for every element; true for an empty set.',
    formula: '\\forall x : B(x)',
  },
  {
    name: 'sum',
    body: 'number',
    result: 'common',
    empty: 0,
    description: 'Sum over the elements; zero for an empty set.',
    formula: '\\sum_x E(x)',
  },
  {
    name: 'min',
    body: 'number',
    result: 'common',
    description: 'Smallest value; undefined for an empty set.',
    formula: '\\min_x E(x)',
  },
  {
    name: 'max',
    body: 'number',
    result: 'common',
    description: 'Largest value; undefined for an empty set.',
    formula: '\\max_x E(x)',
  },
  {
    name: 'mean',
    body: 'number',
    result: 'number',
    description: 'Arithmetic mean; undefined for an empty set.',
    formula: '\\langle E \\rangle',
  },
  {
    name: 'quantile',
    body: 'number',
    result: 'number',
    ordered: true,
    description:
      'The value below which the fraction p of the values lies, 0 <= p <= 1, linear between neighbours; undefined for an empty set.',
    formula: 'Q_p(E)',
  },
]

const byName = new Map<string, Fold>(FOLDS.map((fold) => [fold.name, fold]))

/** The fold of a name, or undefined. */
export const findFold = (name: string): Fold | undefined => byName.get(name)
