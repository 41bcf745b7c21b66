import type { CostClass, Field, Observable, Stage } from '../observables/observable.ts'
import { OBSERVABLES } from '../observables/registry.ts'
import { FOLDS } from './folds.ts'
import { FUNCTIONS } from './functions/registry.ts'
import type { RuleFunction } from './functions/ruleFunction.ts'
import { fieldTypeName, typeName } from './typed.ts'
import { EXPRESSION_KEYWORDS, OPERATORS, STATEMENT_KEYWORDS } from './words.ts'

export type ReferenceKind =
  'observable' | 'set' | 'field' | 'relation' | 'function' | 'fold' | 'statement' | 'keyword' | 'operator'

/** One entry of the reference page, also used for completion and hover text. */
export interface ReferenceEntry {
  /** Unique: the full name, `set.field` for fields, the word or sign itself for the language. */
  readonly id: string
  readonly kind: ReferenceKind
  /** What is written in a rule. */
  readonly name: string
  /** How it is used, such as `log10(x)`. */
  readonly form: string
  /** Type in words: "an integer", "a set of divisors". */
  readonly type: string
  readonly description: string
  /** TeX without dollar signs, or ''. */
  readonly formula: string
  /** For a field: the set whose elements have it. */
  readonly of?: string
  /** For entries of the observables' registry. */
  readonly observable?: {
    readonly unit: string
    readonly convention: string
    readonly stage: Stage
    readonly cost: CostClass
    /** Power of s along the ray, or 'computed' when it follows none. */
    readonly scaling: number | 'computed'
    readonly version: number
    readonly source: string
    readonly undefinedWhen?: string
  }
}

type Registered = Observable | Field

function registered(entry: Registered): NonNullable<ReferenceEntry['observable']> {
  const { unit, convention, stage, cost, scaling, version, source } = entry
  const undefinedWhen = 'undefinedWhen' in entry ? entry.undefinedWhen : undefined
  return {
    unit,
    convention,
    stage,
    cost,
    scaling,
    version,
    source,
    ...(undefinedWhen ? { undefinedWhen } : {}),
  }
}

function observableEntries(observable: Observable): ReferenceEntry[] {
  const { name, description, formula } = observable
  const base = { id: name, name, description, formula, observable: registered(observable) }
  switch (observable.kind) {
    case 'scalar':
      return [{ ...base, kind: 'observable', form: name, type: typeName(observable.type) }]
    case 'numbers':
      return [{ ...base, kind: 'set', form: `max(x in ${name} : x)`, type: 'a set of numbers' }]
    case 'relation': {
      const form = `${name}(${observable.parameters.map((parameter) => parameter.name).join(', ')})`
      return [{ ...base, kind: 'relation', form, type: typeName(observable.type) }]
    }
    case 'records':
      return [
        { ...base, kind: 'set', form: `count(x in ${name} : condition)`, type: 'a set' },
        ...observable.fields.map((field): ReferenceEntry => ({
          id: `${name}.${field.name}`,
          kind: 'field',
          name: field.name,
          form: field.kind === 'members' ? `y in x.${field.name}` : `x.${field.name}`,
          type: fieldTypeName(field),
          description: field.description,
          formula: field.formula,
          of: name,
          observable: registered(field),
        })),
      ]
  }
}

function functionEntry(definition: RuleFunction): ReferenceEntry {
  const { name, parameters, variadic, description, formula, result, undefinedWhen } = definition
  return {
    id: `${name}()`,
    kind: 'function',
    name,
    form: `${name}(${parameters.map((parameter) => parameter.name).join(', ')}${variadic ? ', …' : ''})`,
    type: result === 'common' ? 'an integer for integers, else a number' : typeName(result),
    description: undefinedWhen
      ? `${description} It ${undefinedWhen}; otherwise it is undefined.`
      : description,
    formula,
  }
}

/** Everything a rule can say, in the order of the reference page; made from the registries. */
export function referenceEntries(): readonly ReferenceEntry[] {
  const word =
    (kind: 'statement' | 'keyword' | 'operator') =>
    ({ word, form, description }: { word: string; form: string; description: string }): ReferenceEntry => ({
      id: word,
      kind,
      name: word,
      form,
      type: '',
      description,
      formula: '',
    })
  return [
    ...STATEMENT_KEYWORDS.map(word('statement')),
    ...OBSERVABLES.flatMap(observableEntries),
    ...FOLDS.map((fold): ReferenceEntry => {
      const body = fold.body === 'truth' ? 'condition' : 'expression'
      return {
        id: `${fold.name}(in)`,
        kind: 'fold',
        name: fold.name,
        form: `${fold.name}(${fold.ordered ? 'p, ' : ''}x in set : ${body})`,
        type: fold.result === 'common' ? 'what the expression is' : typeName(fold.result),
        description: fold.description,
        formula: fold.formula,
      }
    }),
    ...FUNCTIONS.map(functionEntry),
    ...OPERATORS.map(word('operator')),
    ...EXPRESSION_KEYWORDS.map(word('keyword')),
  ]
}
