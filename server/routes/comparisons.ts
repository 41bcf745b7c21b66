import type { Express } from 'express'
import { comparisonQuerySchema, comparisonSchema } from '../../shared/comparisons.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { compareSearches } from '../services/comparisons.ts'

export function comparisonRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/comparisons',
    access: 'campaign.read',
    query: comparisonQuerySchema,
    answer: comparisonSchema,
    handle: ({ campaign, query }) => compareSearches(context.source.manager, campaign.id, query.with),
  })
}
