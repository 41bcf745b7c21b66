import { queryOptions } from '@tanstack/react-query'
import { candidateRelativesSchema } from '../../shared/relatives.ts'
import { request } from './request.ts'

/** Candidates that may be the same geometry, or nearly the same, as far as the reader may know of them. */
export const relativesQuery = (campaign: string | null, key: string) =>
  queryOptions({
    queryKey: ['relatives', key, campaign] as const,
    queryFn: ({ signal }) =>
      request(`/candidates/${key}/relatives`, {
        query: { campaign },
        schema: candidateRelativesSchema,
        signal,
      }),
  })
