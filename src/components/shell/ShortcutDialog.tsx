import { shortcutName, useShortcutsOn } from '../../actions/keys.ts'
import { shortcutsOf, type LiveAction } from '../../actions/registry.ts'
import { useLiveActions } from '../../actions/useActions.ts'
import { Dialog } from '../ui/Dialog.tsx'

/** Everything that has a key on the page that is open now. */
export function ShortcutDialog({
  open,
  onOpenChange,
}: {
  open: boolean
  onOpenChange: (open: boolean) => void
}) {
  const actions = useLiveActions()
  const [on, setOn] = useShortcutsOn()
  const sections = new Map<string, LiveAction[]>()
  for (const action of actions) {
    if (shortcutsOf(action).length === 0) continue
    sections.set(action.section, [...(sections.get(action.section) ?? []), action])
  }
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Shortcuts"
      description="On this page; single keys outside text fields."
    >
      {[...sections].map(([section, list]) => (
        <section key={section} className="mb-4">
          <h3 className="text-sm">{section}</h3>
          <dl className="grid grid-cols-[5rem_1fr]">
            {list.map((action) => (
              <div
                key={action.id}
                className="col-span-2 grid min-h-7 grid-cols-subgrid items-center border-b"
              >
                <dt className="flex gap-1">
                  {shortcutsOf(action).map((shortcut) => (
                    <kbd key={shortcut} className="rounded border border-edge px-1.5 font-mono text-xs">
                      {shortcutName(shortcut)}
                    </kbd>
                  ))}
                </dt>
                <dd>
                  {action.label}
                  {action.unavailable && <span className="text-soft"> ({action.unavailable})</span>}
                </dd>
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
        {shortcutName('Mod+k')} lists all that can be done here, with or without a key. Everything works with
        Tab, the arrow keys, Enter and Escape, too. In the rule editor, Ctrl-Space completes, F8 goes to the
        next message and Ctrl-Shift-M lists them.
      </p>
    </Dialog>
  )
}
