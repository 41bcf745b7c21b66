import { type Scope } from '../../../shared/polytopes.ts'
import { filterWords } from '../../lib/filterWords.ts'
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
  if (scope.kind === 'collection') return scope.name ? `the collection “${scope.name}”` : 'a collection'
  const parts = filterWords(scope.filter).map(({ words }) => words)
  return parts.length > 0 ? `all polytopes with ${parts.join(', ')}` : 'the whole library'
}
