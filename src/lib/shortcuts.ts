import { useEffect, useRef, useSyncExternalStore } from 'react'
import { useRemembered } from './remembered.ts'

/** A single-key shortcut, defined once where it acts; the list under `?` is made from those that are active. */
export interface Shortcut {
  /** As KeyboardEvent.key, for instance 'v', '?', 'ArrowDown'. */
  key: string
  does: string
  group: string
}

interface Active extends Shortcut {
  run: (event: KeyboardEvent) => void
}

let active: readonly Active[] = []
const listeners = new Set<() => void>()

function change(next: readonly Active[]): void {
  active = next
  for (const listener of listeners) listener()
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

const typing =
  'input:not([type=checkbox]):not([type=radio]), textarea, select, [contenteditable=true], [role=dialog], [role=menu]'

/** Runs the shortcut that fits, unless a person is typing or a dialog is open. Returns whether one ran. */
export function dispatchShortcut(event: KeyboardEvent): boolean {
  if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return false
  if (event.target instanceof Element && event.target.closest(typing)) return false
  const found = [...active].reverse().find((shortcut) => shortcut.key === event.key)
  if (!found) return false
  event.preventDefault()
  found.run(event)
  return true
}

export function useShortcut(shortcut: Shortcut, run: (event: KeyboardEvent) => void, enabled = true): void {
  const latest = useRef(run)
  useEffect(() => {
    latest.current = run
  })
  const { key, does, group } = shortcut
  useEffect(() => {
    if (!enabled) return
    const entry: Active = { key, does, group, run: (event) => latest.current(event) }
    change([...active, entry])
    return () => change(active.filter((other) => other !== entry))
  }, [key, does, group, enabled])
}

export function useActiveShortcuts(): readonly Shortcut[] {
  return useSyncExternalStore(subscribe, () => active)
}

/** Single-key shortcuts can be switched off (WCAG 2.1.4); `?` then still opens the list. */
export function useShortcutsOn(): [boolean, (on: boolean) => void] {
  const [value, set] = useRemembered('shortcuts')
  return [value !== 'off', (on) => set(on ? null : 'off')]
}
