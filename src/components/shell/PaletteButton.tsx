import { lazy } from 'react'
import { Search } from 'lucide-react'
import { ariaShortcut, shortcutName } from '../../actions/keys.ts'
import { Button } from '../ui/Button.tsx'

export const preparePalette = () => import('../palette/ActionPalette.tsx')

export const ActionPalette = lazy(async () => ({ default: (await preparePalette()).ActionPalette }))

export function PaletteButton({ onOpen }: { onOpen: () => void }) {
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
