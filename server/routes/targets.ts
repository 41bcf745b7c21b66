import type { Express } from 'express'
import { z } from 'zod'
import {
  checkRuleRequestSchema,
  checkRuleResponseSchema,
  createTargetSchema,
  createTargetVersionSchema,
  previewRequestSchema,
  previewSchema,
  targetDetailSchema,
  targetSummarySchema,
  targetUsesSchema,
} from '../../shared/targets.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { presentTarget, presentTargetSummary } from '../presenters/targets.ts'
import { checkRuleText } from '../services/rules.ts'
import { readTargetUses } from '../services/targetUses.ts'
import { addVersion, createTarget, listTargets, readTarget, renameTarget } from '../services/targets.ts'

const renameTargetSchema = createTargetSchema.pick({ name: true })

export function targetRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/targets',
    access: 'campaign.read',
    answer: z.array(targetSummarySchema),
    handle: async ({ campaign }) => {
      const targets = await listTargets(manager, campaign.id)
      return targets.map(({ target, versions }) => presentTargetSummary(target, versions))
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/targets',
    access: 'targets.edit',
    body: createTargetSchema,
    answer: targetDetailSchema,
    status: 201,
    handle: async ({ campaign, account, body }) => {
      const { target, versions, latestScope } = await createTarget(context, campaign.id, account.id, body)
      return presentTarget(target, versions, latestScope)
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/targets/:target',
    access: 'campaign.read',
    answer: targetDetailSchema,
    handle: async ({ campaign, params }) => {
      const { target, versions, latestScope } = await readTarget(manager, campaign.id, params.target)
      return presentTarget(target, versions, latestScope)
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/targets/:target/uses',
    access: 'campaign.read',
    answer: targetUsesSchema,
    handle: ({ campaign, params }) => readTargetUses(manager, campaign.id, params.target),
  })

  endpoint(app, context, {
    method: 'patch',
    path: '/api/campaigns/:campaign/targets/:target',
    access: 'targets.edit',
    body: renameTargetSchema,
    answer: targetDetailSchema,
    handle: async ({ campaign, params, body }) => {
      const { target, versions, latestScope } = await renameTarget(
        context,
        campaign.id,
        params.target,
        body.name,
      )
      return presentTarget(target, versions, latestScope)
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/targets/:target/versions',
    access: 'targets.edit',
    body: createTargetVersionSchema,
    answer: targetDetailSchema,
    status: 201,
    handle: async ({ campaign, account, params, body }) => {
      const { target, versions, latestScope } = await addVersion(
        context,
        campaign.id,
        params.target,
        account.id,
        body.text,
      )
      return presentTarget(target, versions, latestScope)
    },
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/rules/check',
    access: 'campaign.read',
    body: checkRuleRequestSchema,
    answer: checkRuleResponseSchema,
    handle: ({ body }) => checkRuleText(body.text),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/previews',
    access: 'previews.run',
    body: previewRequestSchema,
    answer: previewSchema,
    status: 202,
    handle: ({ campaign, account, body }) => context.jobs.previews.start(campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/previews/:preview',
    access: 'previews.run',
    answer: previewSchema,
    handle: ({ account, params }) => context.jobs.previews.read(account.id, params.preview),
  })

  endpoint(app, context, {
    method: 'delete',
    path: '/api/campaigns/:campaign/previews',
    access: 'previews.run',
    handle: ({ account }) => context.jobs.previews.stop(account.id),
  })
}
