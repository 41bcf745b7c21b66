import { DropdownMenu } from 'radix-ui'
import { Check, Columns3 } from 'lucide-react'
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
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger asChild>
        <Button kind="quiet">
          <Columns3 size={15} aria-hidden />
          Columns
        </Button>
      </DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content
          align="end"
          sideOffset={4}
          collisionPadding={8}
          className="z-40 max-h-(--radix-dropdown-menu-content-available-height) w-64 overflow-y-auto rounded border border-edge bg-sheet py-1 shadow-lifted"
        >
          {numberGroups.map((group) => (
            <DropdownMenu.Group key={group}>
              <DropdownMenu.Label className="px-3 pt-2 pb-1 text-xs text-soft">{group}</DropdownMenu.Label>
              {polytopeNumberNames
                .filter((name) => polytopeNumbers[name].group === group)
                .map((name) => (
                  <DropdownMenu.CheckboxItem
                    key={name}
                    checked={columns.includes(name)}
                    onCheckedChange={(on) => toggle(name, on)}
                    // Several are chosen in a row.
                    onSelect={(event) => event.preventDefault()}
                    title={polytopeNumbers[name].description}
                    className="flex min-h-7 items-center gap-2 px-3 outline-none data-highlighted:bg-action-wash"
                  >
                    <span className="inline-flex size-4 items-center justify-center border border-edge">
                      <DropdownMenu.ItemIndicator>
                        <Check size={13} aria-hidden className="text-action" />
                      </DropdownMenu.ItemIndicator>
                    </span>
                    {polytopeNumbers[name].label}
                  </DropdownMenu.CheckboxItem>
                ))}
            </DropdownMenu.Group>
          ))}
          <DropdownMenu.Separator className="my-1 border-t" />
          <DropdownMenu.Item
            onSelect={() => onColumns(null)}
            className="flex min-h-8 items-center px-3 text-action outline-none data-highlighted:bg-action-wash"
          >
            The usual columns
          </DropdownMenu.Item>
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  )
}
