import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import { targetDetailSchema, targetSummarySchema, targetUsesSchema } from '../../shared/targets.ts'
import { request } from './request.ts'

export const targetsQuery = (campaign: string) =>
  queryOptions({
    queryKey: ['targets', campaign] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/targets`, { schema: z.array(targetSummarySchema), signal }),
  })

export const targetQuery = (campaign: string, target: string) =>
  queryOptions({
    queryKey: ['targets', campaign, target] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/targets/${target}`, { schema: targetDetailSchema, signal }),
  })

/** What the target's versions were used for. */
export const targetUsesQuery = (campaign: string, target: string) =>
  queryOptions({
    queryKey: ['targets', campaign, target, 'uses'] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/targets/${target}/uses`, { schema: targetUsesSchema, signal }),
  })

export const useTargets = (campaign: string) => useQuery(targetsQuery(campaign))

function useTargetChange<Input>(
  campaign: string,
  send: (input: Input) => Promise<z.infer<typeof targetDetailSchema>>,
) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: send,
    onSuccess: (target) => {
      client.setQueryData(targetQuery(campaign, target.id).queryKey, target)
      void client.invalidateQueries({ queryKey: ['targets', campaign], exact: true })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
    },
  })
}

export const useCreateTarget = (campaign: string) =>
  useTargetChange(campaign, (body: { name: string; text: string }) =>
    request(`/campaigns/${campaign}/targets`, { method: 'POST', body, schema: targetDetailSchema }),
  )

/** A saved text becomes a new version; versions are never changed afterwards. */
export const useSaveVersion = (campaign: string, target: string) =>
  useTargetChange(campaign, (text: string) =>
    request(`/campaigns/${campaign}/targets/${target}/versions`, {
      method: 'POST',
      body: { text },
      schema: targetDetailSchema,
    }),
  )

export const useRenameTarget = (campaign: string, target: string) =>
  useTargetChange(campaign, (name: string) =>
    request(`/campaigns/${campaign}/targets/${target}`, {
      method: 'PATCH',
      body: { name },
      schema: targetDetailSchema,
    }),
  )
