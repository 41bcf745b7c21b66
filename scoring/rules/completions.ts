import { OBSERVABLES } from '../observables/registry.ts'
import type { CostClass } from '../observables/observable.ts'
import type { OwnName } from './ownNames.ts'
import { referenceEntries, type ReferenceEntry } from './reference.ts'
import { pathEndingAt, setOf, type Surroundings, surroundingsAt } from './surroundings.ts'

/** One suggestion while typing. */
export interface Completion {
  readonly label: string
  readonly kind: ReferenceEntry['kind'] | 'name' | 'variable' | 'group'
  /** Short, beside the label: a type or a form. */
  readonly detail: string
  /** Longer: the description. */
  readonly info: string
  /** Of observables and own names. */
  readonly unit?: string
  readonly cost?: CostClass
  /** What replaces `from .. to`; the label when left out. */
  readonly insert?: string
  /** Where the cursor goes inside `insert`, counted from its start; its end when left out. */
  readonly cursor?: number
}

export interface CompletionResult {
  readonly from: number
  readonly to: number
  readonly options: readonly Completion[]
}

const ENTRIES = referenceEntries()

function plain(entry: ReferenceEntry): Completion {
  const detail = entry.type || entry.form
  return { label: entry.name, kind: entry.kind, detail, info: entry.description, ...worth(entry) }
}

const worth = ({ observable }: ReferenceEntry): Pick<Completion, 'unit' | 'cost'> =>
  observable ? { unit: observable.unit, cost: observable.cost } : {}

function callable(entry: ReferenceEntry, variable: string): Completion {
  const order = entry.name === 'quantile' ? '0.5, ' : ''
  const insert = entry.kind === 'fold' ? `${entry.name}(${order}${variable} in  : )` : `${entry.name}()`
  const cursor = entry.kind === 'fold' ? insert.indexOf(' in ') + 4 : insert.length - 1
  const { name, kind, form, description } = entry
  return { label: name, kind, detail: form, info: description, insert, cursor, ...worth(entry) }
}

/** What can follow `words.`: fields of a variable's elements, or the next part of a group's names. */
function afterDot(words: readonly string[], around: Surroundings): Completion[] {
  const [first] = words
  if (around.variables.has(first)) {
    const set = words.length === 1 ? around.variables.get(first) : setOf(words, around.variables)
    if (set?.kind !== 'records') return []
    return ENTRIES.filter((entry) => entry.kind === 'field' && entry.of === set.name).map(plain)
  }
  const prefix = `${words.join('.')}.`
  const parts = new Map<string, Completion>()
  for (const entry of ENTRIES) {
    if (entry.kind === 'field' || !entry.name.startsWith(prefix)) continue
    const rest = entry.name.slice(prefix.length)
    const part = rest.split('.')[0]
    if (part === rest) parts.set(part, { ...plain(entry), label: part })
    else if (!parts.has(part)) parts.set(part, group(`${prefix}${part}`, part))
  }
  return [...parts.values()]
}

function group(name: string, label: string): Completion {
  const inside = OBSERVABLES.filter((observable) => observable.name.startsWith(`${name}.`))
  return {
    label,
    kind: 'group',
    detail: 'group',
    info: inside.map((observable) => observable.name).join(', '),
  }
}

/** Sets, for the place after `in`. */
function sets(around: Surroundings): Completion[] {
  const members: Completion[] = []
  for (const [variable, set] of around.variables) {
    if (set?.kind !== 'records') continue
    for (const field of set.fields)
      if (field.kind === 'members')
        members.push({
          label: `${variable}.${field.name}`,
          kind: 'field',
          detail: `a set of ${field.of}`,
          info: field.description,
        })
  }
  return [...members, ...ENTRIES.filter((entry) => entry.kind === 'set').map(plain)]
}

