import { useMemo, useRef, useState } from 'react'

export interface Selection {
  /** Selected keys among those shown, in their order. */
  readonly keys: readonly string[]
  has(key: string): boolean
  /** Selects or lets go; with `range` also everything between the last one touched and this. */
  toggle(key: string, range?: boolean): void
  /** All of those shown, or none when all are. */
  toggleAll(): void
  clear(): void
}

/** Which rows of a table are selected. What is not shown any more is not selected either. */
export function useSelection(shown: readonly string[]): Selection {
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set())
  const last = useRef<string | null>(null)
  return useMemo(() => {
    const keys = shown.filter((key) => chosen.has(key))
    return {
      keys,
      has: (key) => chosen.has(key),
      toggle(key, range = false) {
        const from = last.current === null ? -1 : shown.indexOf(last.current)
        const to = shown.indexOf(key)
        const touched = range && from >= 0 ? shown.slice(Math.min(from, to), Math.max(from, to) + 1) : [key]
        const on = !chosen.has(key)
        const next = new Set(chosen)
        for (const one of touched) {
          if (on) next.add(one)
          else next.delete(one)
        }
        last.current = key
        setChosen(next)
      },
      toggleAll: () => setChosen(new Set(keys.length === shown.length ? [] : shown)),
      clear: () => setChosen(new Set()),
    }
  }, [shown, chosen])
}
