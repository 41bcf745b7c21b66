import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { type z } from 'zod'
import {
  hodgeCountsSchema,
  importReportSchema,
  polytopeDetailSchema,
  polytopePageSchema,
  scopeSummarySchema,
  type importWeightLinesSchema,
  type polytopeQuerySchema,
  type PolytopeFilter,
  type Scope,
} from '../../shared/polytopes.ts'
import { request } from './request.ts'

export type LibraryFilter = PolytopeFilter & { campaign?: string }
export type LibrarySort = Pick<z.infer<typeof polytopeQuerySchema>, 'sort' | 'order'>
export const libraryPageSize = 100

export const polytopePageQuery = (filter: LibraryFilter, sort: LibrarySort, page: number) =>
  queryOptions({
    queryKey: ['polytopes', 'page', filter, sort, page] as const,
    queryFn: ({ signal }) =>
      request('/polytopes', {
        schema: polytopePageSchema,
        query: { ...filter, ...sort, offset: page * libraryPageSize, limit: libraryPageSize },
        signal,
      }),
    staleTime: 60_000,
  })

export const hodgeQuery = (filter: LibraryFilter) =>
  queryOptions({
    queryKey: ['polytopes', 'hodge', filter] as const,
    queryFn: ({ signal }) =>
      request('/polytopes/hodge', { schema: hodgeCountsSchema, query: filter, signal }),
    staleTime: 60_000,
  })

export const polytopeQuery = (key: string, campaign?: string) =>
  queryOptions({
    queryKey: ['polytopes', 'one', key, campaign ?? ''] as const,
    queryFn: ({ signal }) =>
      request(`/polytopes/${key}`, { schema: polytopeDetailSchema, query: { campaign }, signal }),
    staleTime: Infinity,
  })

export const scopeQuery = (campaign: string, scope: Scope) =>
  queryOptions({
    queryKey: ['polytopes', 'scope', campaign, scope] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/scope`, {
        method: 'POST',
        body: scope,
        schema: scopeSummarySchema,
        signal,
      }),
    staleTime: 60_000,
  })

function useImport<Input>(send: (input: Input) => Promise<z.infer<typeof importReportSchema>>) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: send,
    onSuccess: () => client.invalidateQueries({ queryKey: ['polytopes'] }),
  })
}

export const useImportText = (campaign: string) =>
  useImport((body: { text: string; name?: string }) =>
    request(`/campaigns/${campaign}/polytopes`, { method: 'POST', body, schema: importReportSchema }),
  )

export const useImportFile = (campaign: string) =>
  useImport((file: File) => {
    const body = new FormData()
    body.set('file', file)
    return request(`/campaigns/${campaign}/polytopes/upload`, {
      method: 'POST',
      body,
      schema: importReportSchema,
    })
  })

export const useImportWeightLines = (campaign: string) =>
  useImport((body: z.infer<typeof importWeightLinesSchema>) =>
    request(`/campaigns/${campaign}/polytopes/weight-lines`, {
      method: 'POST',
      body,
      schema: importReportSchema,
    }),
  )
