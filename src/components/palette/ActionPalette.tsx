import { useRef, useState } from 'react'
import { Command } from 'cmdk'
import { Dialog } from 'radix-ui'
import { shortcutName } from '../../actions/keys.ts'
import { shortcutsOf } from '../../actions/registry.ts'
import { useLiveActions } from '../../actions/useActions.ts'
import { useCurrentCampaign } from '../shell/currentCampaign.tsx'
import { listAll, listFound, type Entry } from './ranking.ts'
import { noteRecent, recentNames } from './recent.ts'
import { useNamedThings, useTypedThing } from './useNamedThings.ts'

/** Sections of the frame that come after those of the page, and those that come last of all. */
const [later, last] = [
  ['Begin', 'Go to'],
  ['Everywhere', 'Account'],
]
const place = ({ section, named }: Entry) =>
  later.includes(section) ? 1 : named ? 2 : last.includes(section) ? 3 : 0

function useActionEntries(): Entry[] {
  return useLiveActions()
    .filter(({ id }) => id !== 'palette')
    .map(({ id, label, section, shortcut, unavailable, run }) => {
      const [first] = shortcutsOf({ shortcut })
      return { id, label, section, unavailable, run, shortcut: first && shortcutName(first) }
    })
}

interface ActionPaletteProps {
  open: boolean
  onOpenChange: (open: boolean) => void
}

/** Everything that can be done or opened now, found by typing. */
export function ActionPalette({ open, onOpenChange }: ActionPaletteProps) {
  /** Where the focus was, and what was chosen: it runs once the focus is back there. */
  const from = useRef<Element | null>(null)
  const chosen = useRef<Entry | null>(null)
  const choose = (entry: Entry) => {
    if (!entry.exact) noteRecent(entry.id)
    chosen.current = entry
    onOpenChange(false)
  }
  return (
    <Dialog.Root open={open} onOpenChange={onOpenChange}>
      <Dialog.Portal>
        <Dialog.Overlay className="fixed inset-0 z-40 bg-veil" />
        <Dialog.Content
          aria-describedby={undefined}
          className="fixed inset-x-2 top-2 z-50 mx-auto flex max-h-[calc(100dvh-1rem)] max-w-[640px] flex-col rounded border border-edge bg-sheet shadow-lifted sm:top-[10vh] sm:max-h-[70vh]"
          onOpenAutoFocus={() => (from.current = document.activeElement)}
          onCloseAutoFocus={(event) => {
            event.preventDefault()
            if (from.current instanceof HTMLElement && from.current.isConnected) from.current.focus()
            const entry = chosen.current
            chosen.current = null
            entry?.run()
          }}
        >
          <Dialog.Title className="sr-only">Actions</Dialog.Title>
          <List onChoose={choose} onLeave={() => onOpenChange(false)} />
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  )
}

function List({ onChoose, onLeave }: { onChoose: (entry: Entry) => void; onLeave: () => void }) {
  const campaign = useCurrentCampaign()
  const [text, setText] = useState('')
  const [recent] = useState(recentNames)
  const typed = text.trim()
  const actions = useActionEntries()
  const named = useNamedThings(campaign?.id ?? null)
  const exact = useTypedThing(campaign?.id ?? null, typed)
  const entries = [...exact, ...[...actions, ...named].sort((a, b) => place(a) - place(b))]
  const line = (entry: Entry, aside: string) => (
    <Line key={entry.id} entry={entry} aside={aside} onChoose={() => onChoose(entry)} />
  )
  return (
    <Command
      label="Actions"
      shouldFilter={false}
      loop
      className="flex min-h-0 flex-col"
      onKeyDown={(event) => {
        // The key that opened it closes it.
        if ((event.ctrlKey || event.metaKey) && event.key.toLowerCase() === 'k') {
          event.preventDefault()
          onLeave()
        }
      }}
    >
      <Command.Input
        value={text}
        onValueChange={setText}
        placeholder="An action, a name, a key, or h11 and h21"
        className="min-h-12 w-full shrink-0 border-b bg-transparent px-4 text-base outline-none placeholder:text-soft"
      />
      <Command.List label="What fits" className="min-h-0 overflow-y-auto pb-2">
        {typed === ''
          ? listAll(entries, recent).map(({ heading, entries: list }) => (
              <Command.Group
                key={heading}
                heading={heading}
                className="[&_[cmdk-group-heading]]:px-4 [&_[cmdk-group-heading]]:pt-3 [&_[cmdk-group-heading]]:pb-1 [&_[cmdk-group-heading]]:text-xs [&_[cmdk-group-heading]]:text-soft"
              >
                {list.map((entry) => line(entry, heading === entry.section ? '' : entry.section))}
              </Command.Group>
            ))
          : listFound(entries, typed, recent).map((entry) => line(entry, entry.section))}
        <Command.Empty className="px-4 py-4 text-soft">
          Nothing fits “{typed}”. Fewer letters fit more; polytopes are found by “50 7”, candidates by their
          key.
        </Command.Empty>
      </Command.List>
    </Command>
  )
}

function Line({ entry, aside, onChoose }: { entry: Entry; aside: string; onChoose: () => void }) {
  const { id, label, note, shortcut, unavailable } = entry
  return (
    <Command.Item
      value={id}
      disabled={Boolean(unavailable)}
      onSelect={onChoose}
      className="flex min-h-8 cursor-pointer items-center gap-x-3 border-l-2 border-transparent px-4 py-1 data-[disabled=true]:cursor-default data-[disabled=true]:text-soft data-[selected=true]:border-action data-[selected=true]:bg-action-wash"
    >
      <span className="min-w-0 flex-1 break-words">
        {label}
        {note && <span className="ml-3 text-xs whitespace-nowrap text-soft">{note}</span>}
        {unavailable && <span className="block text-xs">{unavailable}</span>}
      </span>
      <span className="flex shrink-0 items-center gap-2 text-xs text-soft">
        {aside}
        {shortcut && <kbd className="rounded border border-edge px-1 font-mono">{shortcut}</kbd>}
      </span>
    </Command.Item>
  )
}
