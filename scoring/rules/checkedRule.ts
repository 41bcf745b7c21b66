import type { CostClass, Stage, ValueType } from '../observables/observable.ts'
import type { RuleTree } from './ast.ts'
import type { Program } from './program.ts'

/** Where on the ray through the reference point all quantities are taken. */
export interface PlaceOnRay {
  readonly kind: 'scale' | 'volume' | 'smallest divisor'
  readonly value: number
}

/** A condition of a rule, in the order written. */
export interface CheckedRequire {
  /** The label given, or the condition's text. */
  readonly label: string
  readonly stage: Stage
}

/** A report column. */
export interface CheckedColumn {
  readonly name: string
  readonly type: ValueType
  readonly stage: Stage
}

/** A rule without errors, ready to be evaluated. */
export interface CheckedRule {
  readonly text: string
  /** The text that stands for its meaning: no comments, no layout. */
  readonly canonical: string
  readonly tree: RuleTree
  readonly at: PlaceOnRay
  readonly requires: readonly CheckedRequire[]
  readonly score: { readonly type: 'integer' | 'number'; readonly stage: Stage }
  /** Null when the rule has no `hit`: then a score above the null's 99 % quantile counts. */
  readonly hit: { readonly stage: Stage } | null
  readonly report: readonly CheckedColumn[]
  /** Names of the observables and fields it uses (`divisors.volume`), sorted. */
  readonly observables: readonly string[]
  /** The same with their versions, `name@version`: part of the scoring hash. */
  readonly versions: readonly string[]
  /** The latest stage it can need, and the dearest observable it reads. */
  readonly stage: Stage
  readonly cost: CostClass
  /** Inside: what the evaluator runs. */
  readonly program: Program
}
