import { Popover } from 'radix-ui'
import { Columns3 } from 'lucide-react'
import {
  numberGroups,
  polytopeNumberNames,
  polytopeNumbers,
  type PolytopeNumberName,
} from '../../../shared/polytopeNumbers.ts'
import { Button } from '../../components/ui/Button.tsx'

/** Which numbers the table shows. */
export function ColumnChooser({
  columns,
  onColumns,
}: {
  columns: readonly PolytopeNumberName[]
  /** null: the usual ones. */
  onColumns: (columns: PolytopeNumberName[] | null) => void
}) {
  const toggle = (name: PolytopeNumberName, on: boolean) =>
    onColumns(polytopeNumberNames.filter((other) => (other === name ? on : columns.includes(other))))
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
          className="z-40 max-h-(--radix-popover-content-available-height) w-64 overflow-y-auto rounded border border-edge bg-sheet px-3 py-1 shadow-lifted"
        >
          {numberGroups.map((group) => (
            <fieldset key={group}>
              <legend className="pt-2 pb-1 text-xs text-soft">{group}</legend>
              {polytopeNumberNames
                .filter((name) => polytopeNumbers[name].group === group)
                .map((name) => (
                  <label
                    key={name}
                    title={polytopeNumbers[name].description}
                    className="flex min-h-7 items-center gap-2 hover:bg-action-wash"
                  >
                    <input
                      type="checkbox"
                      checked={columns.includes(name)}
                      onChange={(event) => toggle(name, event.target.checked)}
                    />
                    {polytopeNumbers[name].label}
                  </label>
                ))}
            </fieldset>
          ))}
          <Button kind="quiet" className="my-1" onClick={() => onColumns(null)}>
            The usual columns
          </Button>
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  )
}
