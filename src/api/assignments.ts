import { useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query'
import { assignedSchema, type Assign, type Assigned } from '../../shared/assignments.ts'
import { type ShortlistDetail } from '../../shared/shortlists.ts'
import { request } from './request.ts'

/** Puts into every list of the target that is in the cache who is to judge which candidates. */
export function placeAssignment(client: QueryClient, { targetId, candidateKeys, assignee }: Assigned): void {
  const keys = new Set(candidateKeys)
  client.setQueriesData<ShortlistDetail>({ queryKey: ['shortlist'] }, (list) => {
    if (!list || list.targetId !== targetId) return list
    const rows = list.rows.map((row) => (keys.has(row.candidateKey) ? { ...row, assignee } : row))
    return { ...list, rows }
  })
}

export function useAssign(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: Assign) =>
      request(`/campaigns/${campaign}/assignments`, { method: 'POST', body, schema: assignedSchema }),
    onSuccess: (assigned) => {
      placeAssignment(client, assigned)
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
    },
  })
}
