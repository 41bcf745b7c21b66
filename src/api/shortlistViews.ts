import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import { shortlistViewSchema, type EditView, type SaveView } from '../../shared/shortlistViews.ts'
import { request } from './request.ts'

/** Views of a list, and those for every list of the campaign. */
export const shortlistViewsQuery = (campaign: string, shortlist: string) =>
  queryOptions({
    queryKey: ['shortlist-views', campaign, shortlist] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/shortlist-views`, {
        query: { shortlist },
        schema: z.array(shortlistViewSchema),
        signal,
      }),
  })

function useViewChange<Input, Answer>(campaign: string, send: (input: Input) => Promise<Answer>) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: send,
    onSuccess: () => client.invalidateQueries({ queryKey: ['shortlist-views', campaign] }),
  })
}

export const useSaveView = (campaign: string) =>
  useViewChange(campaign, (body: SaveView) =>
    request(`/campaigns/${campaign}/shortlist-views`, { method: 'POST', body, schema: shortlistViewSchema }),
  )

export const useEditView = (campaign: string) =>
  useViewChange(campaign, ({ id, ...body }: EditView & { id: string }) =>
    request(`/campaigns/${campaign}/shortlist-views/${id}`, {
      method: 'PATCH',
      body,
      schema: shortlistViewSchema,
    }),
  )

export const useRemoveView = (campaign: string) =>
  useViewChange(campaign, (id: string) =>
    request(`/campaigns/${campaign}/shortlist-views/${id}`, { method: 'DELETE' }),
  )
