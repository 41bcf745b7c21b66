import type { CertificateReport, Certification as CertificationView } from '../../shared/certificates.ts'
import type { CertificateRecord } from '../entities/certificate.ts'
import type { Certification } from '../entities/certification.ts'

/**
 * @param certificate with author, target version and target loaded
 * @param withAuthor false for readers outside the campaign in which it was asked for
 */
export function presentCertificate(certificate: CertificateRecord, withAuthor: boolean): CertificateReport {
  const version = certificate.targetVersion
  return {
    id: certificate.id,
    passed: certificate.passed,
    scoring:
      certificate.scoringHash === null || !version
        ? null
        : {
            targetId: version.targetId,
            targetName: version.target?.name ?? '',
            targetVersion: version.number,
            targetVersionId: version.id,
            scoringHash: certificate.scoringHash,
          },
    engineVersion: certificate.engineVersion,
    certifierVersion: certificate.certifierVersion,
    createdAt: certificate.createdAt,
    author: withAuthor ? (certificate.author?.name ?? '') : null,
    milliseconds: certificate.milliseconds,
    checks: certificate.checks,
    notCertified: certificate.notCertified,
  }
}

/** How far a request has come. */
export interface CertificationCounts {
  readonly waiting: number
  readonly passed: number
  readonly failed: number
  readonly broken: number
  readonly problems: readonly { readonly candidateKey: string; readonly message: string }[]
}

/** @param certification with author, target version and target loaded */
export function presentCertification(
  certification: Certification,
  { problems, ...counts }: CertificationCounts,
): CertificationView {
  const version = certification.targetVersion
  return {
    id: certification.id,
    state: certification.state,
    targetVersionId: certification.targetVersionId,
    targetName: version?.target?.name ?? null,
    targetVersion: version?.number ?? null,
    total: counts.waiting + counts.passed + counts.failed + counts.broken,
    ...counts,
    problems: [...problems],
    author: certification.author?.name ?? '',
    createdAt: certification.createdAt,
    finishedAt: certification.finishedAt,
  }
}
