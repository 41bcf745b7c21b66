import { dependsOnBasis } from '../observables/metric.ts'
import type { Field, NumberSet, RecordSet } from '../observables/observable.ts'
import { findField, findObservable, OBSERVABLES, recordSet } from '../observables/registry.ts'
import type { NameNode, PathExpression, Span } from './ast.ts'
import { findFold } from './folds.ts'
import { findFunction } from './functions/registry.ts'
import { type IssueDraft, writing } from './issues.ts'
import { nearestName } from './nearest.ts'
import { later, nodeOf, unknownNode } from './node.ts'
import { isGroup, type Scope } from './scope.ts'
import { fieldTypeName, type FoldSource, type TypedExpression, typeName } from './typed.ts'

const spelled = (names: readonly NameNode[]): string => names.map((name) => name.text).join('.')

/** Resolves names and fields. */
export class PathChecker {
  constructor(
    private readonly scope: Scope,
    private readonly report: (draft: IssueDraft) => void,
  ) {}

  /** A path that stands for a value or an element. */
  value(path: PathExpression): TypedExpression {
    const { names } = path
    const [first] = names
    const variable = this.scope.variable(first.text)
    if (variable) {
      const { set, slot } = variable
      if (set.kind === 'numbers') {
        const item = nodeOf(first, set.type, [], set.stage)
        const node: TypedExpression = {
          ...item,
          kind: 'item',
          slot,
          set,
          open: true,
          basisDependent: dependsOnBasis(set.name),
        }
        return names.length === 1 ? node : this.noFields(path, typeName(set.type))
      }
      return this.walk(
        { ...nodeOf(first, { of: set }, [], set.stage), kind: 'element', slot, open: true },
        names,
      )
    }
    const given = this.scope.lets.get(first.text)
    if (given) {
      given.used = true
      if (!given.definition) return unknownNode(path)
      if (names.length > 1) return this.noFields(path, typeName(given.definition.type))
      const { type, stage, basisDependent } = given.definition
      if (type === 'unknown') return unknownNode(path)
      const node = { ...nodeOf(path, type, [], stage), basisDependent }
      return { ...node, kind: 'let', index: given.index, definition: given.definition }
    }
    const name = spelled(names)
    const observable = findObservable(name)
    if (observable?.kind === 'scalar')
      return {
        ...nodeOf(path, observable.type, [], observable.stage),
        basisDependent: dependsOnBasis(observable.name),
        kind: 'scalar',
        observable,
      }
    if (observable) {
      const form =
        observable.kind === 'relation'
          ? `\`${name}(${observable.parameters.map((parameter) => parameter.name).join(', ')})\``
          : observable.kind === 'records'
            ? `\`count(x in ${name} : condition)\` or \`sum(x in ${name} : expression)\``
            : `\`max(x in ${name} : x)\``
      this.report({
        code: observable.kind === 'relation' ? 'function-without-operands' : 'set-as-value',
        message:
          observable.kind === 'relation'
            ? `\`${name}\` is a function of divisors: ${form}`
            : `\`${name}\` is a set; it is used through a quantifier or fold, such as ${form}`,
        ...at(path),
        found: name,
        ...(observable.kind === 'relation' ? {} : writing(path, this.foldOf(name, observable.kind))),
      })
      return unknownNode(path)
    }
    this.unknownName(path)
    return unknownNode(path)
  }

