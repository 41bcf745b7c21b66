import { queryOptions } from '@tanstack/react-query'
import { candidateGeometrySchema, candidateRecordSchema } from '../../shared/candidates.ts'
import { request } from './request.ts'

/** Geometry of a candidate: a function of its key alone, so it never goes stale. */
export const candidateQuery = (key: string) =>
  queryOptions({
    queryKey: ['candidate', key] as const,
    queryFn: ({ signal }) => request(`/candidates/${key}`, { schema: candidateGeometrySchema, signal }),
    staleTime: Infinity,
  })

/** What one campaign knows of a candidate. */
export const candidateRecordQuery = (campaign: string, key: string) =>
  queryOptions({
    queryKey: ['candidate-record', campaign, key] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/candidates/${key}`, { schema: candidateRecordSchema, signal }),
  })
