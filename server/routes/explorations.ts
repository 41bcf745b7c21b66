import type { Express } from 'express'
import {
  explorationRequestSchema,
  explorationRowsQuerySchema,
  explorationRowsSchema,
  explorationSchema,
  openedCandidatesSchema,
} from '../../shared/explorations.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { explorationDocument, explorationTable, tableName } from '../presenters/explorationExports.ts'

/** Observables over the null sample of a scope, or over the sample of a search's evaluations. */
export function explorationRoutes(app: Express, context: ServerContext): void {
  const { explorations } = context.jobs
  const one = '/api/campaigns/:campaign/explorations/:exploration'

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/explorations',
    access: 'previews.run',
    body: explorationRequestSchema,
    answer: explorationSchema,
    status: 202,
    handle: ({ campaign, account, body }) => explorations.start(campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'get',
    path: one,
    access: 'previews.run',
    answer: explorationSchema,
    handle: ({ campaign, account, params }) => explorations.read(campaign.id, account.id, params.exploration),
  })

  endpoint(app, context, {
    method: 'delete',
    path: one,
    access: 'previews.run',
    handle: ({ campaign, account, params }) => explorations.stop(campaign.id, account.id, params.exploration),
  })

  endpoint(app, context, {
    method: 'get',
    path: `${one}/rows`,
    access: 'previews.run',
    query: explorationRowsQuerySchema,
    answer: explorationRowsSchema,
    handle: ({ campaign, account, params, query }) =>
      explorations.rows(campaign.id, account.id, params.exploration, query.from),
  })

  endpoint(app, context, {
    method: 'post',
    path: `${one}/candidates`,
    access: 'previews.run',
    body: openedCandidatesSchema,
    handle: ({ campaign, account, params, body }) =>
      explorations.open(campaign.id, account.id, params.exploration, body.keys),
  })

  endpoint(app, context, {
    method: 'get',
    path: `${one}/export.csv`,
    access: 'exports.read',
    handle: async ({ campaign, account, params, response }) => {
      const table = await explorations.table(campaign.id, account.id, params.exploration)
      response.attachment(tableName(table, 'csv')).type('text/csv')
      response.send(explorationTable(table, context.version))
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: `${one}/export.json`,
    access: 'exports.read',
    handle: async ({ campaign, account, params, response }) => {
      const table = await explorations.table(campaign.id, account.id, params.exploration)
      response.attachment(tableName(table, 'json')).json(explorationDocument(table, context.version))
    },
  })
}
