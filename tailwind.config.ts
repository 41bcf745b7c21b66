import type { Config } from 'tailwindcss'

/** Names of our tokens; their values, for both themes, are custom properties in src/styles.css. */
export default {
  content: ['./index.html', './src/**/*.{ts,tsx}'],
  theme: {
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      paper: 'var(--paper)',
      sheet: 'var(--sheet)',
      line: 'var(--line)',
      edge: 'var(--edge)',
      veil: 'var(--veil)',
      ink: 'var(--ink)',
      soft: 'var(--ink-soft)',
      action: 'var(--action)',
      'action-wash': 'var(--action-wash)',
      'on-action': 'var(--on-action)',
      found: 'var(--found)',
      'found-fill': 'var(--found-fill)',
      'found-wash': 'var(--found-wash)',
      null: 'var(--null)',
      'null-wash': 'var(--null-wash)',
      verified: 'var(--verified)',
      rejected: 'var(--rejected)',
      'rejected-wash': 'var(--rejected-wash)',
    },
    fontFamily: {
      serif: ['"Source Serif 4 Variable"', 'Georgia', 'serif'],
      sans: ['"IBM Plex Sans Variable"', 'system-ui', 'sans-serif'],
      mono: ['"JetBrains Mono Variable"', 'ui-monospace', 'monospace'],
    },
    fontSize: {
      xs: ['0.75rem', '1rem'],
      sm: ['0.875rem', '1.25rem'],
      base: ['1rem', '1.5rem'],
      lg: ['1.25rem', '1.75rem'],
      xl: ['1.75rem', '2.25rem'],
    },
    borderRadius: { none: '0', DEFAULT: '4px', full: '9999px' },
    boxShadow: { lifted: '0 8px 24px -8px rgb(0 0 0 / 0.28)', none: 'none' },
    screens: { sm: '600px', md: '900px', lg: '1200px', xl: '1440px' },
  },
} satisfies Config
