import { useSyncExternalStore } from 'react'
import { recall, remember, useRemembered } from './remembered.ts'

export type Theme = 'system' | 'light' | 'dark'

function chosen(): Theme {
  const value = recall('theme')
  return value === 'light' || value === 'dark' ? value : 'system'
}

/** Puts the remembered theme on the root element; without one the style sheet follows the system. */
export function applyTheme(): void {
  const theme = chosen()
  if (theme === 'system') delete document.documentElement.dataset.theme
  else document.documentElement.dataset.theme = theme
}

export function useTheme(): [Theme, (theme: Theme) => void] {
  const [value] = useRemembered('theme')
  const set = (theme: Theme) => {
    remember('theme', theme === 'system' ? null : theme)
    applyTheme()
  }
  return [value === 'light' || value === 'dark' ? value : 'system', set]
}

const systemDark = () => window.matchMedia('(prefers-color-scheme: dark)')

function subscribe(listener: () => void): () => void {
  const query = systemDark()
  query.addEventListener('change', listener)
  return () => query.removeEventListener('change', listener)
}

/** Whether the dark theme is showing now: for what is drawn on a canvas and cannot follow the style sheet. */
export function useDark(): boolean {
  const [theme] = useTheme()
  const dark = useSyncExternalStore(subscribe, () => systemDark().matches)
  return theme === 'system' ? dark : theme === 'dark'
}
