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
  /** A thing with a name, of which there may be hundreds: without a text the first of them are shown. */
  readonly named?: boolean
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
const shownNamed = 6
/** Letters strewn over a long label are no find. */
const leastFit = 0.05
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
    const list = sections.get(entry.section) ?? []
    if (entry.named && list.length >= shownNamed) continue
    sections.set(entry.section, [...list, entry])
  }
  const rest = [...sections].map(([heading, list]) => ({ heading, entries: list }))
  return lately.length > 0 ? [{ heading: 'Used lately', entries: lately }, ...rest] : rest
}

const fitOf = ({ label, section }: Entry, text: string): number =>
  defaultFilter?.(label, text, [section]) ?? 0

/** How well a text fits, as a whole or word by word in any order; 0 where a word does not. */
function fit(entry: Entry, text: string): number {
  const words = text.split(/\s+/)
  const each = words.map((word) => fitOf(entry, word))
  const together = each.includes(0) ? 0 : each.reduce((product, one) => product * one, 1) ** (1 / each.length)
  return Math.max(fitOf(entry, text), 0.9 * together)
}

/** What fits the text, best first: letters may be left out, and both label and section are looked at. */
export function listFound(entries: readonly Entry[], text: string, recent: readonly string[]): Entry[] {
  const scored = entries.flatMap((entry) => {
    if (entry.exact) return [{ entry, score: Infinity }]
    const fits = fit(entry, text)
    if (fits < leastFit) return []
    return [
      { entry, score: fits * (recent.includes(entry.id) ? recentWeight : 1) * (entry.unavailable ? 0.8 : 1) },
    ]
  })
  return scored
    .sort((a, b) => b.score - a.score)
    .slice(0, shownFound)
    .map(({ entry }) => entry)
}
