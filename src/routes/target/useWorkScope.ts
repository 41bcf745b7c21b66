import { useCallback, useMemo } from 'react'
import { scopeSchema, type Scope } from '../../../shared/polytopes.ts'
import { useRemembered } from '../../lib/remembered.ts'

const smallPolytopes: Scope = { kind: 'filter', filter: { h11Max: 4 } }

export interface WorkScope {
  readonly scope: Scope
  /** Where it is from, in words. */
  readonly origin: string
  readonly choose: (scope: Scope) => void
  /** Gives up what was chosen here for what it would be otherwise; null when nothing was chosen. */
  readonly release: { readonly label: string; readonly run: () => void } | null
}

/**
 * The scope previews are drawn from. Until one is chosen, which is kept per target in this browser, it is that of the
 * target's latest search: a hit rate means something only where the target is meant to be searched.
 *
 * @param place what the choice is kept under: a target's id, or the campaign's for a target not yet saved
 * @param proposed where nothing was searched yet: what a starter is meant for
 */
export function useWorkScope(place: string, searched: Scope | null, proposed: Scope | null): WorkScope {
  const [stored, store] = useRemembered(`scope.${place}`)
  const choose = useCallback((next: Scope) => store(JSON.stringify(next)), [store])
  return useMemo(() => {
    const own = readScope(stored)
    const otherwise = searched ?? proposed ?? smallPolytopes
    const from = searched
      ? 'the scope of its last search'
      : proposed
        ? 'what this starter is meant for'
        : 'small polytopes, until you choose'
    const chosen = own !== null && JSON.stringify(own) !== JSON.stringify(otherwise)
    const label = searched
      ? 'Follow the last search'
      : proposed
        ? 'What the starter is meant for'
        : 'Small polytopes'
    return {
      scope: own ?? otherwise,
      origin: chosen ? 'chosen here' : from,
      choose,
      release: chosen ? { label, run: () => store(null) } : null,
    }
  }, [stored, searched, proposed, choose, store])
}

/** A scope as it is kept in this browser; null when there is none, or it is none any more. */
export function readScope(stored: string | null): Scope | null {
  if (stored === null) return null
  try {
    return scopeSchema.safeParse(JSON.parse(stored)).data ?? null
  } catch {
    return null
  }
}
