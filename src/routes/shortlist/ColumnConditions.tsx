import { useState } from 'react'
import { Popover } from 'radix-ui'
import { Columns3, Plus, X } from 'lucide-react'
import { Button } from '../../components/ui/Button.tsx'
import { Field, TextField } from '../../components/ui/Field.tsx'
import { conditionParts, conditionWords, type Condition, type ListColumn } from './listColumns.ts'

interface ConditionProps {
  columns: readonly ListColumn[]
  conditions: readonly Condition[]
  /** Parts of the address; empty ones are taken out of it. */
  onChange: (changes: Record<string, string>) => void
}

/** Ranges of any column of numbers, parts of any column of text: one is added by choosing its column. */
export function ConditionFields({ columns, conditions, onChange }: ConditionProps) {
  const [added, setAdded] = useState<readonly string[]>([])
  const usable = columns.filter(({ type, name }) => type !== null && name !== 'rank' && name !== 'polytope')
  const isShown = ({ name }: ListColumn) =>
    added.includes(name) || conditions.some(({ column }) => column === name)
  const shown = usable.filter(isShown)
  return (
    <>
      {shown.map((column) => (
        <ConditionField
          key={column.name}
          column={column}
          condition={conditions.find((one) => one.column === column.name)}
          onChange={onChange}
        />
      ))}
      <Field label="Filter by a column" className="w-40">
        {(field) => (
          <span className="relative block">
            <Plus size={14} aria-hidden className="absolute top-2.5 left-2 text-action" />
            <select
              {...field}
              className={`${field.className} pl-7`}
              value=""
              onChange={(event) => setAdded([...added, event.target.value])}
            >
              <option value="">choose…</option>
              {usable
                .filter((column) => !isShown(column))
                .map(({ name, label, external }) => (
                  <option key={name} value={name}>
                    {label}
                    {external ? ' (external)' : ''}
                  </option>
                ))}
            </select>
          </span>
        )}
      </Field>
    </>
  )
}

function ConditionField({
  column,
  condition,
  onChange,
}: {
  column: ListColumn
  condition: Condition | undefined
  onChange: ConditionProps['onChange']
}) {
  const { name, label, type } = column
  if (type === 'text') {
    return (
      <TextField
        label={`${label} contains`}
        className="w-36"
        value={condition?.has ?? ''}
        onChange={(event) => onChange({ [`has:${name}`]: event.target.value })}
      />
    )
  }
  return (['from', 'to'] as const).map((end) => (
    <NumberEnd
      key={end}
      label={`${label} ${end}`}
      value={condition?.[end] ?? null}
      onChange={(text) => onChange({ [`${end}:${name}`]: text })}
    />
  ))
}

/** Text that is not yet a number (a sign, a point) stays in the field and has no effect. */
function NumberEnd({
  label,
  value,
  onChange,
}: {
  label: string
  value: number | null
  onChange: (text: string) => void
}) {
  const [text, setText] = useState(value === null ? '' : String(value))
  const [known, setKnown] = useState(value)
  if (known !== value) {
    setKnown(value)
    if (value === null ? text.trim() !== '' && Number.isFinite(Number(text)) : Number(text) !== value) {
      setText(value === null ? '' : String(value))
    }
  }
  const fits = text.trim() === '' || Number.isFinite(Number(text))
  return (
    <TextField
      label={label}
      className="w-28"
      inputMode="decimal"
      value={text}
      error={fits ? null : 'Not a number.'}
      onChange={(event) => {
        setText(event.target.value)
        const next = event.target.value.trim()
        if (next === '' || Number.isFinite(Number(next))) onChange(next)
      }}
    />
  )
}

/** The conditions on columns in force, each with a button that lifts it. */
export function ConditionChips({ columns, conditions, onChange }: ConditionProps) {
  const known = conditions.flatMap((condition) => {
    const column = columns.find(({ name }) => name === condition.column)
    return column ? [{ condition, words: conditionWords(condition, column.label) }] : []
  })
  if (known.length === 0) return null
  return (
    <ul aria-label="Conditions in force" className="mb-2 flex flex-wrap items-center gap-1.5">
      {known.map(({ condition: { column }, words }) => (
        <li key={column}>
          <button
            type="button"
            className="inline-flex min-h-7 items-center gap-1 rounded border border-line bg-action-wash pr-1 pl-2 text-xs text-ink hover:border-action"
            aria-label={`Lift the condition: ${words}`}
            onClick={() => onChange(Object.fromEntries(conditionParts(column).map((part) => [part, ''])))}
          >
            {words}
            <X size={13} aria-hidden className="text-action" />
          </button>
        </li>
      ))}
    </ul>
  )
}

/** Which columns the table shows; the rank always is. */
export function ColumnChooser({
  columns,
  hidden,
  onHidden,
}: {
  columns: readonly ListColumn[]
  hidden: readonly string[]
  onHidden: (hidden: string[]) => void
}) {
  const choosable = columns.filter(({ name }) => name !== 'rank')
  return (
    <Popover.Root>
      <Popover.Trigger asChild>
        <Button kind="quiet">
          <Columns3 size={15} aria-hidden />
          Columns
        </Button>
      </Popover.Trigger>
      <Popover.Portal>
        <Popover.Content
          aria-label="Columns of the table"
          align="end"
          sideOffset={4}
          collisionPadding={8}
          className="z-40 max-h-(--radix-popover-content-available-height) w-64 overflow-y-auto rounded border border-edge bg-sheet px-3 py-2 shadow-lifted"
        >
          {choosable.map(({ name, label, external }) => (
            <label key={name} className="flex min-h-7 items-center gap-2 hover:bg-action-wash">
              <input
                type="checkbox"
                checked={!hidden.includes(name)}
                onChange={(event) =>
                  onHidden(
                    choosable
                      .map((column) => column.name)
                      .filter((other) => (other === name ? !event.target.checked : hidden.includes(other))),
                  )
                }
              />
              {label}
              {external && <span className="text-xs text-soft">external</span>}
            </label>
          ))}
          <Button kind="quiet" className="my-1" onClick={() => onHidden([])}>
            All columns
          </Button>
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  )
}
