import { useCallback, useMemo } from 'react'
import { scopeSchema, type Scope } from '../../../shared/polytopes.ts'
import { useRemembered } from '../../lib/remembered.ts'

const first: Scope = { kind: 'filter', filter: { h11Max: 4 } }

/** The scope previews are drawn from, kept per campaign in this browser. */
export function useWorkScope(campaign: string): [Scope, (scope: Scope) => void] {
  const [stored, store] = useRemembered(`scope.${campaign}`)
  const scope = useMemo(() => {
    if (stored === null) return first
    try {
      const parsed = scopeSchema.safeParse(JSON.parse(stored))
      return parsed.success ? parsed.data : first
    } catch {
      return first
    }
  }, [stored])
  const set = useCallback((next: Scope) => store(JSON.stringify(next)), [store])
  return [scope, set]
}
