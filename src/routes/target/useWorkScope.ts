import { useCallback, useMemo } from 'react'
import { scopeSchema, type Scope } from '../../../shared/polytopes.ts'
import { useRemembered } from '../../lib/remembered.ts'

const smallPolytopes: Scope = { kind: 'filter', filter: { h11Max: 4 } }

/**
 * The scope previews are drawn from, kept per target in this browser. Until one is chosen it is that of the
 * target's latest search: a hit rate means something only where the target is meant to be searched.
 *
 * @param place what the choice is kept under: a target's id, or the campaign's for a target not yet saved
 */
export function useWorkScope(place: string, searched: Scope | null): [Scope, (scope: Scope) => void] {
  const [stored, store] = useRemembered(`scope.${place}`)
  const scope = useMemo(() => readScope(stored) ?? searched ?? smallPolytopes, [stored, searched])
  const set = useCallback((next: Scope) => store(JSON.stringify(next)), [store])
  return [scope, set]
}

function readScope(stored: string | null): Scope | null {
  if (stored === null) return null
  try {
    return scopeSchema.safeParse(JSON.parse(stored)).data ?? null
  } catch {
    return null
  }
}
