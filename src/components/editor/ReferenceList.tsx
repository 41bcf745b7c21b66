import { memo, useMemo, useState } from 'react'
import { CornerDownLeft } from 'lucide-react'
import { referenceEntries, type OwnName, type ReferenceKind } from '../../../scoring/index.ts'
import { Formula } from '../formula/Formula.tsx'
import { IconButton } from '../ui/Button.tsx'
import { Select, TextField } from '../ui/Field.tsx'
import { counted } from '../../lib/numbers.ts'
import { worthOf } from './worth.ts'
import { Empty } from '../ui/States.tsx'
import { Message } from './Message.tsx'

type ReferenceEntry = ReturnType<typeof referenceEntries>[number]

const groups: readonly [title: string, kinds: readonly ReferenceKind[]][] = [
  ['Statements', ['statement']],
  ['Observables and sets', ['observable', 'set', 'field', 'relation']],
  ['Folds over a set', ['fold']],
  ['Functions', ['function']],
  ['Operators and words', ['operator', 'keyword']],
]

const entries = referenceEntries()

const types = [
  ['number', 'Numbers'],
  ['integer', 'Integers'],
  ['truth value', 'Truth values'],
  ['element', 'Elements of a set'],
  ['set', 'Sets'],
] as const
const costs = ['free', 'cheap', 'moderate', 'dear'] as const

export interface ReferenceFilter {
  readonly text: string
  /** One of `types`, or '' for all. */
  readonly type: string
  /** The dearest that may be; '' for all, words of the language among them. */
  readonly cost: string
}

function ofType({ kind, type }: ReferenceEntry, wanted: string): boolean {
  const isSet = type.startsWith('a set')
  if (wanted === 'set') return isSet || kind === 'set'
  if (wanted === 'element') return type.startsWith('an element')
  return !isSet && type.includes(wanted)
}

/** Entries in which every wanted word occurs; those where it starts the name come first. */
export function findEntries({ text, type, cost }: ReferenceFilter): readonly ReferenceEntry[] {
  const words = text.toLowerCase().split(/\s+/).filter(Boolean)
  const most = costs.findIndex((one) => one === cost)
  const fitting = entries.filter(
    (entry) =>
      (type === '' || ofType(entry, type)) &&
      (most < 0 || (entry.observable && costs.indexOf(entry.observable.cost) <= most)),
  )
  if (words.length === 0) return fitting
  const found = fitting.filter((entry) => {
    const all =
      `${entry.id} ${entry.form} ${entry.type} ${entry.description} ${entry.observable?.stage ?? ''}`.toLowerCase()
    return words.every((word) => all.includes(word))
  })
  const rank = (entry: ReferenceEntry) => (entry.id.toLowerCase().startsWith(words[0] ?? '') ? 0 : 1)
  return [...found].sort((a, b) => rank(a) - rank(b))
}

const noNames: readonly OwnName[] = []

/** Everything a rule can say, made from the registries of the language, and the names that a rule gives itself. */
export const ReferenceList = memo(function ReferenceList({
  onInsert,
  open,
  names = noNames,
}: {
  onInsert?: (text: string) => void
  open?: boolean
  names?: readonly OwnName[]
}) {
  const [text, setText] = useState('')
  const [type, setType] = useState('')
  const [cost, setCost] = useState('')
  const found = useMemo(() => findEntries({ text, type, cost }), [text, type, cost])
  const word = text.trim().toLowerCase()
  const own = names.filter(({ name, definition }) => `${name} ${definition}`.toLowerCase().includes(word))
  return (
    <div>
      <div className="flex flex-wrap items-end gap-x-3 gap-y-2">
        <TextField
          label="Search the reference"
          type="search"
          value={text}
          placeholder="volume, rigid, log10, …"
          className="min-w-44 flex-1 basis-52"
          onChange={(event) => setText(event.target.value)}
        />
        <Select
          label="Type"
          value={type}
          onChange={(event) => setType(event.target.value)}
          options={[['', 'Any type'], ...types]}
        />
        <Select
          label="Cost at most"
          value={cost}
          onChange={(event) => setCost(event.target.value)}
          options={[['', 'Any cost'], ...costs.map((one) => [one, one] as const)]}
        />
      </div>
      <p role="status" className="mt-1 text-xs text-soft">
        {found.length} of {entries.length} entries
        {own.length > 0 && `, and ${counted(own.length, 'name')} of this rule`}
      </p>
      {own.length > 0 && (
        <section aria-label="Names of this rule" className="mt-4">
          <h2 className="border-b pb-1 text-sm">Names of this rule</h2>
          <ul>
            {own.map((name) => (
              <OwnEntry key={name.name} own={name} onInsert={onInsert} />
            ))}
          </ul>
        </section>
      )}
      {found.length === 0 && (
        <Empty title="Nothing in the language matches.">Try a word of the trade, or part of a name.</Empty>
      )}
      {groups.map(([title, kinds]) => {
        const inGroup = found.filter((entry) => kinds.includes(entry.kind))
        return (
          inGroup.length > 0 && (
            <section key={title} aria-label={title} className="mt-4">
              <h2 className="border-b pb-1 text-sm">{title}</h2>
              <ul>
                {inGroup.map((entry) => (
                  <Entry key={entry.id} entry={entry} onInsert={onInsert} open={open} />
                ))}
              </ul>
            </section>
          )
        )
      })}
    </div>
  )
})

