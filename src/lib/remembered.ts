import { useCallback, useSyncExternalStore } from 'react'

/** Small preferences kept in this browser. A browser that refuses storage keeps them until the page is left. */
const fallback = new Map<string, string>()
const listeners = new Set<() => void>()

export function recall(key: string): string | null {
  try {
    return window.localStorage.getItem(`tessellary.${key}`)
  } catch {
    return fallback.get(key) ?? null
  }
}

export function remember(key: string, value: string | null): void {
  try {
    if (value === null) window.localStorage.removeItem(`tessellary.${key}`)
    else window.localStorage.setItem(`tessellary.${key}`, value)
  } catch {
    if (value === null) fallback.delete(key)
    else fallback.set(key, value)
  }
  for (const listener of listeners) listener()
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

export function useRemembered(key: string): [string | null, (value: string | null) => void] {
  const value = useSyncExternalStore(subscribe, () => recall(key))
  const set = useCallback((next: string | null) => remember(key, next), [key])
  return [value, set]
}
