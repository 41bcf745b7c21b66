import { createContext, useCallback, useContext, useSyncExternalStore } from 'react'

/** What is pointed at: a point (one index) or an edge (two), shared by all 2-faces that contain it. */
export type Highlight = readonly [number] | readonly [number, number] | null

/**
 * What is pointed at and what a click has kept, outside React's state: pointing redraws the few parts that show
 * it, not the page, which at the largest h11 has thousands of triangles.
 */
export class HighlightStore {
  #pointed: Highlight = null
  #kept: Highlight = null
  readonly #listeners = new Set<() => void>()

  /** Pointed at, else kept. */
  shown = (): Highlight => this.#pointed ?? this.#kept

  isKept = (): boolean => this.#pointed === null && this.#kept !== null

  point = (next: Highlight): void => {
    if (sameHighlight(this.#pointed, next)) return
    this.#pointed = next
    this.#tell()
  }

  /** Keeps it, or lets it go when it is kept already. */
  keep = (next: Highlight): void => {
    this.#kept = sameHighlight(this.#kept, next) ? null : next
    this.#tell()
  }

  subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener)
    return () => this.#listeners.delete(listener)
  }

  #tell(): void {
    for (const listener of this.#listeners) listener()
  }
}

export const sameHighlight = (a: Highlight, b: Highlight): boolean => a?.[0] === b?.[0] && a?.[1] === b?.[1]

export const HighlightContext = createContext<HighlightStore>(new HighlightStore())

export const useHighlightStore = (): HighlightStore => useContext(HighlightContext)

/** What is shown now, where `concerns` says that it matters here; null elsewhere, without being drawn again. */
export function useHighlight(concerns?: (highlight: NonNullable<Highlight>) => boolean): Highlight {
  const store = useHighlightStore()
  const read = useCallback(() => {
    const shown = store.shown()
    return shown && (!concerns || concerns(shown)) ? shown : null
  }, [store, concerns])
  return useSyncExternalStore(store.subscribe, read)
}
