import { assemblySchema, type AssemblySettings, type ParetoAxis } from '../../../../shared/assemblies.ts'

/** What the address of the assembly page says: sources, version, and every choice, so that it can be linked to. */
export interface AssemblyAddress {
  searchIds: string[]
  /** Empty: as the searches ran. */
  versionId: string
  settings: AssemblySettings
}

const whole = (text: string | null): number | null =>
  text !== null && /^\d{1,6}$/.test(text) ? Number(text) : null

const axisPattern = /^(max|min) (.+)$/

/** A part that does not fit its form is left out. */
export function readAssembly(address: URLSearchParams): AssemblyAddress {
  const axes = address.getAll('axis').flatMap((text): ParetoAxis[] => {
    const found = axisPattern.exec(text)
    return found ? [{ direction: found[1] as ParetoAxis['direction'], column: found[2]! }] : []
  })
  const usual = assemblySchema.parse({ feasibleOnly: true })
  const settings = { ...usual, feasibleOnly: address.get('infeasible') !== 'yes' }
  const given = {
    size: whole(address.get('size')) ?? usual.size,
    perPolytope: whole(address.get('polytope')),
    apart: whole(address.get('apart')),
    perInvariants: whole(address.get('invariants')),
    pareto: axes.length === 0 ? null : axes,
  }
  for (const [name, value] of Object.entries(given)) {
    const parsed = assemblySchema.safeParse({ ...settings, [name]: value })
    if (parsed.success) Object.assign(settings, parsed.data)
  }
  return {
    searchIds: [...new Set(address.getAll('search'))],
    versionId: address.get('version') ?? '',
    settings,
  }
}

export function assemblyAddress({ searchIds, versionId, settings }: AssemblyAddress): URLSearchParams {
  const address = new URLSearchParams()
  for (const id of searchIds) address.append('search', id)
  if (versionId !== '') address.set('version', versionId)
  if (settings.size !== 50) address.set('size', String(settings.size))
  if (!settings.feasibleOnly) address.set('infeasible', 'yes')
  if (settings.perPolytope !== null) address.set('polytope', String(settings.perPolytope))
  if (settings.apart !== null) address.set('apart', String(settings.apart))
  if (settings.perInvariants !== null) address.set('invariants', String(settings.perInvariants))
  for (const { column, direction } of settings.pareto ?? []) address.append('axis', `${direction} ${column}`)
  return address
}

/** Address of the assembly page with some searches chosen. */
export const assemblyPath = (campaign: string, searchIds: readonly string[]): string =>
  `/campaigns/${campaign}/shortlists/new?${searchIds.map((id) => `search=${encodeURIComponent(id)}`).join('&')}`
