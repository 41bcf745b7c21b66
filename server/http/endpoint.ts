import express, { type Express, type Request, type RequestHandler, type Response } from 'express'
import type { z } from 'zod'
import { may, type Permission, type Role } from '../../shared/roles.ts'
import type { ServerContext } from '../context.ts'
import { Account } from '../entities/account.ts'
import { Membership } from '../entities/membership.ts'
import { notAllowed, notFound, notSignedIn, Refusal } from '../problems.ts'

/** Who may call: anybody, any signed-in account, or members of the path's campaign with a permission. */
export type Access = 'open' | 'account' | Permission

export interface CampaignAccess {
  readonly id: string
  readonly role: Role
}

/** A checked request, as a handler sees it. */
export interface Call<A extends Access, Body, Query> {
  readonly account: A extends 'open' ? Account | null : Account
  readonly campaign: A extends Permission ? CampaignAccess : null
  readonly params: Readonly<Record<string, string>>
  readonly body: Body
  readonly query: Query
  readonly request: Request
  readonly response: Response
}

export interface Endpoint<A extends Access, Body, Query, Answer> {
  readonly method: 'get' | 'post' | 'patch' | 'delete'
  readonly path: string
  readonly access: A
  readonly body?: z.ZodType<Body>
  readonly query?: z.ZodType<Query>
  /** Schema of the answer. Without it the handler writes the response itself, or leaves it empty (204). */
  readonly answer?: z.ZodType<Answer>
  readonly status?: number
  /**
   * The answer hardly ever changes: a browser keeps it and asks each time, with its tag, whether it still holds. Who
   * may read it is decided anew each time.
   */
  readonly lasting?: boolean
  /** Largest JSON body in bytes. */
  readonly bodyLimit?: number
  /** Middleware after the access check and before the handler. */
  readonly before?: RequestHandler
  readonly handle: (call: Call<A, Body, Query>) => Promise<Answer> | Answer
}

interface Caller {
  readonly account: Account | null
  readonly campaign: CampaignAccess | null
}

/**
 * Registers one route, flat under its full path, so that the list of routes can be read off the application.
 * Order: who is it (401), may they (404 for strangers to the campaign, 403 for the wrong role), only then is the
 * body read and checked (422).
 */
export function endpoint<A extends Access, Body = undefined, Query = undefined, Answer = void>(
  app: Express,
  context: ServerContext,
  definition: Endpoint<A, Body, Query, Answer>,
): void {
  const authorise: RequestHandler = async (request, response, next) => {
    response.locals.caller = await identify(context, request, definition.access)
    next()
  }
  const handle: RequestHandler = async (request, response) => {
    const caller = response.locals.caller as Caller
    const call = {
      ...caller,
      params: request.params as Record<string, string>,
      body: definition.body?.parse(request.body ?? {}),
      query: definition.query?.parse(request.query),
      request,
      response,
    } as Call<A, Body, Query>
    const answer = await definition.handle(call)
    if (response.headersSent) return
    if (!definition.answer) {
      response.status(definition.status ?? 204).end()
      return
    }
    if (definition.lasting) response.set('Cache-Control', 'private, no-cache')
    if (context.checkAnswers) definition.answer.parse(answer)
    response.status(definition.status ?? 200).json(answer)
  }
  const chain: RequestHandler[] = [authorise]
  if (definition.body) chain.push(express.json({ limit: definition.bodyLimit ?? 100_000 }))
  if (definition.before) chain.push(definition.before)
  app[definition.method](definition.path, ...chain, handle)
}

async function identify(context: ServerContext, request: Request, access: Access): Promise<Caller> {
  const accountId = request.session.accountId
  const account =
    accountId === undefined ? null : await context.source.manager.findOneBy(Account, { id: accountId })
  if (access === 'open') return { account, campaign: null }
  if (account === null) throw notSignedIn()
  if (access === 'account') return { account, campaign: null }
  const id = request.params.campaign
  if (typeof id !== 'string') throw new Error(`The route ${request.path} has no :campaign.`)
  const membership = await context.source.manager.findOneBy(Membership, {
    campaignId: id,
    accountId: account.id,
  })
  if (membership === null) throw notFound('campaign')
  if (!may(membership.role, access)) {
    throw notAllowed(`Your role in this campaign, ${membership.role}, does not include this (${access}).`)
  }
  return { account, campaign: { id, role: membership.role } }
}

/** For paths under /api that no route answers. */
export const noSuchRoute: RequestHandler = (request) => {
  throw new Refusal(404, 'no-such-route', `There is no ${request.method} ${request.path}.`)
}
