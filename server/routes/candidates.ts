import type { Express } from 'express'
import { z } from 'zod'
import { candidateAlignmentSchema } from '../../shared/candidateAlignment.ts'
import {
  candidateGeometrySchema,
  candidateRecordSchema,
  candidateScoreQuerySchema,
  candidateScoreSchema,
  candidateSpectraSchema,
  classPictureSchema,
  classPicturesQuerySchema,
} from '../../shared/candidates.ts'
import { coneSliceQuerySchema, coneSliceSchema } from '../../shared/coneSlices.ts'
import { candidateRelativesSchema, relativesQuerySchema } from '../../shared/relatives.ts'
import { giveVerdictSchema, verdictSchema } from '../../shared/verdicts.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { presentVerdict } from '../presenters/verdicts.ts'
import { readCandidateScore } from '../services/candidateScores.ts'
import { readCandidateRecord } from '../services/candidates.ts'
import {
  readAlignment,
  readCandidateGeometry,
  readCandidateSpectra,
  readClassPictures,
  readConeSlice,
} from '../services/geometry.ts'
import { readRelatives } from '../services/relatives.ts'
import { giveVerdict } from '../services/verdictGiving.ts'
import { viewerOf } from '../services/viewers.ts'

export function candidateRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/pictures',
    access: 'account',
    query: classPicturesQuerySchema,
    answer: z.array(classPictureSchema),
    lasting: true,
    handle: ({ account, query }) => readClassPictures(context, account.id, query.keys),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/:key/spectra',
    access: 'account',
    answer: candidateSpectraSchema,
    lasting: true,
    handle: ({ account, params }) => readCandidateSpectra(context, account.id, params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/:key/slice',
    access: 'account',
    query: coneSliceQuerySchema,
    answer: coneSliceSchema,
    lasting: true,
    handle: ({ account, params, query }) => readConeSlice(context, account.id, params.key, query),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/:key/alignment/:other',
    access: 'account',
    answer: candidateAlignmentSchema,
    lasting: true,
    handle: ({ account, params }) => readAlignment(context, account.id, params.key, params.other),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/:key/relatives',
    access: 'account',
    query: relativesQuerySchema,
    answer: candidateRelativesSchema,
    handle: async ({ account, params, query }) => {
      const viewer = await viewerOf(context.source.manager, account.id, query.campaign)
      return readRelatives(context, viewer, params.key)
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/:key',
    access: 'account',
    answer: candidateGeometrySchema,
    lasting: true,
    handle: ({ account, params }) => readCandidateGeometry(context, account.id, params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/candidates/:key',
    access: 'campaign.read',
    answer: candidateRecordSchema,
    handle: ({ campaign, params }) => readCandidateRecord(context.source.manager, campaign.id, params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/candidates/:key/score',
    access: 'previews.run',
    query: candidateScoreQuerySchema,
    answer: candidateScoreSchema,
    handle: ({ campaign, params, query }) =>
      readCandidateScore(context, campaign.id, params.key, query.version),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/candidates/:key/verdicts',
    access: 'verdicts.give',
    body: giveVerdictSchema,
    answer: verdictSchema,
    status: 201,
    handle: async ({ campaign, account, params, body }) =>
      presentVerdict(
        await giveVerdict(context, { campaignId: campaign.id, candidateKey: params.key }, account, body),
      ),
  })
}
