import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { type z } from 'zod'
import {
  candidateImportReportSchema,
  importedCandidatePageSchema,
  type importCandidatesSchema,
  type shortlistImportedSchema,
} from '../../shared/importedCandidates.ts'
import { shortlistDetailSchema } from '../../shared/shortlists.ts'
import { request } from './request.ts'
import { shortlistQuery } from './shortlists.ts'

export const importedPageSize = 100

export const importedCandidatesQuery = (campaign: string, text: string, page: number) =>
  queryOptions({
    queryKey: ['imported-candidates', campaign, text, page] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/imported-candidates`, {
        schema: importedCandidatePageSchema,
        query: { text, offset: page * importedPageSize, limit: importedPageSize },
        signal,
      }),
    placeholderData: keepPreviousData,
  })

export type CandidateSource = Omit<z.infer<typeof importCandidatesSchema>, 'text'> &
  ({ text: string; file?: undefined } | { file: File; text?: undefined })

export function useImportCandidates(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: ({ file, text, ...options }: CandidateSource) => {
      const path = `/campaigns/${campaign}/imported-candidates`
      const schema = candidateImportReportSchema
      if (!file) return request(path, { method: 'POST', body: { text, ...options }, schema })
      const body = new FormData()
      body.set('file', file)
      if (options.name) body.set('name', options.name)
      if (options.orientation) body.set('orientation', options.orientation)
      return request(`${path}/upload`, { method: 'POST', body, schema })
    },
    onSuccess: () => {
      void client.invalidateQueries({ queryKey: ['imported-candidates', campaign] })
      void client.invalidateQueries({ queryKey: ['polytopes'] })
    },
  })
}

export function useForgetImported(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (key: string) =>
      request(`/campaigns/${campaign}/imported-candidates/${key}`, { method: 'DELETE' }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['imported-candidates', campaign] }),
  })
}

export function useShortlistImported(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: Omit<z.infer<typeof shortlistImportedSchema>, 'size'>) =>
      request(`/campaigns/${campaign}/imported-candidates/shortlists`, {
        method: 'POST',
        body,
        schema: shortlistDetailSchema,
      }),
    onSuccess: (shortlist) => {
      client.setQueryData(shortlistQuery(campaign, shortlist.id).queryKey, shortlist)
      void client.invalidateQueries({ queryKey: ['shortlists', campaign] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
    },
  })
}
