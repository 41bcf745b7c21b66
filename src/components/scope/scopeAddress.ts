import { type Scope } from '../../../shared/polytopes.ts'
import { readFilter } from '../../lib/libraryAddress.ts'

/** The scope an address names: `polytopes=key,key` or the library's filter words. */
export function scopeFromAddress(search: URLSearchParams): Scope | null {
  const keys = (search.get('polytopes') ?? '').split(',').filter((key) => /^[0-9a-f]{32}$/.test(key))
  if (keys.length > 0) return { kind: 'polytopes', keys }
  const filter = readFilter(search)
  return Object.keys(filter).length > 0 ? { kind: 'filter', filter } : null
}

/** One line for a scope. */
export function describeScope(scope: Scope): string {
  if (scope.kind === 'polytopes')
    return scope.keys.length === 1 ? 'one polytope' : `${scope.keys.length} chosen polytopes`
  const { filter } = scope
  const parts: string[] = []
  const range = (name: string, low?: number, high?: number) => {
    if (low !== undefined && low === high) parts.push(`${name} = ${low}`)
    else if (low !== undefined && high !== undefined) parts.push(`${name} from ${low} to ${high}`)
    else if (low !== undefined) parts.push(`${name} ≥ ${low}`)
    else if (high !== undefined) parts.push(`${name} ≤ ${high}`)
  }
  range('h11', filter.h11Min, filter.h11Max)
  range('h21', filter.h21Min, filter.h21Max)
  range('points', undefined, filter.pointsMax)
  if (filter.favourable) parts.push(filter.favourable === 'yes' ? 'favourable' : 'not favourable')
  if (filter.origin) parts.push(filter.origin)
  if (filter.text) parts.push(`name contains “${filter.text}”`)
  return parts.length > 0 ? `all polytopes with ${parts.join(', ')}` : 'the whole library'
}
