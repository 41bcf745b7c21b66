import { lazy, useEffect } from 'react'
import { Search } from 'lucide-react'
import { ariaShortcut, shortcutName } from '../../actions/keys.ts'
import { Button } from '../ui/Button.tsx'

const load = () => import('../palette/ActionPalette.tsx')

/** Fetched when the page has come to rest, or earlier when it is asked for. */
export const ActionPalette = lazy(async () => ({ default: (await load()).ActionPalette }))

export function PaletteButton({ onOpen }: { onOpen: () => void }) {
  useEffect(() => {
    if (!('requestIdleCallback' in window)) return
    const idle = window.requestIdleCallback(() => void load(), { timeout: 10_000 })
    return () => window.cancelIdleCallback(idle)
  }, [])
  const chord = shortcutName('Mod+k')
  return (
    <Button
      kind="quiet"
      aria-label="Actions"
      aria-keyshortcuts={ariaShortcut('Mod+k')}
      title={`Find an action or a thing (${chord})`}
      onClick={onOpen}
    >
      <Search size={16} aria-hidden />
      <kbd
        aria-hidden
        className="hidden rounded border border-edge px-1 font-mono text-xs text-soft lg:inline"
      >
        {chord}
      </kbd>
    </Button>
  )
}
