import { useMutation, useQueryClient } from '@tanstack/react-query'
import { reissuedSchema, type Reissue } from '../../shared/reissues.ts'
import { shortlistQuery } from './shortlists.ts'
import { request } from './request.ts'

/** Makes a newer issue of a list. */
export function useReissue(campaign: string, shortlist: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: Reissue) =>
      request(`/campaigns/${campaign}/shortlists/${shortlist}/reissues`, {
        method: 'POST',
        body,
        schema: reissuedSchema,
      }),
    onSuccess: () => {
      void client.invalidateQueries({ queryKey: shortlistQuery(campaign, shortlist).queryKey })
      void client.invalidateQueries({ queryKey: ['shortlists', campaign] })
      void client.invalidateQueries({ queryKey: ['rescorings', campaign] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
    },
  })
}
