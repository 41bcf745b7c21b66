import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import {
  shortlistDetailSchema,
  shortlistDraftSchema,
  shortlistSummarySchema,
  type CreateShortlist,
  type DraftShortlist,
} from '../../shared/shortlists.ts'
import { apiUrl, request } from './request.ts'

export const shortlistsQuery = (campaign: string) =>
  queryOptions({
    queryKey: ['shortlists', campaign] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/shortlists`, { schema: z.array(shortlistSummarySchema), signal }),
  })

export const shortlistQuery = (campaign: string, shortlist: string) =>
  queryOptions({
    queryKey: ['shortlist', shortlist] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/shortlists/${shortlist}`, { schema: shortlistDetailSchema, signal }),
    // Comparing thousands of rows deeply at each verdict would be felt; rows that stay are the same objects anyway.
    structuralSharing: false,
  })

/** What a list of these searches would be. */
export const draftQuery = (campaign: string, body: DraftShortlist) =>
  queryOptions({
    queryKey: ['shortlist-draft', campaign, body] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/shortlists/draft`, {
        method: 'POST',
        body,
        schema: shortlistDraftSchema,
        signal,
      }),
  })

export const useShortlists = (campaign: string) => useQuery(shortlistsQuery(campaign))
export const useShortlist = (campaign: string, shortlist: string) =>
  useQuery(shortlistQuery(campaign, shortlist))

export function useCreateShortlist(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: CreateShortlist) =>
      request(`/campaigns/${campaign}/shortlists`, { method: 'POST', body, schema: shortlistDetailSchema }),
    onSuccess: (shortlist) => {
      client.setQueryData(shortlistQuery(campaign, shortlist.id).queryKey, shortlist)
      void client.invalidateQueries({ queryKey: ['shortlists', campaign] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
      void client.invalidateQueries({ queryKey: ['search'] })
    },
  })
}

/** Address of an export, for a plain download link. */
export function exportUrl(campaign: string, shortlist: string, format: 'csv' | 'json'): string {
  return apiUrl(`/campaigns/${campaign}/shortlists/${shortlist}/export.${format}`)
}
