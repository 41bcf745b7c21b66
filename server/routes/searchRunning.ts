import type { Express } from 'express'
import multer from 'multer'
import { pastedLimitBytes, uploadLimitBytes } from '../../shared/polytopes.ts'
import { searchDetailSchema } from '../../shared/searches.ts'
import {
  extendSearchSchema,
  importResultSchema,
  resultOptionsSchema,
  searchCostRequestSchema,
  searchCostSchema,
  startsRequestSchema,
  startsSummarySchema,
} from '../../shared/searchRunning.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { uploadedText } from '../http/uploadedText.ts'
import { importResult } from '../services/importResults.ts'
import { searchCost } from '../services/searchCosts.ts'
import { extendSearch } from '../services/searches.ts'
import { searchSpecification } from '../services/searchSpecifications.ts'
import { resolveStarts } from '../services/searchStarts.ts'

const upload = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: uploadLimitBytes, files: 1, fields: 4 },
})

/** Beyond start and stop: what a search begins from and costs, its extension, its way out and back in. */
export function searchRunningRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/search-starts',
    access: 'campaign.read',
    body: startsRequestSchema,
    answer: startsSummarySchema,
    handle: async ({ campaign, body }) => {
      const { name, starts } = await resolveStarts(manager, campaign.id, body.starts)
      const polytopeKeys = [...new Set(starts.map(({ polytopeKey }) => polytopeKey))]
      return { name, count: starts.length, polytopeKeys }
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/search-costs',
    access: 'searches.run',
    body: searchCostRequestSchema,
    answer: searchCostSchema,
    handle: ({ campaign, body }) => searchCost(context, campaign.id, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/search-results',
    access: 'searches.run',
    body: importResultSchema,
    // Each line break of the text takes two characters in JSON, and each quotation mark.
    bodyLimit: 3 * pastedLimitBytes,
    answer: searchDetailSchema,
    status: 201,
    handle: ({ campaign, account, body: { text, source, name } }) =>
      importResult(
        context,
        { campaignId: campaign.id, authorId: account.id },
        { text, source: source || 'pasted text', name },
      ),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/search-results/upload',
    access: 'searches.run',
    before: upload.single('file'),
    answer: searchDetailSchema,
    status: 201,
    handle: ({ campaign, account, request }) => {
      const { text, name: source } = uploadedText(request)
      const { name } = resultOptionsSchema.parse(request.body ?? {})
      return importResult(context, { campaignId: campaign.id, authorId: account.id }, { text, source, name })
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/searches/:search/extend',
    access: 'searches.run',
    body: extendSearchSchema,
    answer: searchDetailSchema,
    handle: ({ campaign, account, params, body }) =>
      extendSearch(context, campaign.id, params.search, body.evaluations, account.id),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/searches/:search/spec.json',
    access: 'exports.read',
    handle: async ({ campaign, params, response }) => {
      const { name, specification } = await searchSpecification(context, campaign.id, params.search)
      const words = name.toLowerCase().replace(/[^a-z0-9]+/g, '-')
      response.attachment(`${words.replace(/^-|-$/g, '') || 'search'}.spec.json`).json(specification)
    },
  })
}
