import { useEffect } from 'react'
import { useBlocker } from 'react-router-dom'

/** Asks before a page with unsaved changes is left, inside the application and for the whole tab. */
export function useLeaveGuard(unsaved: boolean) {
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) => unsaved && currentLocation.pathname !== nextLocation.pathname,
  )
  useEffect(() => {
    if (!unsaved) return
    const ask = (event: BeforeUnloadEvent) => event.preventDefault()
    window.addEventListener('beforeunload', ask)
    return () => window.removeEventListener('beforeunload', ask)
  }, [unsaved])
  return blocker
}
