import { useEffect, useRef, useState, type RefObject } from 'react'

/** Width in pixels of the element the ref is put on, followed as it changes. */
export function useWidth<Kind extends HTMLElement>(initial: number): [RefObject<Kind | null>, number] {
  const ref = useRef<Kind>(null)
  const [width, setWidth] = useState(initial)
  useEffect(() => {
    const element = ref.current
    if (!element || typeof ResizeObserver === 'undefined') return
    const observer = new ResizeObserver(([entry]) => {
      if (entry && entry.contentRect.width > 0) setWidth(Math.floor(entry.contentRect.width))
    })
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  return [ref, width]
}
