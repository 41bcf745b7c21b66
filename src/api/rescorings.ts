import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import { rescoringSchema, type RequestRescoring, type Rescoring } from '../../shared/rescorings.ts'
import { request } from './request.ts'

/** Open requests to score lists anew and the last ones that ended, newest first. */
export const rescoringsQuery = (campaign: string) =>
  queryOptions({
    queryKey: ['rescorings', campaign] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/rescorings`, { schema: z.array(rescoringSchema), signal }),
  })

/** Puts a request in its newer form into the list; the lists it made are fetched when it has ended. */
export function placeRescoring(client: QueryClient, campaign: string, moved: Rescoring): void {
  client.setQueryData(rescoringsQuery(campaign).queryKey, (list) => {
    if (!list) return list
    return list.some(({ id }) => id === moved.id)
      ? list.map((one) => (one.id === moved.id ? moved : one))
      : [moved, ...list]
  })
  if (moved.state === 'finished') void client.invalidateQueries({ queryKey: ['shortlist'] })
}

export function useRequestRescoring(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: RequestRescoring) =>
      request(`/campaigns/${campaign}/rescorings`, { method: 'POST', body, schema: rescoringSchema }),
    onSuccess: (rescoring) => {
      placeRescoring(client, campaign, rescoring)
      void client.invalidateQueries({ queryKey: ['rescorings', campaign] })
    },
  })
}

export function useCancelRescoring(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (id: string) =>
      request(`/campaigns/${campaign}/rescorings/${id}/cancel`, { method: 'POST', schema: rescoringSchema }),
    onSettled: () => void client.invalidateQueries({ queryKey: ['rescorings', campaign] }),
  })
}
