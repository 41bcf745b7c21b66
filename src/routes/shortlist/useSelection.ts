import { useMemo, useRef, useState } from 'react'

export interface Selection {
  /** Selected keys among those shown, in their order. */
  readonly keys: readonly string[]
  has(key: string): boolean
  /** Selects or lets go; with `range` also everything between the last one touched and this. */
  toggle(key: string, range?: boolean): void
  /** Adds everything between two rows, both included. */
  extend(from: string, to: string): void
  /** These and no others. */
  only(keys: readonly string[]): void
  /** All of those shown, or none when all are. */
  toggleAll(): void
  clear(): void
}

/** Which rows of a table are selected. What is not shown any more is not selected either. */
export function useSelection(shown: readonly string[]): Selection {
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set())
  const last = useRef<string | null>(null)
  return useMemo(() => {
    const keys = chosen.size === 0 ? [] : shown.filter((key) => chosen.has(key))
    const between = (from: string | null, key: string) => {
      const [a, b] = [from === null ? -1 : shown.indexOf(from), shown.indexOf(key)]
      return a < 0 || b < 0 ? [key] : shown.slice(Math.min(a, b), Math.max(a, b) + 1)
    }
    return {
      keys,
      has: (key) => chosen.has(key),
      toggle(key, range = false) {
        const touched = range ? between(last.current, key) : [key]
        const on = range || !chosen.has(key)
        const next = new Set(chosen)
        for (const one of touched) {
          if (on) next.add(one)
          else next.delete(one)
        }
        last.current = key
        setChosen(next)
      },
      extend(from, to) {
        last.current = to
        setChosen((before) => new Set([...before, ...between(from, to)]))
      },
      only: (wanted) => setChosen(new Set(wanted)),
      toggleAll: () => setChosen(new Set(keys.length === shown.length ? [] : shown)),
      clear: () => setChosen(new Set()),
    }
  }, [shown, chosen])
}
