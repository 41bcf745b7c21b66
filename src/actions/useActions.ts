import { useEffect, useRef, useSyncExternalStore } from 'react'
import { useNavigate } from 'react-router-dom'
import { saveFrom } from '../lib/saveFile.ts'
import { liveActions, registerActions, subscribeToActions, type Action, type LiveAction } from './registry.ts'

/** Actions without what they do: they are the same for everyone who looks while this text is the same. */
const outside = (actions: readonly Action[]): string =>
  JSON.stringify(
    actions.map(({ id, label, section, shortcut, unavailable }) => [
      id,
      label,
      section,
      shortcut,
      unavailable,
    ]),
  )

/** Keeps actions in the registry while the component is mounted; what they do may change with every drawing. */
export function useActions(actions: readonly Action[]): void {
  const navigate = useNavigate()
  const latest = useRef(actions)
  useEffect(() => {
    latest.current = actions
  })
  const face = outside(actions)
  useEffect(() => {
    const perform = (id: string) => {
      const action = latest.current.find((one) => one.id === id)
      if (!action || action.unavailable) return
      if (action.to !== undefined) void navigate(action.to)
      else if (action.file !== undefined) saveFrom(action.file)
      else action.run()
    }
    const entries = latest.current.map(
      ({ id, label, section, shortcut, unavailable, standing }): LiveAction => ({
        ...{ id, label, section, shortcut, unavailable, standing },
        run: () => perform(id),
      }),
    )
    return registerActions(entries)
  }, [face, navigate])
}

/** What can be done now. */
export const useLiveActions = (): readonly LiveAction[] =>
  useSyncExternalStore(subscribeToActions, liveActions)
