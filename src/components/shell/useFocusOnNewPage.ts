import { useEffect, useRef } from 'react'
import { useLocation } from 'react-router-dom'

/** Where a new page took away what had the focus, the focus goes to the page's content instead of nowhere. */
export function useFocusOnNewPage(): void {
  const { pathname } = useLocation()
  const before = useRef(pathname)
  useEffect(() => {
    if (before.current === pathname) return
    before.current = pathname
    if (document.activeElement === null || document.activeElement === document.body)
      document.getElementById('content')?.focus({ preventScroll: true })
  }, [pathname])
}
