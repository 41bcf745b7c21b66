import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import { externalTableSchema, type UploadExternal } from '../../shared/externalTables.ts'
import { request } from './request.ts'

/** The tables of external columns that a list shows. */
export const externalTablesQuery = (campaign: string, shortlist: string) =>
  queryOptions({
    queryKey: ['external-tables', campaign, shortlist] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/external-tables`, {
        schema: z.array(externalTableSchema),
        query: { shortlist },
        signal,
      }),
  })

function useRenewal(campaign: string) {
  const client = useQueryClient()
  return () => {
    void client.invalidateQueries({ queryKey: ['external-tables', campaign] })
    void client.invalidateQueries({ queryKey: ['shortlist'] })
  }
}

export function useUploadExternal(campaign: string) {
  const renew = useRenewal(campaign)
  return useMutation({
    mutationFn: (body: UploadExternal) =>
      request(`/campaigns/${campaign}/external-tables`, {
        method: 'POST',
        body,
        schema: externalTableSchema,
      }),
    onSuccess: renew,
  })
}

export function useRemoveExternal(campaign: string) {
  const renew = useRenewal(campaign)
  return useMutation({
    mutationFn: (table: string) =>
      request(`/campaigns/${campaign}/external-tables/${table}`, { method: 'DELETE' }),
    onSuccess: renew,
  })
}
