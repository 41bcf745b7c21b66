import type { Stage, ValueType } from '../observables/observable.ts'
import type { PlaceOnRay } from './checkedRule.ts'
import { Compiler, type Evaluate, type FoldCompiler } from './compile.ts'
import { type FrameLayout, ReasonMaker } from './frame.ts'
import type { Loadable } from './resources.ts'
import { compileShortfall } from './shortfall.ts'
import type { TypedExpression } from './typed.ts'

/** A compiled condition. */
export interface CompiledRequire {
  readonly label: string
  readonly stage: Stage
  readonly holds: Evaluate
  readonly shortfall: Evaluate
}

/** A compiled value with its type and stage. */
export interface CompiledValue {
  readonly type: ValueType
  readonly stage: Stage
  readonly value: Evaluate
}

/** A rule as closures over a frame. Closures and data only: a program keeps nothing between evaluations. */
export interface Program {
  /** What it was compiled from. */
  readonly source: ProgramSource
  readonly layout: FrameLayout
  /** What it loads from a candidate, by index in the frame's resources. */
  readonly loadables: readonly Loadable[]
  readonly requires: readonly CompiledRequire[]
  readonly score: CompiledValue
  readonly hit: CompiledValue | null
  readonly columns: readonly (CompiledValue & { readonly name: string })[]
}

/** The typed parts of a rule. */
export interface ProgramSource {
  readonly text: string
  readonly place: PlaceOnRay
  readonly lets: readonly TypedExpression[]
  readonly slotCount: number
  readonly requires: readonly { readonly label: string; readonly condition: TypedExpression }[]
  readonly score: TypedExpression
  readonly hit: TypedExpression | undefined
  readonly columns: readonly { readonly name: string; readonly value: TypedExpression }[]
}

/** Compiles the typed parts of a rule, folds in another way where `otherFold` knows one. */
export function compileProgram(source: ProgramSource, otherFold?: FoldCompiler): Program {
  const compiler = new Compiler(new ReasonMaker(source.text), source.lets, otherFold)
  const compiled = (expression: TypedExpression): CompiledValue => ({
    type: expression.type === 'truth' || expression.type === 'integer' ? expression.type : 'number',
    stage: expression.stage,
    value: compiler.compile(expression),
  })
  const requires = source.requires.map(({ label, condition }) => ({
    label,
    stage: condition.stage,
    holds: compiler.compile(condition),
    shortfall: compileShortfall(compiler, condition),
  }))
  const score = compiled(source.score)
  const hit = source.hit ? compiled(source.hit) : null
  const columns = source.columns.map(({ name, value }) => ({ name, ...compiled(value) }))
  const layout = {
    slots: source.slotCount,
    memos: compiler.memos,
    resources: compiler.loadables.length,
    place: source.place,
  }
  return { source, layout, loadables: compiler.loadables, requires, score, hit, columns }
}
