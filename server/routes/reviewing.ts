import type { Express } from 'express'
import { z } from 'zod'
import { assignedSchema, assignSchema } from '../../shared/assignments.ts'
import {
  editViewSchema,
  saveViewSchema,
  shortlistViewSchema,
  viewsQuerySchema,
} from '../../shared/shortlistViews.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { assign } from '../services/assignments.ts'
import { editView, listViews, removeView, saveView } from '../services/shortlistViews.ts'

const views = '/api/campaigns/:campaign/shortlist-views'
/** Keys of the longest list, as JSON. */
const bodyLimit = 400_000

/** Who is to judge what, and views of shortlists under names. */
export function reviewingRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/assignments',
    access: 'verdicts.assign',
    body: assignSchema,
    bodyLimit,
    answer: assignedSchema,
    handle: ({ campaign, account, body }) => assign(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'get',
    path: views,
    access: 'campaign.read',
    query: viewsQuerySchema,
    answer: z.array(shortlistViewSchema),
    handle: ({ campaign, query }) => listViews(context.source.manager, campaign.id, query.shortlist),
  })

  endpoint(app, context, {
    method: 'post',
    path: views,
    access: 'views.save',
    body: saveViewSchema,
    answer: shortlistViewSchema,
    status: 201,
    handle: ({ campaign, account, body }) => saveView(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'patch',
    path: `${views}/:view`,
    access: 'views.save',
    body: editViewSchema,
    answer: shortlistViewSchema,
    handle: ({ campaign, account, params, body }) =>
      editView(
        context,
        { campaignId: campaign.id, id: params.view },
        { accountId: account.id, role: campaign.role },
        body,
      ),
  })

  endpoint(app, context, {
    method: 'delete',
    path: `${views}/:view`,
    access: 'views.save',
    handle: ({ campaign, account, params }) =>
      removeView(
        context,
        { campaignId: campaign.id, id: params.view },
        { accountId: account.id, role: campaign.role },
      ),
  })
}
