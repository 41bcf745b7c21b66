import type { Express } from 'express'
import { giveVerdictsSchema, undoVerdictsSchema, verdictsGivenSchema } from '../../shared/verdicts.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { giveVerdicts } from '../services/verdictGiving.ts'
import { undoVerdicts } from '../services/verdictUndoing.ts'

/** Keys of the longest list, as JSON. */
const bodyLimit = 400_000

/** Verdicts on many candidates at once, and taking them back. */
export function verdictRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/verdicts',
    access: 'verdicts.give',
    body: giveVerdictsSchema,
    bodyLimit,
    answer: verdictsGivenSchema,
    handle: ({ campaign, account, body }) => giveVerdicts(context, campaign.id, account, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/verdicts/undo',
    access: 'verdicts.give',
    body: undoVerdictsSchema,
    bodyLimit,
    answer: verdictsGivenSchema,
    handle: ({ campaign, account, body }) => undoVerdicts(context, campaign.id, account.id, body.ids),
  })
}
