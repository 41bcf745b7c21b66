import { useLayoutEffect, useRef, useState, type RefObject } from 'react'

/**
 * Width in pixels of the element the ref is put on, followed as it changes; measured before the first paint, so that
 * nothing moves after it.
 */
export function useWidth<Kind extends HTMLElement>(initial: number): [RefObject<Kind | null>, number] {
  const ref = useRef<Kind>(null)
  const [width, setWidth] = useState(initial)
  useLayoutEffect(() => {
    const element = ref.current
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
