import type { Express } from 'express'
import { ipKeyGenerator, rateLimit } from 'express-rate-limit'
import { sessionSchema, setUpAccountSchema, signInSchema } from '../../shared/session.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { sendProblem } from '../http/answerProblem.ts'
import { endSession, startSession } from '../http/signedInSession.ts'
import { presentSession } from '../presenters/accounts.ts'
import { Refusal } from '../problems.ts'
import { authenticate, setUpAccount } from '../services/accounts.ts'

/** Failed attempts allowed per address of the caller in a quarter of an hour. */
export const signInAttempts = 10

/** Counts failures only: people who sign in properly are never locked out by this. */
function attemptLimit() {
  return rateLimit({
    windowMs: 15 * 60 * 1000,
    limit: signInAttempts,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    skipSuccessfulRequests: true,
    keyGenerator: (request) => ipKeyGenerator(request.ip ?? ''),
    handler: (_request, response) =>
      sendProblem(
        response,
        new Refusal(429, 'too-many-attempts', 'Too many attempts; try again in 15 minutes.'),
      ),
  })
}

export function sessionRoutes(app: Express, context: ServerContext): void {
  const { source, writes, version, streams } = context

  endpoint(app, context, {
    method: 'get',
    path: '/api/session',
    access: 'open',
    answer: sessionSchema,
    handle: ({ account }) => presentSession(account, version),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/session',
    access: 'open',
    body: signInSchema,
    answer: sessionSchema,
    before: attemptLimit(),
    handle: async ({ body, request }) => {
      const account = await authenticate(source, body.email, body.password)
      await startSession(request, account.id)
      return presentSession(account, version)
    },
  })

  endpoint(app, context, {
    method: 'delete',
    path: '/api/session',
    access: 'account',
    handle: async ({ request }) => {
      const { sessionID } = request
      await endSession(request)
      streams.closeSession(sessionID)
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/setup',
    access: 'open',
    body: setUpAccountSchema,
    answer: sessionSchema,
    before: attemptLimit(),
    handle: async ({ body, request }) => {
      const account = await setUpAccount(writes, body)
      await startSession(request, account.id)
      return presentSession(account, version)
    },
  })
}
