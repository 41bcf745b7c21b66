import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import {
  searchDetailSchema,
  searchSummarySchema,
  type CreateSearch,
  type SearchState,
} from '../../shared/searches.ts'
import { request } from './request.ts'

export const searchesQuery = (campaign: string) =>
  queryOptions({
    queryKey: ['searches', campaign] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/searches`, { schema: z.array(searchSummarySchema), signal }),
  })

export const searchQuery = (campaign: string, search: string) =>
  queryOptions({
    queryKey: ['search', search] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/searches/${search}`, { schema: searchDetailSchema, signal }),
  })

/** How searches stand in line is told by no event: it changes with every piece of anybody's work. */
const standingMilliseconds = 5_000
const underWay = ({ state }: { readonly state: SearchState }) => state === 'running' || state === 'queued'

export const useSearches = (campaign: string) =>
  useQuery({
    ...searchesQuery(campaign),
    refetchInterval: ({ state }) => (state.data?.some(underWay) ? standingMilliseconds : false),
  })
export const useSearch = (campaign: string, search: string) =>
  useQuery({
    ...searchQuery(campaign, search),
    refetchInterval: ({ state }) => (state.data && underWay(state.data) ? standingMilliseconds : false),
  })

export function useCreateSearch(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: CreateSearch) =>
      request(`/campaigns/${campaign}/searches`, { method: 'POST', body, schema: searchDetailSchema }),
    onSuccess: (search) => {
      client.setQueryData(searchQuery(campaign, search.id).queryKey, search)
      void client.invalidateQueries({ queryKey: ['searches', campaign] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
    },
  })
}

export type SearchCommand = 'pause' | 'resume' | 'cancel'

export function useSearchCommand(campaign: string, search: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (command: SearchCommand) =>
      request(`/campaigns/${campaign}/searches/${search}/${command}`, { method: 'POST' }),
    onSettled: () => client.invalidateQueries({ queryKey: searchQuery(campaign, search).queryKey }),
  })
}
