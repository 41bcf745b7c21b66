import { useCallback, useState, type RefCallback } from 'react'

/**
 * Width in pixels of the element the ref is put on, followed as it changes; measured before the first paint, so that
 * nothing moves after it. Until there is an element with a width, `initial` or what fits the window.
 */
export function useWidth<Kind extends HTMLElement>(initial: number): [RefCallback<Kind>, number] {
  const [width, setWidth] = useState(() => Math.min(initial, window.innerWidth - 32))
  // A callback, because the element comes and goes, as when a chart is shown as a table.
  const ref = useCallback((element: Kind | null) => {
    if (!element) return
    if (element.clientWidth > 0) setWidth(element.clientWidth)
    if (typeof ResizeObserver === 'undefined') return
    const observer = new ResizeObserver(([entry]) => {
      if (entry && entry.contentRect.width > 0) setWidth(Math.floor(entry.contentRect.width))
    })
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  return [ref, width]
}
