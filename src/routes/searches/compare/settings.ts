import { type ComparedSearch } from '../../../../shared/comparisons.ts'

export interface Setting {
  name: string
  /** What is compared. */
  read: (search: ComparedSearch) => string | number | boolean
  differs: boolean
}

const settings: readonly Omit<Setting, 'differs'>[] = [
  { name: 'Target', read: ({ targetVersionId }) => targetVersionId },
  { name: 'Rule', read: ({ rule }) => rule },
  { name: 'Scope', read: ({ scope }) => JSON.stringify(scope) },
  { name: 'Polytopes', read: ({ polytopes }) => polytopes },
  { name: 'Method', read: ({ method }) => method },
  { name: 'Budget', read: ({ budget }) => budget },
  { name: 'Extensions', read: ({ extensions }) => extensions.map((more) => `+${more}`).join(', ') || 'none' },
  {
    name: 'Begun from',
    read: ({ starts }) => (starts?.used ? `${starts.count} candidates: ${starts.name}` : 'nothing given'),
  },
  { name: 'Islands', read: ({ islands }) => islands },
  { name: 'Seed', read: ({ seed }) => seed },
  { name: 'Surrogate', read: ({ surrogate }) => (surrogate ? 'on' : 'off') },
  { name: 'Descents', read: ({ settings: { descents } }) => descents ?? 'default' },
  { name: 'Patience', read: ({ settings: { patience } }) => patience ?? 'default' },
  { name: 'Keep the best', read: ({ keep }) => keep },
  { name: 'Engine', read: ({ engineVersion }) => engineVersion },
]

/** All settings of searches, each with whether any two disagree in it. */
export function settingsOf(searches: readonly ComparedSearch[]): Setting[] {
  return settings.map((setting) => ({
    ...setting,
    differs: new Set(searches.map(setting.read)).size > 1,
  }))
}
