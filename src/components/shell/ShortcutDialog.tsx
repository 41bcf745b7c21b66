import { Dialog } from '../ui/Dialog.tsx'
import { useActiveShortcuts, useShortcutsOn, type Shortcut } from '../../lib/shortcuts.ts'

const keyNames: Record<string, string> = {
  ArrowUp: '↑',
  ArrowDown: '↓',
  ArrowLeft: '←',
  ArrowRight: '→',
  Enter: 'Enter',
}

/** Everything that has a single key on the page that is open now. */
export function ShortcutDialog({
  open,
  onOpenChange,
}: {
  open: boolean
  onOpenChange: (open: boolean) => void
}) {
  const shortcuts = useActiveShortcuts()
  const [on, setOn] = useShortcutsOn()
  const groups = new Map<string, Shortcut[]>()
  for (const shortcut of shortcuts) {
    groups.set(shortcut.group, [...(groups.get(shortcut.group) ?? []), shortcut])
  }
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Shortcuts"
      description="On this page, outside text fields."
    >
      {[...groups].map(([group, list]) => (
        <section key={group} className="mb-4">
          <h3 className="text-sm">{group}</h3>
          <dl className="grid grid-cols-[5rem_1fr]">
            {list.map(({ key, does }) => (
              <div key={key} className="col-span-2 grid min-h-7 grid-cols-subgrid items-center border-b">
                <dt>
                  <kbd className="rounded border border-edge px-1.5 font-mono text-xs">
                    {keyNames[key] ?? key}
                  </kbd>
                </dt>
                <dd>{does}</dd>
              </div>
            ))}
          </dl>
        </section>
      ))}
      <label className="flex items-center gap-2">
        <input type="checkbox" checked={on} onChange={(event) => setOn(event.target.checked)} />
        Single-key shortcuts are on
      </label>
      <p className="mt-2 text-soft">
        Everything else works with Tab, the arrow keys, Enter and Escape. In the rule editor, Ctrl-Space
        completes, F8 goes to the next message and Ctrl-Shift-M lists them.
      </p>
    </Dialog>
  )
}
