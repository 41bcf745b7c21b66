import type { Express } from 'express'
import { z } from 'zod'
import {
  addMemberSchema,
  campaignDetailSchema,
  campaignSummarySchema,
  createCampaignSchema,
  editCampaignSchema,
  editMemberSchema,
} from '../../shared/campaigns.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { createCampaign, editCampaign, listCampaigns, readCampaign } from '../services/campaigns.ts'
import { addMember, changeRole, removeMember } from '../services/members.ts'

export function campaignRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns',
    access: 'account',
    answer: z.array(campaignSummarySchema),
    handle: ({ account }) => listCampaigns(manager, account.id),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns',
    access: 'account',
    body: createCampaignSchema,
    answer: campaignDetailSchema,
    status: 201,
    handle: ({ account, body }) => createCampaign(context, account.id, body),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign',
    access: 'campaign.read',
    answer: campaignDetailSchema,
    handle: ({ campaign }) => readCampaign(manager, campaign.id, campaign.role),
  })

  endpoint(app, context, {
    method: 'patch',
    path: '/api/campaigns/:campaign',
    access: 'campaign.edit',
    body: editCampaignSchema,
    answer: campaignDetailSchema,
    handle: ({ campaign, body }) => editCampaign(context, campaign, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/members',
    access: 'members.manage',
    body: addMemberSchema,
    answer: campaignDetailSchema,
    status: 201,
    handle: async ({ campaign, body }) => {
      await addMember(context, campaign.id, body)
      return readCampaign(manager, campaign.id, campaign.role)
    },
  })

  endpoint(app, context, {
    method: 'patch',
    path: '/api/campaigns/:campaign/members/:account',
    access: 'members.manage',
    body: editMemberSchema,
    handle: ({ campaign, params, body }) => changeRole(context, campaign.id, params.account, body.role),
  })

  endpoint(app, context, {
    method: 'delete',
    path: '/api/campaigns/:campaign/members/:account',
    access: 'members.manage',
    handle: ({ campaign, params }) => removeMember(context, campaign.id, params.account),
  })
}