/** What can start or continue an expression. */
function operands(around: Surroundings, names: readonly OwnName[]): Completion[] {
  const variables = [...around.variables].map(([label, set]): Completion => ({
    label,
    kind: 'variable',
    detail: set ? `runs through ${set.name}` : 'variable',
    info: 'The variable of a fold around this place.',
  }))
  const used = new Set([...around.variables.keys(), ...around.lets])
  const free = ['x', 'y', 'z', 'u', 'v', 'w'].find((letter) => !used.has(letter)) ?? 'x1'
  const lets = around.lets.map((label): Completion => {
    const known = names.find(({ name }) => name === label)
    return {
      label,
      kind: 'name',
      detail: known?.type ?? 'let',
      info: known?.definition || 'Defined above.',
      ...(known?.unit ? { unit: known.unit } : {}),
      ...(known?.cost ? { cost: known.cost } : {}),
    }
  })
  return [
    ...variables,
    ...lets,
    ...ENTRIES.filter((entry) => entry.kind === 'observable').map(plain),
    ...ENTRIES.filter(
      (entry) => entry.kind === 'fold' || entry.kind === 'function' || entry.kind === 'relation',
    ).map((entry) => callable(entry, free)),
    ...words('not', 'true', 'false'),
  ]
}

const words = (...names: string[]): Completion[] =>
  ENTRIES.filter((entry) => entry.kind === 'keyword' && names.includes(entry.name)).map(plain)

const statements = (): Completion[] =>
  ENTRIES.filter((entry) => entry.kind === 'statement').map((entry) => ({
    ...plain(entry),
    detail: entry.form,
    insert: `${entry.name} `,
  }))

const ENDS_OPERAND = /^(\)|[0-9]|")/

/**
 * What could be written at `position`: the word being typed spans `from .. to`. Null inside comments and labels
 * and where only a new name fits. Works on texts that are half written.
 *
 * @param names what is known of the rule's own names, perhaps of a text some keys ago: names that are not among them
 *   are offered without type
 */
export function completions(
  text: string,
  position: number,
  names: readonly OwnName[] = [],
): CompletionResult | null {
  const around = surroundingsAt(text, position)
  if (around.inText) return null
  const from = position - (/[a-zA-Z0-9_]*$/.exec(text.slice(0, position))?.[0].length ?? 0)
  const to = position + (/^[a-zA-Z0-9_]*/.exec(text.slice(position))?.[0].length ?? 0)
  const { before } = around
  const previous = before[before.length - 1]
  const result = (options: readonly Completion[]): CompletionResult | null =>
    options.length > 0 ? { from, to, options } : null

  if (previous === undefined) return result(statements())
  if (previous.text === '.') {
    const owner = before.length - 2
    return owner >= 0 && before[owner].kind === 'word'
      ? result(afterDot(pathEndingAt(before, owner), around))
      : null
  }
  if (/^[0-9]/.test(text.slice(from, to))) return null
  const newLine = text.slice(previous.to, from).includes('\n')
  switch (previous.text) {
    case 'let':
    case 'label':
      return null
    case 'at':
      return result(
        ['scale', 'volume', 'smallest divisor'].map((label) => ({
          label,
          kind: 'keyword' as const,
          detail: 'at',
          info: 'Where on the ray through the reference point all quantities are taken.',
          insert: `${label} `,
        })),
      )
    case 'in':
      return result(sets(around))
  }
  const opener = [...before].reverse().find((token) => token.kind === 'word' && isStatementWord(token.text))
  if (opener?.text === 'at') return newLine ? result(statements()) : null
  const operandBefore =
    ENDS_OPERAND.test(previous.text) || (previous.kind === 'word' && !joins(previous.text))
  if (!operandBefore) return result(operands(around, names))
  const continuing = words('and', 'or', 'else', ...(around.variables.size > 0 ? ['in', 'where'] : []))
  const label = opener?.text === 'require' ? words('label') : []
  return result([...(newLine || around.variables.size === 0 ? statements() : []), ...continuing, ...label])
}

const isStatementWord = (word: string): boolean =>
  ENTRIES.some((entry) => entry.kind === 'statement' && entry.name === word)

/** Words after which an expression follows. */
const joins = (word: string): boolean =>
  isStatementWord(word) || ['and', 'or', 'not', 'else', 'where', 'in'].includes(word)
