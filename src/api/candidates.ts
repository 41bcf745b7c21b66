import { queryOptions } from '@tanstack/react-query'
import {
  candidateGeometrySchema,
  candidateRecordSchema,
  candidateSpectraSchema,
} from '../../shared/candidates.ts'
import { request } from './request.ts'

/** Geometry of a candidate: a function of its key alone, so it never goes stale. */
export const candidateQuery = (key: string) =>
  queryOptions({
    queryKey: ['candidate', key] as const,
    queryFn: ({ signal }) => request(`/candidates/${key}`, { schema: candidateGeometrySchema, signal }),
    staleTime: Infinity,
  })

/** The whole spectra: asked for apart, because they take seconds at the largest h11. */
export const candidateSpectraQuery = (key: string) =>
  queryOptions({
    queryKey: ['candidate-spectra', key] as const,
    queryFn: ({ signal }) =>
      request(`/candidates/${key}/spectra`, { schema: candidateSpectraSchema, signal }),
    staleTime: Infinity,
  })

/** What one campaign knows of a candidate. */
export const candidateRecordQuery = (campaign: string, key: string) =>
  queryOptions({
    queryKey: ['candidate-record', campaign, key] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/candidates/${key}`, { schema: candidateRecordSchema, signal }),
  })
