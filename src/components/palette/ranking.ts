import { defaultFilter } from 'cmdk'

/** One line of the palette. */
export interface Entry {
  /** Lasting name, by which recent use is remembered. */
  readonly id: string
  readonly label: string
  readonly section: string
  readonly note?: string
  readonly shortcut?: string
  readonly unavailable?: string | false | null
  /** Answers what was typed exactly, as a key does: it stands first whatever its label is. */
  readonly exact?: boolean
  readonly run: () => void
}

export interface Group {
  readonly heading: string
  readonly entries: readonly Entry[]
}

const shownRecent = 5
const shownFound = 40
/** Between two that match alike, the one used lately comes first; it never passes one that matches much better. */
const recentWeight = 1.25

/** Everything by section, with what was used lately on top: what the palette shows before anything is typed. */
export function listAll(entries: readonly Entry[], recent: readonly string[]): Group[] {
  const lately = recent
    .flatMap((name) => entries.find(({ id, unavailable }) => id === name && !unavailable) ?? [])
    .slice(0, shownRecent)
  const sections = new Map<string, Entry[]>()
  for (const entry of entries) {
    if (lately.includes(entry)) continue
    sections.set(entry.section, [...(sections.get(entry.section) ?? []), entry])
  }
  const rest = [...sections].map(([heading, list]) => ({ heading, entries: list }))
  return lately.length > 0 ? [{ heading: 'Used lately', entries: lately }, ...rest] : rest
}

/** What fits the text, best first: letters may be left out, and both label and section are looked at. */
export function listFound(entries: readonly Entry[], text: string, recent: readonly string[]): Entry[] {
  const scored = entries.flatMap((entry) => {
    if (entry.exact) return [{ entry, score: Infinity }]
    const fit = defaultFilter?.(entry.label, text, [entry.section, `${entry.section} ${entry.label}`]) ?? 0
    if (fit < 0.02) return []
    return [
      { entry, score: fit * (recent.includes(entry.id) ? recentWeight : 1) * (entry.unavailable ? 0.8 : 1) },
    ]
  })
  return scored
    .sort((a, b) => b.score - a.score)
    .slice(0, shownFound)
    .map(({ entry }) => entry)
}
