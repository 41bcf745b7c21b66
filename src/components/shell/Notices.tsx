import { Toaster } from 'sonner'
import { useTheme } from '../../lib/theme.ts'

/** Where passing notices appear. */
export function Notices() {
  const [theme] = useTheme()
  return (
    <Toaster
      theme={theme}
      position="top-center"
      offset={{ top: 64 }}
      style={{ fontFamily: "'IBM Plex Sans Variable', system-ui, sans-serif" }}
      toastOptions={{
        style: {
          background: 'var(--sheet)',
          color: 'var(--ink)',
          borderColor: 'var(--edge)',
          borderRadius: 4,
          fontFamily: 'inherit',
          fontSize: 14,
        },
        actionButtonStyle: { background: 'var(--action)', color: 'var(--on-action)', borderRadius: 4 },
      }}
    />
  )
}
