import type { Express } from 'express'
import { z } from 'zod'
import type { ServerContext } from '../context.ts'
import { Membership } from '../entities/membership.ts'
import { endpoint } from '../http/endpoint.ts'
import { notFound } from '../problems.ts'

const eventsQuerySchema = z.object({ campaign: z.string().optional() })

export function eventRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'get',
    path: '/api/events',
    access: 'account',
    query: eventsQuerySchema,
    handle: async ({ account, query, request, response }) => {
      const campaignId = query.campaign ?? null
      if (campaignId !== null) {
        const member = await context.source.manager.existsBy(Membership, {
          campaignId,
          accountId: account.id,
        })
        if (!member) throw notFound('campaign')
      }
      await context.streams.open(request, response, {
        accountId: account.id,
        sessionId: request.sessionID,
        campaignId,
      })
    },
  })
}
