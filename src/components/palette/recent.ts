import { recall, remember } from '../../lib/remembered.ts'

const kept = 12
const key = 'recent-actions'

/** Names of what was chosen last from the palette, newest first. */
export function recentNames(): readonly string[] {
  try {
    const names: unknown = JSON.parse(recall(key) ?? '[]')
    return Array.isArray(names) ? names.filter((name) => typeof name === 'string') : []
  } catch {
    return []
  }
}

export function noteRecent(name: string): void {
  remember(key, JSON.stringify([name, ...recentNames().filter((one) => one !== name)].slice(0, kept)))
}
