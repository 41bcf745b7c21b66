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
import {
  foundPolytopesSchema,
  polytopeClassesSchema,
  polytopeStructureSchema,
} from '../../shared/polytopeStructure.ts'
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

/** Divisors and sections of a polytope. */
export const structureQuery = (key: string, campaign?: string) =>
  queryOptions({
    queryKey: ['polytope-structure', key, campaign ?? ''] as const,
    queryFn: ({ signal }) =>
      request(`/polytopes/${key}/structure`, {
        schema: polytopeStructureSchema,
        query: { campaign },
        signal,
      }),
    staleTime: Infinity,
  })

/** What is known of a polytope's classes; changes come through the event stream. */
export const classesQuery = (key: string, campaign?: string) =>
  queryOptions({
    queryKey: ['polytope-classes', key, campaign ?? ''] as const,
    queryFn: ({ signal }) =>
      request(`/polytopes/${key}/classes`, { schema: polytopeClassesSchema, query: { campaign }, signal }),
  })

export function useCountClasses(key: string, campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () =>
      request(`/campaigns/${campaign}/polytopes/${key}/count`, {
        method: 'POST',
        schema: polytopeClassesSchema,
      }),
    onSuccess: (answer) =>
      // The end of a short count may have been heard before this answer came.
      client.setQueryData(classesQuery(key, campaign).queryKey, (old) =>
        old && old.classes !== null ? old : answer,
      ),
  })
}

/** Whether the library holds polytopes that are given by points or weights. */
export const useFindPolytopes = (campaign?: string) =>
  useMutation({
    mutationFn: (text: string) =>
      request('/polytopes/find', {
        method: 'POST',
        query: { campaign },
        body: { text },
        schema: foundPolytopesSchema,
      }),
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