function OwnEntry({ own, onInsert }: { own: OwnName; onInsert?: (text: string) => void }) {
  const { name, definition, type, unit, cost } = own
  return (
    <li className="flex items-start gap-1 border-b py-1">
      <div className="min-w-0 flex-1 py-0.5 leading-5">
        <code className="font-mono text-xs font-semibold">{name}</code>
        <span className="ml-2 text-xs text-soft">
          {type === null
            ? 'its definition has an error'
            : worthOf({ detail: type, unit: unit ?? undefined, cost: cost ?? undefined })}
        </span>
        <code className="block truncate font-mono text-xs text-soft" title={definition}>
          {definition}
        </code>
      </div>
      {onInsert && (
        <IconButton label={`Insert ${name}`} onClick={() => onInsert(name)}>
          <CornerDownLeft size={14} aria-hidden />
        </IconButton>
      )}
    </li>
  )
}

function Entry({
  entry,
  onInsert,
  open = false,
}: {
  entry: ReferenceEntry
  onInsert?: (text: string) => void
  open?: boolean
}) {
  const [shown, setShown] = useState(open)
  return (
    <li className="border-b py-1 [contain-intrinsic-size:auto_40px] [content-visibility:auto]">
      <div className="flex items-start gap-1">
        <details
          className="min-w-0 flex-1"
          open={shown}
          onToggle={(event) => setShown(event.currentTarget.open)}
        >
          <summary className="list-inside py-0.5 leading-5">
            <code className="font-mono text-xs font-semibold break-words">{entry.form}</code>
            {entry.of && <span className="ml-2 text-xs text-soft">of {entry.of}</span>}
            {entry.type && (
              <span className="ml-2 text-xs text-soft">
                {worthOf({
                  detail: entry.type,
                  unit: entry.observable?.unit,
                  cost: entry.observable?.cost,
                })}
              </span>
            )}
          </summary>
          {shown && <EntryBody entry={entry} />}
        </details>
        {onInsert && (
          <IconButton label={`Insert ${entry.form}`} onClick={() => onInsert(entry.form)}>
            <CornerDownLeft size={14} aria-hidden />
          </IconButton>
        )}
      </div>
    </li>
  )
}

/** How a quantity moves along the ray, in words. */
function scalingInWords(scaling: number | 'computed'): string {
  if (scaling === 'computed') return 'follows no power of s: computed at the place itself'
  return scaling === 0 ? 'unchanged' : `scales as s^${scaling}`
}

function EntryBody({ entry }: { entry: ReferenceEntry }) {
  const { observable } = entry
  return (
    <div className="pb-2 pl-4">
      <p className="prose-line">
        <Message text={entry.description} />
      </p>
      {entry.formula && (
        <p className="my-1.5">
          <Formula tex={entry.formula} />
        </p>
      )}
      {observable && (
        <dl className="mt-1 grid grid-cols-[max-content_minmax(0,1fr)] gap-x-3 text-xs text-soft">
          {(
            [
              ['Unit', observable.unit === '1' ? 'pure number' : observable.unit],
              ['Convention', observable.convention],
              ['Stage', observable.stage],
              ['Cost', observable.cost],
              ['Under w → s w', scalingInWords(observable.scaling)],
              ['Undefined', observable.undefinedWhen ?? ''],
              ['Source', observable.source],
            ] as const
          )
            .filter(([, value]) => value)
            .map(([name, value]) => (
              <div key={name} className="contents">
                <dt>{name}</dt>
                <dd className="text-ink">{value}</dd>
              </div>
            ))}
        </dl>
      )}
    </div>
  )
}
