import type { Express } from 'express'
import { z } from 'zod'
import { createSearchSchema, searchDetailSchema, searchSummarySchema } from '../../shared/searches.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { presentSearchSummary } from '../presenters/searches.ts'
import {
  cancelSearch,
  createSearch,
  listSearches,
  pauseSearch,
  readSearch,
  resumeSearch,
} from '../services/searches.ts'

export function searchRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source
  const { jobs } = context

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/searches',
    access: 'campaign.read',
    answer: z.array(searchSummarySchema),
    handle: async ({ campaign }) => {
      const standings = jobs.searches.standings()
      const searches = await listSearches(manager, campaign.id)
      return searches.map((search) => ({
        ...presentSearchSummary(search),
        standing: standings.get(search.id) ?? null,
      }))
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/searches',
    access: 'searches.run',
    body: createSearchSchema,
    answer: searchDetailSchema,
    status: 201,
    handle: ({ campaign, account, body }) => createSearch(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/searches/:search',
    access: 'campaign.read',
    answer: searchDetailSchema,
    handle: async ({ campaign, params }) => {
      const search = await readSearch(manager, campaign.id, params.search)
      return { ...search, standing: jobs.searches.standings().get(search.id) ?? null }
    },
  })

  for (const [word, act] of [
    ['pause', pauseSearch],
    ['resume', resumeSearch],
    ['cancel', cancelSearch],
  ] as const) {
    endpoint(app, context, {
      method: 'post',
      path: `/api/campaigns/:campaign/searches/:search/${word}`,
      access: 'searches.run',
      answer: searchDetailSchema,
      handle: ({ campaign, account, params }) => act(context, campaign.id, params.search, account.id),
    })
  }
}
