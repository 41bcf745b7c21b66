import type { Express } from 'express'
import { z } from 'zod'
import {
  collectionQuerySchema,
  collectionSchema,
  createCollectionSchema,
  editCollectionSchema,
  membersChangedSchema,
  membersSchema,
} from '../../shared/collections.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import {
  changeMembers,
  createCollection,
  deleteCollection,
  editCollection,
  listCollections,
  publishCollection,
} from '../services/collections.ts'
import { viewerOf } from '../services/viewers.ts'

export function collectionRoutes(app: Express, context: ServerContext): void {
  const one = '/api/campaigns/:campaign/collections/:collection'

  endpoint(app, context, {
    method: 'get',
    path: '/api/collections',
    access: 'account',
    query: collectionQuerySchema,
    answer: z.array(collectionSchema),
    handle: async ({ account, query }) => {
      const { manager } = context.source
      return listCollections(manager, await viewerOf(manager, account.id, query.campaign))
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/collections',
    access: 'collections.edit',
    body: createCollectionSchema,
    answer: collectionSchema,
    status: 201,
    handle: ({ campaign, account, body }) => createCollection(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'patch',
    path: one,
    access: 'collections.edit',
    body: editCollectionSchema,
    answer: collectionSchema,
    handle: ({ campaign, params, body }) => editCollection(context, campaign, params.collection, body),
  })

  endpoint(app, context, {
    method: 'delete',
    path: one,
    access: 'collections.edit',
    handle: ({ campaign, params }) => deleteCollection(context, campaign, params.collection),
  })

  for (const [word, into] of [
    ['add', true],
    ['remove', false],
  ] as const) {
    endpoint(app, context, {
      method: 'post',
      path: `${one}/${word}`,
      access: 'collections.edit',
      body: membersSchema,
      answer: membersChangedSchema,
      handle: ({ campaign, params, body }) =>
        changeMembers(context, campaign, params.collection, { scope: body.scope, into }),
    })
  }

  for (const [word, published] of [
    ['publish', true],
    ['withdraw', false],
  ] as const) {
    endpoint(app, context, {
      method: 'post',
      path: `${one}/${word}`,
      access: 'collections.publish',
      answer: collectionSchema,
      handle: ({ campaign, params }) => publishCollection(context, campaign, params.collection, published),
    })
  }
}
