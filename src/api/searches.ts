import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import {
  searchDetailSchema,
  searchSummarySchema,
  type CreateSearch,
  type SearchState,
} from '../../shared/searches.ts'
import {
  searchCostSchema,
  startsSummarySchema,
  type SearchCostRequest,
  type StartsSource,
} from '../../shared/searchRunning.ts'
import { apiUrl, request } from './request.ts'

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

/** What a search would begin from. */
export const startsSummaryQuery = (campaign: string, starts: StartsSource) =>
  queryOptions({
    queryKey: ['search-starts', campaign, starts] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/search-starts`, {
        method: 'POST',
        body: { starts },
        schema: startsSummarySchema,
        signal,
      }),
  })

/** What evaluations cost on the server; timed once for a scope and rule. */
export const searchCostQuery = (campaign: string, asked: SearchCostRequest | null) =>
  queryOptions({
    queryKey: ['search-cost', campaign, asked] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/search-costs`, {
        method: 'POST',
        body: asked,
        schema: searchCostSchema,
        signal,
      }),
    staleTime: 60_000,
    retry: false,
  })

export function useExtendSearch(campaign: string, search: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: { evaluations: number }) =>
      request(`/campaigns/${campaign}/searches/${search}/extend`, {
        method: 'POST',
        body,
        schema: searchDetailSchema,
      }),
    onSuccess: (detail) => {
      client.setQueryData(searchQuery(campaign, search).queryKey, detail)
      void client.invalidateQueries({ queryKey: ['searches', campaign] })
    },
  })
}

/** The lines of a headless search, pasted or as a file. */
export function useImportResult(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: ({ file, text, name }: { file?: File; text?: string; name?: string }) => {
      const path = `/campaigns/${campaign}/search-results`
      const schema = searchDetailSchema
      if (!file) return request(path, { method: 'POST', body: { text, name }, schema })
      const form = new FormData()
      form.append('file', file)
      if (name) form.append('name', name)
      return request(`${path}/upload`, { method: 'POST', body: form, schema })
    },
    onSuccess: (search) => {
      client.setQueryData(searchQuery(campaign, search.id).queryKey, search)
      void client.invalidateQueries({ queryKey: ['searches', campaign] })
      void client.invalidateQueries({ queryKey: ['targets', campaign] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
      void client.invalidateQueries({ queryKey: ['polytopes'] })
    },
  })
}

/** Address of the file that the headless search takes, for a plain download link. */
export const specificationUrl = (campaign: string, search: string): string =>
  apiUrl(`/campaigns/${campaign}/searches/${search}/spec.json`)
