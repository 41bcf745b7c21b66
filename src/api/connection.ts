import { useEffect, useSyncExternalStore } from 'react'
import { useQueryClient } from '@tanstack/react-query'

/**
 * Whether the server can be reached, as the requests and the event stream of this tab find it. A lost connection is
 * tried again by asking the health endpoint, at growing intervals and at once when the browser says it is online.
 */
let lost = false
const listeners = new Set<() => void>()
const reached = new Set<() => void>()

function change(next: boolean): void {
  if (lost === next) return
  lost = next
  for (const listener of listeners) listener()
  if (!next) for (const listener of [...reached]) listener()
}

export const noteLost = (): void => change(true)
export const noteReached = (): void => change(false)

/** Calls back when a lost connection is there again; returns the function that stops it. */
export function onReached(listener: () => void): () => void {
  reached.add(listener)
  return () => reached.delete(listener)
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

const waits = [1_000, 2_000, 4_000, 8_000]

/** Asks whether the server is there. */
async function probe(): Promise<void> {
  const answer = await fetch('/api/health', { cache: 'no-store' }).catch(() => null)
  // A gateway that answers for a server that is away is not the server.
  if (answer && answer.status !== 502 && answer.status !== 504) noteReached()
  else noteLost()
}

/** Something broke off that may or may not mean that the server is away. */
export const suspectLoss = (): void => void probe()

/** Watches the connection for a tab and says whether it is lost; what could not be loaded is loaded when it is back. */
export function useConnectionLost(): boolean {
  const client = useQueryClient()
  const isLost = useSyncExternalStore(subscribe, () => lost)
  useEffect(() => {
    const offline = () => noteLost()
    window.addEventListener('offline', offline)
    return () => window.removeEventListener('offline', offline)
  }, [])
  useEffect(
    () =>
      onReached(
        () =>
          void client.refetchQueries({ type: 'active', predicate: ({ state }) => state.status === 'error' }),
      ),
    [client],
  )
  useEffect(() => {
    if (!isLost) return
    let timer: ReturnType<typeof setTimeout>
    let attempt = 0
    const next = () => {
      timer = setTimeout(() => void probe().then(next), waits[Math.min(attempt++, waits.length - 1)])
    }
    next()
    const online = () => void probe()
    window.addEventListener('online', online)
    return () => {
      clearTimeout(timer)
      attempt = Infinity
      window.removeEventListener('online', online)
    }
  }, [isLost])
  return isLost
}
