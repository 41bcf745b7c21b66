import { useEffect, useState } from 'react'
import { Plus } from 'lucide-react'
import {
  numberGroups,
  polytopeNumberNames,
  polytopeNumbers,
  type PolytopeNumberName,
} from '../../../shared/polytopeNumbers.ts'
import { type PolytopeFilter } from '../../../shared/polytopes.ts'
import { Field, Select, TextField } from '../ui/Field.tsx'
import { CollectionSelect } from '../collection/CollectionSelect.tsx'

export type FilterChanges = Record<string, string | undefined>

interface FilterFieldsProps {
  campaign?: string
  filter: PolytopeFilter
  onChange: (changes: FilterChanges) => void
  /** Told of points that were pasted into the text field, which holds one line only. */
  onPoints?: (text: string) => void
}

/** Always shown; any other number is added by choice, or because the filter names it. */
const first: readonly PolytopeNumberName[] = ['h11', 'h21', 'points']

/** A library filter as fields: ranges of any of its numbers, yes-or-no questions, a collection, a text. */
export function FilterFields({ campaign, filter, onChange, onPoints }: FilterFieldsProps) {
  const [added, setAdded] = useState<readonly PolytopeNumberName[]>([])
  const shown = polytopeNumberNames.filter(
    (name) =>
      first.includes(name) ||
      added.includes(name) ||
      filter[`${name}Min`] !== undefined ||
      filter[`${name}Max`] !== undefined,
  )
  return (
    <div className="grid grid-cols-2 content-start items-end gap-x-2 gap-y-3 sm:grid-cols-4">
      <TextPart value={filter.text} onChange={onChange} onPoints={onPoints} />
      {shown.flatMap((name) =>
        (['Min', 'Max'] as const).map((end) => (
          <TextField
            key={name + end}
            label={`${polytopeNumbers[name].label} ${end === 'Min' ? 'from' : 'to'}`}
            type="number"
            inputMode={polytopeNumbers[name].signed ? 'text' : 'numeric'}
            min={polytopeNumbers[name].signed ? undefined : 0}
            step={polytopeNumbers[name].decimal ? 'any' : 1}
            title={polytopeNumbers[name].description}
            value={filter[`${name}${end}`] ?? ''}
            onChange={(event) => onChange({ [`${name}${end}`]: event.target.value })}
          />
        )),
      )}
      <Question name="favourable" label="Favourable" filter={filter} onChange={onChange} />
      <Question name="rigidBasis" label="Rigid span H11" filter={filter} onChange={onChange} />
      <Select
        label="Fibre type"
        value={filter.fibre ?? ''}
        onChange={(event) => onChange({ fibre: event.target.value })}
        options={[
          ['', 'any'],
          ...Array.from({ length: 16 }, (_, i): [string, string] => [String(i + 1), `F${i + 1}`]),
        ]}
      />
      <Question name="weighted" label="From weights" filter={filter} onChange={onChange} />
      <Select
        label="Origin"
        value={filter.origin ?? ''}
        onChange={(event) => onChange({ origin: event.target.value })}
        options={[
          ['', 'all'],
          ['bundled', 'bundled'],
          ['imported', 'imported'],
        ]}
      />
      <CollectionSelect
        className="col-span-2"
        label="Collection"
        none="any or none"
        campaign={campaign}
        value={filter.collection ?? ''}
        onChange={(collection) => onChange({ collection: collection?.id })}
      />
      <AddNumber shown={shown} onAdd={(name) => setAdded([...added, name])} />
    </div>
  )
}

function Question({
  name,
  label,
  filter,
  onChange,
}: {
  name: 'favourable' | 'weighted' | 'rigidBasis'
  label: string
  filter: PolytopeFilter
  onChange: (changes: FilterChanges) => void
}) {
  return (
    <Select
      label={label}
      value={filter[name] ?? ''}
      onChange={(event) => onChange({ [name]: event.target.value })}
      options={[
        ['', 'any'],
        ['yes', 'yes'],
        ['no', 'no'],
      ]}
    />
  )
}

/** Every number of the library can be filtered by; those that are not shown yet are chosen here. */
function AddNumber({
  shown,
  onAdd,
}: {
  shown: readonly PolytopeNumberName[]
  onAdd: (name: PolytopeNumberName) => void
}) {
  return (
    <Field label="Filter by another number" className="col-span-2">
      {(field) => (
        <span className="relative block">
          <Plus size={14} aria-hidden className="absolute top-2.5 left-2 text-action" />
          <select
            {...field}
            className={`${field.className} pl-7`}
            value=""
            onChange={(event) => onAdd(event.target.value as PolytopeNumberName)}
          >
            <option value="">choose…</option>
            {numberGroups.map((group) => {
              const names = polytopeNumberNames.filter(
                (name) => polytopeNumbers[name].group === group && !shown.includes(name),
              )
              return (
                names.length > 0 && (
                  <optgroup key={group} label={group}>
                    {names.map((name) => (
                      <option key={name} value={name}>
                        {polytopeNumbers[name].label}
                      </option>
                    ))}
                  </optgroup>
                )
              )
            })}
          </select>
        </span>
      )}
    </Field>
  )
}

/** The text settles for a moment before it takes effect. */
function TextPart({
  value = '',
  onChange,
  onPoints,
}: {
  value?: string
  onChange: (changes: FilterChanges) => void
  onPoints?: (text: string) => void
}) {
  const [text, setText] = useState(value)
  const [known, setKnown] = useState(value)
  if (known !== value) {
    setKnown(value)
    setText(value)
  }
  useEffect(() => {
    if (text === value) return
    const timer = setTimeout(() => onChange({ text }), 250)
    return () => clearTimeout(timer)
  }, [text, value, onChange])
  return (
    <TextField
      className="col-span-2"
      label="Name, key or weights"
      placeholder="1 1 1 6 9"
      value={text}
      maxLength={80}
      onChange={(event) => setText(event.target.value)}
      onPaste={(event) => {
        const pasted = event.clipboardData.getData('text/plain')
        if (!onPoints || !/\d[^\n]*\n[^\n]*\d/.test(pasted)) return
        event.preventDefault()
        onPoints(pasted)
      }}
    />
  )
}
