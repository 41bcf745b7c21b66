import { useCallback, useState } from 'react'

/**
 * Whether an element has come near the window yet: for what is fetched only when somebody is about to see it. Once
 * seen it stays seen; it counts as seen where nothing tells (and on paper, which shows all).
 */
export function useSeen(): [ref: (element: Element | null) => (() => void) | undefined, seen: boolean] {
  const [seen, setSeen] = useState(() => typeof IntersectionObserver === 'undefined')
  const ref = useCallback((element: Element | null) => {
    if (element === null || typeof IntersectionObserver === 'undefined') return undefined
    const observer = new IntersectionObserver(
      (entries) => {
        if (entries.some(({ isIntersecting }) => isIntersecting)) setSeen(true)
      },
      { rootMargin: '400px' },
    )
    observer.observe(element)
    const onPrint = () => setSeen(true)
    window.addEventListener('beforeprint', onPrint)
    return () => {
      observer.disconnect()
      window.removeEventListener('beforeprint', onPrint)
    }
  }, [])
  return [ref, seen]
}
