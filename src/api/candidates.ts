import { queryOptions } from '@tanstack/react-query'
import { candidateAlignmentSchema } from '../../shared/candidateAlignment.ts'
import {
  candidateGeometrySchema,
  candidateRecordSchema,
  candidateScoreSchema,
  candidateSpectraSchema,
} from '../../shared/candidates.ts'
import { coneSliceSchema, type ConeSliceQuery } from '../../shared/coneSlices.ts'
import { nullSpectraSchema } from '../../shared/nullSpectra.ts'
import { request } from './request.ts'

/** Geometry of a candidate: a function of its key alone, so it never goes stale. */
export const candidateQuery = (key: string) =>
  queryOptions({
    queryKey: ['candidate', key] as const,
    queryFn: ({ signal }) => request(`/candidates/${key}`, { schema: candidateGeometrySchema, signal }),
    staleTime: Infinity,
  })

/** Spectra of unselected candidates of a polytope: computed when first asked for, which takes a while. */
export const nullSpectraQuery = (polytope: string) =>
  queryOptions({
    queryKey: ['candidate-spectra', 'null', polytope] as const,
    queryFn: ({ signal }) =>
      request(`/polytopes/${polytope}/null-spectra`, { schema: nullSpectraSchema, signal }),
    staleTime: Infinity,
  })

/** A plane cut through the cone at the reference point. */
export const coneSliceQuery = (key: string, directions: ConeSliceQuery) =>
  queryOptions({
    queryKey: ['candidate', key, 'slice', directions] as const,
    queryFn: ({ signal }) =>
      request(`/candidates/${key}/slice`, { schema: coneSliceSchema, query: { ...directions }, signal }),
    staleTime: Infinity,
  })

/** How another candidate lies on one; a function of the two keys. */
export const alignmentQuery = (key: string, other: string) =>
  queryOptions({
    queryKey: ['candidate', key, 'alignment', other] as const,
    queryFn: ({ signal }) =>
      request(`/candidates/${key}/alignment/${other}`, { schema: candidateAlignmentSchema, signal }),
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

/** What a target version says of a candidate; asked for again when verdicts or certificates of it change. */
export const candidateScoreQuery = (campaign: string, key: string, version: string) =>
  queryOptions({
    queryKey: ['candidate-record', campaign, key, 'score', version] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/candidates/${key}/score`, {
        schema: candidateScoreSchema,
        query: { version },
        signal,
      }),
  })

/** What one campaign knows of a candidate. */
export const candidateRecordQuery = (campaign: string, key: string) =>
  queryOptions({
    queryKey: ['candidate-record', campaign, key] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/candidates/${key}`, { schema: candidateRecordSchema, signal }),
  })
