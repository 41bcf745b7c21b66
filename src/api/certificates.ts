import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import {
  candidateCertificatesSchema,
  certificationSchema,
  type Certification,
  type RequestCertification,
} from '../../shared/certificates.ts'
import { apiUrl, request } from './request.ts'

/** Certificates of a candidate: with a campaign its own as well, without one those of the geometry alone. */
export const candidateCertificatesQuery = (campaign: string | null, key: string) =>
  queryOptions({
    queryKey: ['certificates', key, campaign] as const,
    queryFn: ({ signal }) =>
      request(
        campaign === null
          ? `/candidates/${key}/certificates`
          : `/campaigns/${campaign}/candidates/${key}/certificates`,
        { schema: candidateCertificatesSchema, signal },
      ),
  })

/** Open requests for certificates and the last ones that ended, newest first. */
export const certificationsQuery = (campaign: string) =>
  queryOptions({
    queryKey: ['certifications', campaign] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/certifications`, { schema: z.array(certificationSchema), signal }),
  })

/** The list with one request in its newer form, which may be a new one. */
export function withCertification(list: readonly Certification[], moved: Certification): Certification[] {
  return list.some(({ id }) => id === moved.id)
    ? list.map((one) => (one.id === moved.id ? moved : one))
    : [moved, ...list]
}

export function useRequestCertification(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: Omit<RequestCertification, 'again'> & { again?: boolean }) =>
      request(`/campaigns/${campaign}/certifications`, { method: 'POST', body, schema: certificationSchema }),
    onSuccess: (certification) => {
      client.setQueryData(
        certificationsQuery(campaign).queryKey,
        (list) => list && withCertification(list, certification),
      )
      void client.invalidateQueries({ queryKey: ['certifications', campaign] })
      void client.invalidateQueries({ queryKey: ['certificates'] })
      void client.invalidateQueries({ queryKey: ['shortlist'] })
      void client.invalidateQueries({ queryKey: ['candidate-record', campaign] })
    },
  })
}

export function useCancelCertification(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (id: string) =>
      request(`/campaigns/${campaign}/certifications/${id}/cancel`, {
        method: 'POST',
        schema: certificationSchema,
      }),
    onSettled: () => {
      void client.invalidateQueries({ queryKey: ['certifications', campaign] })
      void client.invalidateQueries({ queryKey: ['certificates'] })
      void client.invalidateQueries({ queryKey: ['shortlist'] })
    },
  })
}

/** Address of a whole certificate, for a plain download link. */
export const certificateUrl = (candidate: string, certificate: string): string =>
  apiUrl(`/candidates/${candidate}/certificates/${certificate}`)
