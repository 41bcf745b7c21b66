import type { ValueType } from '../../observables/observable.ts'

/** A function of values: part of the language, not of a candidate. */
export interface RuleFunction {
  readonly name: string
  readonly parameters: readonly { readonly name: string; readonly type: ValueType }[]
  /** Takes more operands like the last parameter. */
  readonly variadic?: boolean
  /** 'common': an integer when all operands are integers, else a number. */
  readonly result: ValueType | 'common'
  readonly description: string
  /** TeX. */
  readonly formula: string
  /** When the result is undefined, in words that follow the function's name: "needs a positive number". */
  readonly undefinedWhen?: string
  /** Operands are never NaN; NaN or an infinite result means undefined. */
  apply(...operands: number[]): number
}
