import type { Express } from 'express'
import { z } from 'zod'
import { commentSchema, mentionSchema, writeCommentSchema } from '../../shared/comments.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import {
  editComment,
  listComments,
  listMentions,
  markMentionSeen,
  removeComment,
  writeComment,
} from '../services/comments.ts'

export function commentRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source
  const base = '/api/campaigns/:campaign'

  endpoint(app, context, {
    method: 'get',
    path: `${base}/candidates/:key/comments`,
    access: 'campaign.read',
    answer: z.array(commentSchema),
    handle: ({ campaign, params }) => listComments(manager, campaign.id, params.key),
  })

  endpoint(app, context, {
    method: 'post',
    path: `${base}/candidates/:key/comments`,
    access: 'comments.write',
    body: writeCommentSchema,
    answer: commentSchema,
    status: 201,
    handle: ({ campaign, account, params, body }) =>
      writeComment(context, { campaignId: campaign.id, candidateKey: params.key }, account.id, body),
  })

  endpoint(app, context, {
    method: 'patch',
    path: `${base}/comments/:comment`,
    access: 'comments.write',
    body: writeCommentSchema,
    answer: commentSchema,
    handle: ({ campaign, account, params, body }) =>
      editComment(context, campaign.id, Number(params.comment), account.id, body),
  })

  endpoint(app, context, {
    method: 'delete',
    path: `${base}/comments/:comment`,
    access: 'comments.write',
    handle: ({ campaign, account, params }) =>
      removeComment(context, campaign, Number(params.comment), account.id),
  })

  endpoint(app, context, {
    method: 'get',
    path: `${base}/mentions`,
    access: 'campaign.read',
    answer: z.array(mentionSchema),
    handle: ({ campaign, account }) => listMentions(manager, campaign.id, account.id),
  })

  endpoint(app, context, {
    method: 'post',
    path: `${base}/mentions/:comment/seen`,
    access: 'campaign.read',
    handle: ({ campaign, account, params }) =>
      markMentionSeen(context, campaign.id, Number(params.comment), account.id),
  })
}
