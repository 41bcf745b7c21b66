import type { Express } from 'express'
import { z } from 'zod'
import {
  externalLimits,
  externalTableSchema,
  externalTablesQuerySchema,
  uploadExternalSchema,
} from '../../shared/externalTables.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { listExternalTables, removeExternal, uploadExternal } from '../services/externalTables.ts'

const base = '/api/campaigns/:campaign/external-tables'

export function externalTableRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'get',
    path: base,
    access: 'campaign.read',
    query: externalTablesQuerySchema,
    answer: z.array(externalTableSchema),
    handle: ({ campaign, query }) => listExternalTables(context.source.manager, campaign.id, query.shortlist),
  })

  endpoint(app, context, {
    method: 'post',
    path: base,
    access: 'external.edit',
    body: uploadExternalSchema,
    // A text may grow when it is written as JSON: each line break takes two characters.
    bodyLimit: 3 * externalLimits.bytes,
    answer: externalTableSchema,
    status: 201,
    handle: ({ campaign, account, body }) => uploadExternal(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'delete',
    path: `${base}/:table`,
    access: 'external.edit',
    handle: ({ campaign, params }) => removeExternal(context, campaign.id, params.table),
  })
}
