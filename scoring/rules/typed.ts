import type {
  ElementField,
  Field,
  MembersField,
  NumberSet,
  RecordSet,
  Relation,
  ScalarObservable,
  Stage,
  ValueField,
  ValueType,
} from '../observables/observable.ts'
import type { ArithmeticOperator, ComparisonOperator, Span } from './ast.ts'
import type { Fold } from './folds.ts'
import type { RuleFunction } from './functions/ruleFunction.ts'

/** The type of an expression: a value, an element of a set, or unknown after an error already reported. */
export type Type = ValueType | { readonly of: RecordSet } | 'unknown'

export interface TypedNode extends Span {
  readonly type: Type
  /** The latest stage that can be needed. */
  readonly stage: Stage
  /** Nodes of the expression: the steps one evaluation of it counts as. */
  readonly weight: number
  /** Contains a variable bound outside it. */
  readonly open: boolean
  /** Contains an observable that depends on a choice of basis. */
  readonly basisDependent: boolean
}

/** What a fold runs through. */
export type FoldSource =
  | { readonly kind: 'set'; readonly set: RecordSet | NumberSet }
  | {
      readonly kind: 'members'
      readonly set: RecordSet
      readonly field: MembersField
      readonly target: TypedExpression
    }

/** An expression with its types worked out and its names resolved. */
export type TypedExpression = TypedNode &
  (
    | { readonly kind: 'constant'; readonly value: number }
    | { readonly kind: 'scalar'; readonly observable: ScalarObservable }
    | { readonly kind: 'let'; readonly index: number; readonly definition: TypedExpression }
    | { readonly kind: 'element'; readonly slot: number }
    | { readonly kind: 'item'; readonly slot: number; readonly set: NumberSet }
    | {
        readonly kind: 'field'
        readonly set: RecordSet
        readonly field: ValueField | ElementField
        readonly target: TypedExpression
      }
    | { readonly kind: 'negation'; readonly operand: TypedExpression }
    | { readonly kind: 'not'; readonly operand: TypedExpression }
    | {
        readonly kind: 'arithmetic'
        readonly operator: ArithmeticOperator
        readonly left: TypedExpression
        readonly right: TypedExpression
      }
    | {
        readonly kind: 'comparison'
        readonly operands: readonly TypedExpression[]
        readonly operators: readonly ComparisonOperator[]
      }
    | {
        readonly kind: 'logic'
        readonly operator: 'and' | 'or'
        readonly left: TypedExpression
        readonly right: TypedExpression
      }
    | { readonly kind: 'fallback'; readonly value: TypedExpression; readonly otherwise: TypedExpression }
    | {
        readonly kind: 'function'
        readonly definition: RuleFunction
        readonly operands: readonly TypedExpression[]
      }
    | {
        readonly kind: 'relation'
        readonly relation: Relation
        readonly operands: readonly TypedExpression[]
      }
    | {
        readonly kind: 'fold'
        readonly fold: Fold
        readonly order?: TypedExpression
        readonly slot: number
        readonly source: FoldSource
        readonly condition?: TypedExpression
        readonly body: TypedExpression
      }
    | { readonly kind: 'unknown' }
  )

export type TypedFold = Extract<TypedExpression, { kind: 'fold' }>
export type TypedComparison = Extract<TypedExpression, { kind: 'comparison' }>

/** A type as people read it. */
export function typeName(type: Type): string {
  if (type === 'truth') return 'a truth value'
  if (type === 'integer') return 'an integer'
  if (type === 'number') return 'a number'
  if (type === 'unknown') return 'unknown'
  return `an element of ${type.of.name}`
}

/** What a field is, as people read it. */
export const fieldTypeName = (field: Field): string =>
  field.kind === 'value'
    ? typeName(field.type)
    : field.kind === 'element'
      ? `an element of ${field.of}`
      : `a set of elements of ${field.of}`

export const isNumeric = (type: Type): boolean =>
  type === 'integer' || type === 'number' || type === 'unknown'