  /** A path after `in`: what a fold runs through. Undefined when it is no set (reported). */
  source(
    path: PathExpression,
  ): { readonly source: FoldSource; readonly set: RecordSet | NumberSet } | undefined {
    const { names } = path
    if (this.scope.variable(names[0].text)) {
      const last = names[names.length - 1]
      const owner =
        names.length > 1
          ? this.value({ ...path, names: names.slice(0, -1), to: names[names.length - 2].to })
          : undefined
      if (owner?.type === 'unknown') return undefined
      if (owner && typeof owner.type === 'object') {
        const set = owner.type.of
        const field = findField(set, last.text)
        if (field?.kind === 'members')
          return { source: { kind: 'members', set, field, target: owner }, set: recordSet(field.of) }
        if (!field) {
          this.unknownField(last, set, (candidate) => candidate.kind === 'members')
          return undefined
        }
        this.noSet(path, fieldTypeName(field))
        return undefined
      }
      this.noSet(path, owner ? typeName(owner.type) : 'one element')
      return undefined
    }
    const name = spelled(names)
    const observable = findObservable(name)
    if (observable?.kind === 'records' || observable?.kind === 'numbers')
      return { source: { kind: 'set', set: observable }, set: observable }
    const given = this.scope.lets.get(names[0].text)
    if (given) given.used = true
    if (observable || given) {
      this.noSet(path, observable?.kind === 'scalar' ? typeName(observable.type) : 'a name for one value')
      return undefined
    }
    const near = nearestName(name, this.scope.setNames())
    this.report({
      code: 'unknown-set',
      message: `there is no set \`${shorten(name)}\`; ${near ? `did you mean \`${near}\`?` : `sets are ${[...this.scope.setNames()].join(', ')}`}`,
      ...at(path),
      expected: 'a set',
      found: name,
      ...writing(path, near),
    })
    return undefined
  }

  /** Follows `.field` after `.field` from an element. */
  private walk(start: TypedExpression, names: readonly NameNode[]): TypedExpression {
    let node = start
    for (const name of names.slice(1)) {
      const span = { from: names[0].from, to: name.to }
      if (typeof node.type !== 'object') {
        this.report({
          code: 'no-fields',
          message: `\`${spelled(names.slice(0, names.indexOf(name)))}\` is ${typeName(node.type)} and has no fields`,
          ...at(name),
          found: name.text,
          ...writing({ from: names[names.indexOf(name) - 1].to, to: names[names.length - 1].to }, ''),
        })
        return unknownNode(span)
      }
      const set = node.type.of
      const field = findField(set, name.text)
      if (!field) {
        this.unknownField(name, set, () => true)
        return unknownNode(span)
      }
      if (field.kind === 'members') {
        const path = spelled(names.slice(0, names.indexOf(name) + 1))
        this.report({
          code: 'set-as-value',
          message: `\`${path}\` is a set; it is used through a quantifier or fold, such as \`count(x in ${path} : condition)\``,
          ...at(span),
          found: path,
          ...writing(span, this.foldOf(path, 'records')),
        })
        return unknownNode(span)
      }
      const type = field.kind === 'element' ? { of: recordSet(field.of) } : field.type
      node = {
        ...nodeOf(span, type, [node], later(set.stage, field.stage)),
        kind: 'field',
        set,
        field,
        target: node,
      }
    }
    return node
  }

  /** The shortest use of a set that is a value: the number of its elements, or its largest number. */
  private foldOf(name: string, kind: 'records' | 'numbers'): string {
    const free = ['x', 'y', 'z', 'u'].find((letter) => this.scope.taken(letter) === undefined) ?? 'x1'
    return kind === 'records' ? `count(${free} in ${name} : true)` : `max(${free} in ${name} : ${free})`
  }

  private noFields(path: PathExpression, what: string): TypedExpression {
    const second = path.names[1]
    this.report({
      code: 'no-fields',
      message: `\`${path.names[0].text}\` is ${what} and has no fields`,
      ...at(second),
      found: second.text,
      ...writing({ from: path.names[0].to, to: path.to }, ''),
    })
    return unknownNode(path)
  }

  private noSet(path: PathExpression, what: string): void {
    this.report({
      code: 'not-a-set',
      message: `\`${spelled(path.names)}\` is ${what}, not a set; sets are ${[...this.scope.setNames()].join(', ')}`,
      ...at(path),
      expected: 'a set',
      found: what,
    })
  }

  private unknownField(name: NameNode, set: RecordSet, wanted: (field: Field) => boolean): void {
    const names = set.fields.filter(wanted).map((field) => field.name)
    const near = nearestName(name.text, names)
    const known = names.length > 0 ? `fields are ${names.join(', ')}` : 'they have no sets of their own'
    this.report({
      code: 'unknown-field',
      message: `elements of ${set.name} have no field \`${shorten(name.text)}\`; ${near ? `did you mean \`${near}\`?` : known}`,
      ...at(name),
      expected: names.join(', '),
      found: name.text,
      ...writing(name, near),
    })
  }

  private unknownName(path: PathExpression): void {
    const { names } = path
    const [first] = names
    const name = spelled(names)
    const defined = this.scope.later.get(first.text)
    if (defined) {
      this.scope.usedEarly.add(first.text)
      this.report({
        code: 'used-before-definition',
        message:
          this.scope.defining === first.text
            ? `the definition of \`${first.text}\` cannot use \`${first.text}\` itself`
            : `\`${first.text}\` is used before it is defined; move its \`let\` above this statement`,
        ...at(first),
        found: first.text,
      })
      return
    }
    if (names.length === 1 && (findFunction(name) || findFold(name))) {
      this.report({
        code: 'function-without-operands',
        message: `\`${name}\` is a function: \`${name}(${findFunction(name) ? 'x' : 'x in set : expression'})\``,
        ...at(path),
        found: name,
      })
      return
    }
    const inGroup = OBSERVABLES.filter((observable) => observable.name.startsWith(`${name}.`))
    if (inGroup.length > 0) {
      this.report({
        code: 'group-as-value',
        message: `\`${name}\` is a group of observables: ${inGroup.map((observable) => observable.name).join(', ')}`,
        ...at(path),
        found: name,
        ...writing(path, inGroup.find(({ kind }) => kind === 'scalar')?.name),
      })
      return
    }
    const fieldLike = names.length > 1 && !isGroup(first.text)
    const near = fieldLike
      ? nearestName(
          name,
          [...this.scope.valueNames()].filter((known) => known.includes('.')),
        )
      : nearestName(name, this.scope.valueNames())
    const nearFirst =
      near === undefined && fieldLike
        ? nearestName(
            first.text,
            this.scope.bound.map((variable) => variable.name),
          )
        : undefined
    const hint = near ?? nearFirst
    const variables = this.scope.bound.map((variable) => `\`${variable.name}\``).join(', ')
    const where = fieldLike
      ? `; fields belong to the variable of a fold${variables ? ` (here ${variables})` : ', such as `d` in `min(d in divisors : d.volume)`'}`
      : ''
    this.report({
      code: 'unknown-name',
      message: `there is no observable or name \`${shorten(name)}\`${hint ? `; did you mean \`${hint}\`?` : where}`,
      ...at(nearFirst ? first : path),
      found: name,
      ...writing(nearFirst ? first : path, hint),
    })
  }
}

const at = ({ from, to }: Span): Span => ({ from, to })
const shorten = (name: string): string => (name.length > 60 ? `${name.slice(0, 60)}…` : name)
