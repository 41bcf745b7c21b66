import type { Express } from 'express'
import multer from 'multer'
import {
  hodgeCountsSchema,
  importReportSchema,
  importTextSchema,
  importWeightLinesSchema,
  importWeightsSchema,
  pastedLimitBytes,
  polytopeDetailSchema,
  polytopePageSchema,
  polytopeQuerySchema,
  scopeSchema,
  scopeSummarySchema,
  uploadLimitBytes,
} from '../../shared/polytopes.ts'
import {
  findPolytopesSchema,
  foundPolytopesSchema,
  polytopeClassesSchema,
  polytopeStructureSchema,
} from '../../shared/polytopeStructure.ts'
import { nullSpectraSchema } from '../../shared/nullSpectra.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { uploadedText } from '../http/uploadedText.ts'
import { presentPolytopeRow } from '../presenters/polytopes.ts'
import { readPolytopeDetail, readPolytopeStructure } from '../services/geometry.ts'
import { importText, importWeights } from '../services/imports.ts'
import { countClasses, readPolytopeClasses } from '../services/polytopeClasses.ts'
import { findPolytopes } from '../services/polytopeLookup.ts'
import { countByHodge, listPolytopes } from '../services/polytopes.ts'
import { summariseScope } from '../services/scopes.ts'
import { importWeightLines } from '../services/weightLines.ts'
import { readNullSpectra } from '../services/nullSpectra.ts'
import { viewerOf } from '../services/viewers.ts'

const upload = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: uploadLimitBytes, files: 1, fields: 4 },
})

const viewSchema = polytopeQuerySchema.pick({ campaign: true })

/** A pasted text may grow when it is written as JSON: each line break takes two characters. */
const pastedBodyLimit = 3 * pastedLimitBytes

export function polytopeRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source

  endpoint(app, context, {
    method: 'get',
    path: '/api/polytopes',
    access: 'account',
    query: polytopeQuerySchema,
    answer: polytopePageSchema,
    handle: async ({ account, query }) => {
      const { campaign, sort, order, offset, limit, ...filter } = query
      const viewer = await viewerOf(manager, account.id, campaign)
      const { total, rows } = await listPolytopes(manager, viewer, filter, { sort, order, offset, limit })
      return { total, rows: rows.map(presentPolytopeRow) }
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/polytopes/hodge',
    access: 'account',
    query: polytopeQuerySchema,
    answer: hodgeCountsSchema,
    handle: async ({ account, query }) => {
      const viewer = await viewerOf(manager, account.id, query.campaign)
      const counts = await countByHodge(manager, viewer, query)
      const total = counts.reduce((sum, { count }) => sum + count, 0)
      const { loading, undescribed } = context.library
      return { total, counts, loading, undescribed }
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/polytopes/:key',
    access: 'account',
    query: viewSchema,
    answer: polytopeDetailSchema,
    handle: async ({ account, params, query }) =>
      readPolytopeDetail(context, await viewerOf(manager, account.id, query.campaign), params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/polytopes/:key/null-spectra',
    access: 'account',
    answer: nullSpectraSchema,
    lasting: true,
    handle: ({ account, params }) => readNullSpectra(context, { accountId: account.id }, params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/polytopes/:key/structure',
    access: 'account',
    query: viewSchema,
    answer: polytopeStructureSchema,
    handle: async ({ account, params, query }) =>
      readPolytopeStructure(context, await viewerOf(manager, account.id, query.campaign), params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/polytopes/:key/classes',
    access: 'account',
    query: viewSchema,
    answer: polytopeClassesSchema,
    handle: async ({ account, params, query }) =>
      readPolytopeClasses(context, await viewerOf(manager, account.id, query.campaign), params.key),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/polytopes/find',
    access: 'account',
    query: viewSchema,
    body: findPolytopesSchema,
    bodyLimit: 300_000,
    answer: foundPolytopesSchema,
    handle: async ({ account, query, body }) =>
      findPolytopes(context, await viewerOf(manager, account.id, query.campaign), body.text),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/polytopes/:key/count',
    access: 'previews.run',
    answer: polytopeClassesSchema,
    status: 202,
    handle: ({ campaign, params }) => countClasses(context, campaign.id, params.key),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/polytopes',
    access: 'polytopes.import',
    body: importTextSchema,
    bodyLimit: pastedBodyLimit,
    answer: importReportSchema,
    status: 201,
    handle: ({ campaign, account, body }) =>
      importText(context, campaign.id, account.id, body.text, body.name),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/polytopes/upload',
    access: 'polytopes.import',
    before: upload.single('file'),
    answer: importReportSchema,
    status: 201,
    handle: ({ campaign, account, request }) =>
      importText(context, campaign.id, account.id, uploadedText(request).text, undefined),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/polytopes/weights',
    access: 'polytopes.import',
    body: importWeightsSchema,
    answer: importReportSchema,
    status: 201,
    handle: ({ campaign, account, body }) => importWeights(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/polytopes/weight-lines',
    access: 'polytopes.import',
    body: importWeightLinesSchema,
    bodyLimit: pastedBodyLimit,
    answer: importReportSchema,
    status: 201,
    handle: ({ campaign, account, body }) => importWeightLines(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/scope',
    access: 'campaign.read',
    body: scopeSchema,
    answer: scopeSummarySchema,
    handle: ({ campaign, body }) => summariseScope(manager, campaign.id, body),
  })
}
