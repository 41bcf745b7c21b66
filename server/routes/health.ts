import type { Express } from 'express'
import { z } from 'zod'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'

const healthSchema = z.object({ status: z.literal('ok'), version: z.string() })

export function healthRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'get',
    path: '/api/health',
    access: 'open',
    answer: healthSchema,
    handle: async () => {
      await context.source.query('SELECT 1')
      return { status: 'ok' as const, version: context.version }
    },
  })
}
