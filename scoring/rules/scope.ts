import { findObservable, OBSERVABLES } from '../observables/registry.ts'
import type { NumberSet, RecordSet } from '../observables/observable.ts'
import type { NameNode } from './ast.ts'
import { findFold, FOLDS } from './folds.ts'
import { findFunction, FUNCTIONS } from './functions/registry.ts'
import type { TypedExpression } from './typed.ts'

/** A name given with `let`. */
export interface LetEntry {
  readonly name: NameNode
  readonly index: number
  /** Absent when the definition could not be read. */
  readonly definition?: TypedExpression
  used: boolean
}

/** A variable of a fold. */
export interface BoundVariable {
  readonly name: string
  readonly slot: number
  readonly set: RecordSet | NumberSet
}

const groups = new Set(
  OBSERVABLES.flatMap(({ name }) => (name.includes('.') ? [name.slice(0, name.indexOf('.'))] : [])),
)

/** The names an expression can see. */
export class Scope {
  readonly lets = new Map<string, LetEntry>()
  /** Names defined further down, with where. */
  readonly later = new Map<string, NameNode>()
  /** Variables of the folds around, outermost first. */
  readonly bound: BoundVariable[] = []
  /** Names used above their definition: an error already, so no second one for not being used. */
  readonly usedEarly = new Set<string>()
  /** The name whose definition is being checked. */
  defining: string | undefined
  private slots = 0

  get slotCount(): number {
    return this.slots
  }

  newSlot(): number {
    return this.slots++
  }

  variable(name: string): BoundVariable | undefined {
    return this.bound.find((variable) => variable.name === name)
  }

  /** Why `name` cannot be given to something new, or undefined when it is free. */
  taken(name: string): string | undefined {
    if (groups.has(name)) return `\`${name}\` is the name of a group of observables`
    if (findObservable(name)) return `\`${name}\` is an observable`
    if (findFunction(name) || findFold(name)) return `\`${name}\` is a function`
    if (this.variable(name)) return `\`${name}\` is already the variable of a fold around this one`
    if (this.lets.has(name) || this.later.has(name)) return `\`${name}\` is already a name given with \`let\``
    return undefined
  }

  /** Names that stand for one value, nearest scope first. */
  *valueNames(): Generator<string> {
    for (const { name } of this.bound) yield name
    yield* this.lets.keys()
    for (const observable of OBSERVABLES) if (observable.kind === 'scalar') yield observable.name
  }

  /** Names of sets. */
  *setNames(): Generator<string> {
    for (const { kind, name } of OBSERVABLES) if (kind === 'records' || kind === 'numbers') yield name
  }

  /** Names that can be called. */
  *callNames(): Generator<string> {
    for (const { name } of FOLDS) yield name
    for (const { name } of FUNCTIONS) yield name
    for (const observable of OBSERVABLES) if (observable.kind === 'relation') yield observable.name
  }
}

/** True when `name` is the first part of dotted observables, such as `metric`. */
export const isGroup = (name: string): boolean => groups.has(name)
