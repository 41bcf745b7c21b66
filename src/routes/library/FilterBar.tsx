import { useEffect, useState } from 'react'
import { type PolytopeFilter } from '../../../shared/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'

type Changes = Record<string, string | number | undefined>

/** The filter as fields; each change goes to the address at once. */
export function FilterBar({
  filter,
  filtered,
  onChange,
  onClear,
}: {
  filter: PolytopeFilter
  filtered: boolean
  onChange: (changes: Changes) => void
  onClear: () => void
}) {
  return (
    <form
      role="search"
      aria-label="Filter the library"
      className="grid grid-cols-2 content-start items-end gap-x-2 gap-y-3 sm:grid-cols-4"
      onSubmit={(event) => event.preventDefault()}
    >
      <Bound name="h11Min" label="h11 from" value={filter.h11Min} onChange={onChange} />
      <Bound name="h11Max" label="h11 to" value={filter.h11Max} onChange={onChange} />
      <Bound name="h21Min" label="h21 from" value={filter.h21Min} onChange={onChange} />
      <Bound name="h21Max" label="h21 to" value={filter.h21Max} onChange={onChange} />
      <Bound name="pointsMax" label="Points, at most" value={filter.pointsMax} onChange={onChange} />
      <Select
        label="Favourable"
        value={filter.favourable ?? ''}
        onChange={(event) => onChange({ favourable: event.target.value })}
        options={[
          ['', 'yes or no'],
          ['yes', 'yes'],
          ['no', 'no'],
        ]}
      />
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
      <TextBound value={filter.text} onChange={onChange} />
      {filtered && (
        <Button className="justify-self-start" onClick={onClear}>
          Clear the filter
        </Button>
      )}
    </form>
  )
}

function Bound({
  name,
  label,
  value,
  onChange,
}: {
  name: string
  label: string
  value: number | undefined
  onChange: (changes: Changes) => void
}) {
  return (
    <TextField
      label={label}
      type="number"
      inputMode="numeric"
      min={0}
      step={1}
      value={value ?? ''}
      onChange={(event) => onChange({ [name]: event.target.value })}
    />
  )
}

/** The name field settles for a moment before it reaches the address. */
function TextBound({ value = '', onChange }: { value?: string; onChange: (changes: Changes) => void }) {
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
      label="Name contains"
      value={text}
      maxLength={80}
      onChange={(event) => setText(event.target.value)}
    />
  )
}
