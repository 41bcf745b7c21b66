import { recall, useRemembered } from '../lib/remembered.ts'
import { liveActions, shortcutsOf, type LiveAction } from './registry.ts'

const typing = 'input:not([type=checkbox]):not([type=radio]), textarea, select, [contenteditable=true]'
const inFront = '[role=dialog], [role=alertdialog], [role=menu]'

/** The name a key press goes by in `shortcut`: 's', 'Shift+ArrowUp' or 'Mod+s'; null for presses that are never shortcuts. */
function pressed(event: KeyboardEvent): string | null {
  if (event.altKey || event.isComposing) return null
  if (!event.ctrlKey && !event.metaKey) {
    return event.shiftKey && event.key.startsWith('Arrow') ? `Shift+${event.key}` : event.key
  }
  return `Mod+${event.shiftKey ? 'Shift+' : ''}${event.key.length === 1 ? event.key.toLowerCase() : event.key}`
}

/**
 * Runs the action whose shortcut this is. Single keys do nothing while a person types or when they are switched
 * off (WCAG 2.1.4; `?` still opens the list); no shortcut acts behind an open dialog or menu. An action that is
 * unavailable is handed to `refuse`, so that its reason can be shown. Returns whether the press was a shortcut.
 */
export function dispatchShortcut(
  event: KeyboardEvent,
  refuse: (action: LiveAction) => void = () => {},
): boolean {
  if (event.defaultPrevented) return false
  const key = pressed(event)
  if (key === null) return false
  const target = event.target instanceof Element ? event.target : null
  if (target?.closest(inFront)) return false
  const single = !key.startsWith('Mod+')
  if (single && target?.closest(typing)) return false
  if (single && key !== '?' && recall(onOff) === 'off') return false
  const found = liveActions().find((action) => shortcutsOf(action).includes(key))
  if (!found) return false
  event.preventDefault()
  // A key that is held down steps on, but saves once.
  if (!single && event.repeat) return true
  if (found.unavailable) refuse(found)
  else found.run()
  return true
}

const onOff = 'shortcuts'

/** Single-key shortcuts can be switched off. */
export function useShortcutsOn(): [boolean, (on: boolean) => void] {
  const [value, set] = useRemembered(onOff)
  return [value !== 'off', (on) => set(on ? null : 'off')]
}

const keyNames: Record<string, string> = {
  ArrowUp: '↑',
  ArrowDown: '↓',
  ArrowLeft: '←',
  ArrowRight: '→',
}

const onMac = (): boolean => typeof navigator !== 'undefined' && /Mac|iPhone|iPad/.test(navigator.userAgent)

/** A shortcut as it is written on keys: 'Ctrl S', 'v', '↓'. */
export function shortcutName(shortcut: string): string {
  const parts = shortcut.split('+')
  if (shortcut === '+' || parts.length === 1) return keyNames[shortcut] ?? shortcut
  return parts
    .map((part) =>
      part === 'Mod'
        ? onMac()
          ? 'Cmd'
          : 'Ctrl'
        : (keyNames[part] ?? (part.length === 1 ? part.toUpperCase() : part)),
    )
    .join(' ')
}

/** The same for `aria-keyshortcuts`: 'Control+S'. */
export const ariaShortcut = (shortcut: string): string =>
  shortcut.replace('Mod', onMac() ? 'Meta' : 'Control')
