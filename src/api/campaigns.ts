import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import {
  campaignDetailSchema,
  campaignSummarySchema,
  type addMemberSchema,
  type createCampaignSchema,
  type editCampaignSchema,
} from '../../shared/campaigns.ts'
import { type Role } from '../../shared/roles.ts'
import { request } from './request.ts'

export const campaignsQuery = () =>
  queryOptions({
    queryKey: ['campaigns'] as const,
    queryFn: ({ signal }) => request('/campaigns', { schema: z.array(campaignSummarySchema), signal }),
  })

export const campaignQuery = (campaign: string) =>
  queryOptions({
    queryKey: ['campaign', campaign] as const,
    queryFn: ({ signal }) => request(`/campaigns/${campaign}`, { schema: campaignDetailSchema, signal }),
  })

export const useCampaigns = () => useQuery(campaignsQuery())
export const useCampaign = (campaign: string) => useQuery(campaignQuery(campaign))

export function useCreateCampaign() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: z.input<typeof createCampaignSchema>) =>
      request('/campaigns', { method: 'POST', body, schema: campaignSummarySchema }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['campaigns'] }),
  })
}

export function useEditCampaign(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: z.input<typeof editCampaignSchema>) =>
      request(`/campaigns/${campaign}`, { method: 'PATCH', body, schema: campaignDetailSchema }),
    onSuccess: (detail) => {
      client.setQueryData(campaignQuery(campaign).queryKey, detail)
      void client.invalidateQueries({ queryKey: ['campaigns'] })
    },
  })
}

function useMemberChange<Input>(campaign: string, send: (input: Input) => Promise<void>) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: send,
    onSuccess: () => client.invalidateQueries({ queryKey: ['campaign', campaign] }),
  })
}

export const useAddMember = (campaign: string) =>
  useMemberChange(campaign, (body: z.infer<typeof addMemberSchema>) =>
    request(`/campaigns/${campaign}/members`, { method: 'POST', body }),
  )

export const useChangeRole = (campaign: string) =>
  useMemberChange(campaign, ({ accountId, role }: { accountId: string; role: Role }) =>
    request(`/campaigns/${campaign}/members/${accountId}`, { method: 'PATCH', body: { role } }),
  )

export const useRemoveMember = (campaign: string) =>
  useMemberChange(campaign, (accountId: string) =>
    request(`/campaigns/${campaign}/members/${accountId}`, { method: 'DELETE' }),
  )
