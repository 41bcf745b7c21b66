import { useState } from 'react'
import {
  reportColumn,
  scoreColumn,
  shortlistLimit,
  type AssemblySettings,
  type ParetoAxis,
} from '../../../../shared/assemblies.ts'
import { Button } from '../../../components/ui/Button.tsx'
import { Select, TextField } from '../../../components/ui/Field.tsx'

/** The choices by which a list is drawn. */
export function AssemblyFields({
  settings,
  columns,
  onChange,
}: {
  settings: AssemblySettings
  /** Report columns of the version that ranks. */
  columns: readonly string[]
  onChange: (changes: Partial<AssemblySettings>) => void
}) {
  return (
    <div className="max-w-[760px]">
      <div className="grid grid-cols-2 gap-x-3 gap-y-4 sm:grid-cols-4">
        <Limit
          label="Candidates, at most"
          value={settings.size}
          most={shortlistLimit}
          onChange={(size) => size !== null && onChange({ size })}
        />
        <Limit
          label="Of one polytope, at most"
          value={settings.perPolytope}
          most={shortlistLimit}
          onChange={(perPolytope) => onChange({ perPolytope })}
        />
        <Limit
          label="Triangles apart, at least"
          hint="On one polytope; a flip exchanges two."
          value={settings.apart}
          most={200}
          onChange={(apart) => onChange({ apart })}
        />
        <Limit
          label="Of equal invariants, at most"
          hint="Candidates that may be diffeomorphic."
          value={settings.perInvariants}
          most={shortlistLimit}
          onChange={(perInvariants) => onChange({ perInvariants })}
        />
      </div>
      <label className="mt-3 flex min-h-8 items-center gap-2">
        <input
          type="checkbox"
          checked={settings.feasibleOnly}
          onChange={(event) => onChange({ feasibleOnly: event.target.checked })}
        />
        feasible candidates only
      </label>
      <Fronts pareto={settings.pareto} columns={columns} onChange={(pareto) => onChange({ pareto })} />
    </div>
  )
}

/** A whole number, or nothing for no limit; what does not fit stays in the field and has no effect. */
function Limit({
  label,
  hint,
  value,
  most,
  onChange,
}: {
  label: string
  hint?: string
  value: number | null
  most: number
  onChange: (value: number | null) => void
}) {
  const [text, setText] = useState(value === null ? '' : String(value))
  const number = /^\d+$/.test(text.trim()) ? Number(text) : Number.NaN
  const fits = text.trim() === '' || (number >= 1 && number <= most)
  return (
    <TextField
      label={label}
      hint={hint}
      inputMode="numeric"
      placeholder="no limit"
      value={text}
      error={fits ? null : `A whole number from 1 to ${most}.`}
      onChange={(event) => {
        setText(event.target.value)
        const next = event.target.value.trim()
        if (next === '') onChange(null)
        else if (/^\d+$/.test(next) && Number(next) >= 1 && Number(next) <= most) onChange(Number(next))
      }}
    />
  )
}

function Fronts({
  pareto,
  columns,
  onChange,
}: {
  pareto: AssemblySettings['pareto']
  columns: readonly string[]
  onChange: (pareto: ParetoAxis[] | null) => void
}) {
  const options = [
    [scoreColumn, 'score'] as const,
    ...columns.map((name) => [reportColumn(name), name] as const),
  ]
  const axes = pareto ?? []
  const free = options.filter(([column]) => axes.every((axis) => axis.column !== column))
  const change = (at: number, axis: Partial<ParetoAxis>) =>
    onChange(axes.map((one, place) => (place === at ? { ...one, ...axis } : one)))
  return (
    <fieldset className="mt-3">
      <legend className="mb-1 text-xs font-medium text-soft">Order</legend>
      <div className="flex flex-wrap gap-x-5">
        <label className="flex min-h-8 items-center gap-2">
          <input type="radio" name="order" checked={pareto === null} onChange={() => onChange(null)} />
          by score
        </label>
        <label className="flex min-h-8 items-center gap-2">
          <input
            type="radio"
            name="order"
            checked={pareto !== null}
            disabled={options.length < 2}
            onChange={() =>
              onChange(options.slice(0, 2).map(([column]) => ({ column, direction: 'max' as const })))
            }
          />
          by Pareto fronts of two or three columns
        </label>
      </div>
      {options.length < 2 && (
        <p className="text-xs text-soft">
          Fronts need a report column beside the score; this rule reports none.
        </p>
      )}
      {axes.map((axis, at) => (
        <div key={at} className="mt-2 flex flex-wrap items-end gap-3">
          <Select
            label={`Column ${at + 1}`}
            className="w-48"
            value={axis.column}
            options={options.filter(
              ([column]) => column === axis.column || free.some(([other]) => other === column),
            )}
            onChange={(event) => change(at, { column: event.target.value })}
          />
          <Select
            label="is to be"
            className="w-28"
            value={axis.direction}
            options={[
              ['max', 'large'],
              ['min', 'small'],
            ]}
            onChange={(event) => change(at, { direction: event.target.value as ParetoAxis['direction'] })}
          />
          {axes.length > 2 && (
            <Button kind="quiet" onClick={() => onChange(axes.filter((_, place) => place !== at))}>
              Remove
            </Button>
          )}
        </div>
      ))}
      {pareto !== null && (
        <>
          {axes.length < 3 && free.length > 0 && (
            <Button
              kind="quiet"
              className="mt-2"
              onClick={() => onChange([...axes, { column: free[0]![0], direction: 'max' }])}
            >
              Add a third column
            </Button>
          )}
          <p className="mt-1 text-xs text-soft">
            Front 1 holds what nothing else beats in all columns; then what only front 1 beats, and so on.
            Within a front by score; a candidate with an undefined column is left out.
          </p>
        </>
      )}
    </fieldset>
  )
}
