import type { Express } from 'express'
import { z } from 'zod'
import {
  candidateCertificatesSchema,
  certificationSchema,
  requestCertificationSchema,
} from '../../shared/certificates.ts'
import type { ServerContext } from '../context.ts'
import { endpoint } from '../http/endpoint.ts'
import {
  listCampaignCertificates,
  listGeometryCertificates,
  readCertificateBody,
} from '../services/certificates.ts'
import { cancelCertification, listCertifications, requestCertification } from '../services/certifications.ts'

export function certificateRoutes(app: Express, context: ServerContext): void {
  const { manager } = context.source

  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/:key/certificates',
    access: 'account',
    answer: candidateCertificatesSchema,
    handle: ({ account, params }) => listGeometryCertificates(manager, account.id, params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/candidates/:key/certificates/:certificate',
    access: 'account',
    handle: async ({ account, params, response }) => {
      const body = await readCertificateBody(manager, account.id, params.key, params.certificate)
      response
        .attachment(`certificate-${params.key.slice(0, 10)}.json`)
        .type('application/json')
        .send(body)
    },
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/candidates/:key/certificates',
    access: 'campaign.read',
    answer: candidateCertificatesSchema,
    handle: ({ campaign, params }) => listCampaignCertificates(manager, campaign.id, params.key),
  })

  endpoint(app, context, {
    method: 'get',
    path: '/api/campaigns/:campaign/certifications',
    access: 'campaign.read',
    answer: z.array(certificationSchema),
    handle: ({ campaign }) => listCertifications(manager, campaign.id),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/certifications',
    access: 'certificates.run',
    body: requestCertificationSchema,
    answer: certificationSchema,
    status: 201,
    handle: ({ campaign, account, body }) => requestCertification(context, campaign.id, account.id, body),
  })

  endpoint(app, context, {
    method: 'post',
    path: '/api/campaigns/:campaign/certifications/:certification/cancel',
    access: 'certificates.run',
    answer: certificationSchema,
    handle: ({ campaign, params }) => cancelCertification(context, campaign.id, params.certification),
  })
}
