import { useId } from 'react'
import { useActions } from '../actions/useActions.ts'

export { dispatchShortcut } from '../actions/keys.ts'

export interface Shortcut {
  key: string
  does: string
  group: string
}

/** One action with one key. */
export function useShortcut({ key, does, group }: Shortcut, run: () => void, enabled = true): void {
  const id = useId()
  useActions(enabled ? [{ id, label: does, section: group, shortcut: key, run }] : [])
}
