import type { Express } from 'express'
import { z } from 'zod'
import { reissuedSchema, reissueSchema } from '../../shared/reissues.ts'
import {
  createShortlistSchema,
  draftShortlistSchema,
  shortlistDetailSchema,
  shortlistDraftSchema,
  shortlistSummarySchema,
} from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { emptyTally } from '../presenters/campaigns.ts'
import { fileName, shortlistDocument, shortlistTable } from '../presenters/shortlistExports.ts'
import { presentShortlistSummary } from '../presenters/shortlists.ts'
import { reissue } from '../services/reissues.ts'
import {
  createShortlist,
  draftShortlist,
  exportedCandidates,
  listShortlists,
  readShortlist,
} from '../services/shortlists.ts'
import { tallyShortlists } from '../services/verdicts.ts'

export function shortlistRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/shortlists',
    access: 'campaign.read',
    answer: z.array(shortlistSummarySchema),
    handle: async ({ campaign }) => {
      const tallies = await tallyShortlists(manager, [campaign.id])
      const shortlists = await listShortlists(manager, campaign.id)
      return shortlists.map((one) => presentShortlistSummary(one, tallies.get(one.id) ?? emptyTally))
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/shortlists',
    access: 'shortlists.edit',
    body: createShortlistSchema,
    answer: shortlistDetailSchema,
    status: 201,
    handle: ({ campaign, account, body }) => createShortlist(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/shortlists/draft',
    access: 'campaign.read',
    body: draftShortlistSchema,
    answer: shortlistDraftSchema,
    handle: ({ campaign, body, response }) => {
      // Somebody who goes on typing gives the request up, and the work with it.
      const given = new AbortController()
      response.once('close', () => given.abort(new Error('The request was given up.')))
      return draftShortlist(context, campaign.id, body, given.signal)
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/shortlists/:shortlist',
    access: 'campaign.read',
    answer: shortlistDetailSchema,
    handle: ({ campaign, params }) => readShortlist(manager, campaign.id, params.shortlist),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/shortlists/:shortlist/reissues',
    access: 'shortlists.edit',
    body: reissueSchema,
    bodyLimit: 400_000,
    answer: reissuedSchema,
    status: 201,
    handle: ({ campaign, account, params, body }) =>
      reissue(context, campaign.id, account.id, { ...body, listId: params.shortlist }),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/shortlists/:shortlist/export.csv',
    access: 'exports.read',
    handle: async ({ campaign, params, response }) => {
      const shortlist = await readShortlist(manager, campaign.id, params.shortlist)
      response.attachment(fileName(shortlist, 'csv')).type('text/csv').send(shortlistTable(shortlist))
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/shortlists/:shortlist/export.json',
    access: 'exports.read',
    handle: async ({ campaign, params, response }) => {
      const shortlist = await readShortlist(manager, campaign.id, params.shortlist)
      const candidates = await exportedCandidates(manager, shortlist.id)
      const document = shortlistDocument(shortlist, candidates, context.version)
      response.attachment(fileName(shortlist, 'json')).json(document)
    },
  })
}
