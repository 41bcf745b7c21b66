import { useEffect, useState } from 'react'
import { useIsFetching } from '@tanstack/react-query'

/** Whether the first page has all its data and has come to rest: then what is not needed at once may be fetched. */
export function useAtRest(): boolean {
  const waits = useIsFetching() > 0
  const [atRest, setAtRest] = useState(!('requestIdleCallback' in window))
  useEffect(() => {
    if (atRest || waits) return
    const idle = window.requestIdleCallback(() => setAtRest(true), { timeout: 2_000 })
    return () => window.cancelIdleCallback(idle)
  }, [atRest, waits])
  return atRest
}
