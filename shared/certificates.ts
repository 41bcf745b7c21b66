import { z } from 'zod'
import { candidateKeySchema } from './keys.ts'

/** One comparison of the two roads, with both numbers. */
export const certificateCheckSchema = z.object({
  /** Stable. */
  id: z.string(),
  group: z.string(),
  title: z.string(),
  result: z.enum(['pass', 'fail', 'not-done']),
  fast: z.union([z.string(), z.number()]).nullable(),
  independent: z.union([z.string(), z.number()]).nullable(),
  /** Relative, where the comparison is one of floating-point numbers; null: exact. */
  tolerance: z.number().nullable(),
  note: z.string(),
  milliseconds: z.number(),
})
export type CertificateCheck = z.infer<typeof certificateCheckSchema>

/** A certificate without the numbers that were compared; the whole is a download. */
export const certificateReportSchema = z.object({
  id: z.string(),
  passed: z.boolean(),
  /** What it certifies beside the geometry: the scoring of a target version, or nothing. */
  scoring: z
    .object({
      targetId: z.string(),
      targetName: z.string(),
      targetVersion: z.number().int(),
      targetVersionId: z.string(),
      scoringHash: z.string(),
    })
    .nullable(),
  engineVersion: z.string(),
  certifierVersion: z.string(),
  createdAt: z.string(),
  /** null for readers who do not share a campaign with the author's work. */
  author: z.string().nullable(),
  /** Of worker time. */
  milliseconds: z.number(),
  checks: z.array(certificateCheckSchema),
  notCertified: z.array(z.object({ what: z.string(), why: z.string() })),
})
export type CertificateReport = z.infer<typeof certificateReportSchema>

export const certificationStates = ['queued', 'running', 'finished', 'cancelled'] as const
export type CertificationState = (typeof certificationStates)[number]

/** A request to certify one candidate or many: worked off in their order. */
export const certificationSchema = z.object({
  id: z.string(),
  state: z.enum(certificationStates),
  /** null: geometry alone. */
  targetVersionId: z.string().nullable(),
  targetName: z.string().nullable(),
  targetVersion: z.number().int().nullable(),
  total: z.number().int(),
  waiting: z.number().int(),
  passed: z.number().int(),
  failed: z.number().int(),
  /** No certificate came of these: the computation itself went wrong. At most five are listed. */
  broken: z.number().int(),
  problems: z.array(z.object({ candidateKey: candidateKeySchema, message: z.string() })),
  author: z.string(),
  createdAt: z.string(),
  finishedAt: z.string().nullable(),
})
export type Certification = z.infer<typeof certificationSchema>

/**
 * GET /api/campaigns/:campaign/candidates/:key/certificates, newest first: the campaign's own, and those of the
 * geometry alone. GET /api/candidates/:key/certificates gives only the latter.
 */
export const candidateCertificatesSchema = z.object({
  certificates: z.array(certificateReportSchema),
  /** Requests of this campaign in which the candidate still waits. */
  waiting: z.array(
    z.object({
      certificationId: z.string(),
      targetVersionId: z.string().nullable(),
      /** Candidates before it in the same request. */
      before: z.number().int(),
    }),
  ),
})
export type CandidateCertificates = z.infer<typeof candidateCertificatesSchema>

export const certificationLimit = 500

/** POST /api/campaigns/:campaign/certifications */
export const requestCertificationSchema = z.object({
  /** null: geometry alone. */
  targetVersionId: z.string().nullable(),
  candidateKeys: z.array(candidateKeySchema).min(1).max(certificationLimit),
  /** Also those that have a certificate of this scoring by the present certifier. */
  again: z.boolean().default(false),
})
export type RequestCertification = z.infer<typeof requestCertificationSchema>

/** What a list says of a candidate's certificate for the list's scoring. */
export const certificateMarkSchema = z.object({
  state: z.enum(['none', 'waiting', 'passed', 'failed']),
  id: z.string().nullable(),
})
export type CertificateMark = z.infer<typeof certificateMarkSchema>
