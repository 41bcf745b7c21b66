import { Monitor, Moon, Sun } from 'lucide-react'
import { IconButton } from '../ui/Button.tsx'
import { useTheme, type Theme } from '../../lib/theme.ts'

const next: Record<Theme, Theme> = { system: 'light', light: 'dark', dark: 'system' }
const shapes = { system: Monitor, light: Sun, dark: Moon }

/** Steps through the themes: as the system has it, light, dark. */
export function ThemeButton() {
  const [theme, setTheme] = useTheme()
  const Shape = shapes[theme]
  const now = theme === 'system' ? 'as the system' : theme
  const then = next[theme] === 'system' ? 'as the system' : next[theme]
  return (
    <IconButton label={`Theme: ${now}. Change to: ${then}`} onClick={() => setTheme(next[theme])}>
      <Shape size={16} aria-hidden />
    </IconButton>
  )
}
