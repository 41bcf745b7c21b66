import type { Express } from 'express'
import { z } from 'zod'
import { requestRescoringSchema, rescoringSchema } from '../../shared/rescorings.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { cancelRescoring, listRescorings, requestRescoring } from '../services/rescorings.ts'

const base = '/api/campaigns/:campaign/rescorings'

export function rescoringRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'get',
    path: base,
    access: 'campaign.read',
    answer: z.array(rescoringSchema),
    handle: ({ campaign }) => listRescorings(context.source.manager, campaign.id),
  })

  endpoint(app, context, {
    method: 'post',
    path: base,
    access: 'shortlists.edit',
    body: requestRescoringSchema,
    answer: rescoringSchema,
    status: 201,
    handle: ({ campaign, account, body }) => requestRescoring(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: `${base}/:rescoring/cancel`,
    access: 'shortlists.edit',
    answer: rescoringSchema,
    handle: ({ campaign, params }) => cancelRescoring(context, campaign.id, params.rescoring),
  })
}
