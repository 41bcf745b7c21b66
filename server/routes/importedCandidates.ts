import type { Express } from 'express'
import multer from 'multer'
import {
  candidateImportReportSchema,
  importCandidatesSchema,
  importedCandidatePageSchema,
  importedCandidatesQuerySchema,
  importOptionsSchema,
  shortlistImportedSchema,
} from '../../shared/importedCandidates.ts'
import { pastedLimitBytes, uploadLimitBytes } from '../../shared/polytopes.ts'
import { shortlistDetailSchema } from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import { uploadedText } from '../http/uploadedText.ts'
import { importCandidates } from '../services/importCandidates.ts'
import { forgetImportedCandidate, listImportedCandidates } from '../services/importedCandidates.ts'
import { shortlistImported } from '../services/importedShortlists.ts'

const base = '/api/campaigns/:campaign/imported-candidates'

const upload = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: uploadLimitBytes, files: 1, fields: 4 },
})

export function importedCandidateRoutes(app: Express, context: ServerContext): void {
  endpoint(app, context, {
    method: 'get',
    path: base,
    access: 'campaign.read',
    query: importedCandidatesQuerySchema,
    answer: importedCandidatePageSchema,
    handle: ({ campaign, query }) => listImportedCandidates(context.source.manager, campaign.id, query),
  })

  endpoint(app, context, {
    method: 'post',
    path: base,
    access: 'polytopes.import',
    body: importCandidatesSchema,
    // A pasted text may grow when it is written as JSON: each line break takes two characters.
    bodyLimit: 3 * pastedLimitBytes,
    answer: candidateImportReportSchema,
    status: 201,
    handle: ({ campaign, account, body: { source, ...body } }) =>
      importCandidates(
        context,
        { campaignId: campaign.id, authorId: account.id },
        { ...body, source: source || 'pasted text' },
      ),
  })

  endpoint(app, context, {
    method: 'post',
    path: `${base}/upload`,
    access: 'polytopes.import',
    before: upload.single('file'),
    answer: candidateImportReportSchema,
    status: 201,
    handle: ({ campaign, account, request }) => {
      const { text, name: source } = uploadedText(request)
      const options = importOptionsSchema.parse(request.body ?? {})
      return importCandidates(
        context,
        { campaignId: campaign.id, authorId: account.id },
        { ...options, text, source },
      )
    },
  })

  endpoint(app, context, {
    method: 'delete',
    path: `${base}/:key`,
    access: 'polytopes.import',
    handle: ({ campaign, params }) => forgetImportedCandidate(context, campaign.id, params.key),
  })

  endpoint(app, context, {
    method: 'post',
    path: `${base}/shortlists`,
    access: 'shortlists.edit',
    body: shortlistImportedSchema,
    // 5,000 keys.
    bodyLimit: 400_000,
    answer: shortlistDetailSchema,
    status: 201,
    handle: ({ campaign, account, body }) => shortlistImported(context, campaign.id, account.id, body),
  })
}
