import { certify } from '../../../scoring/index.ts'
import type { CertificateCheck } from '../../../shared/certificates.ts'

export interface CertifyInput {
  readonly key: string
  /** Vertices in normal-form coordinates. */
  readonly vertices: number[][]
  readonly heights: number[]
  /** null: geometry alone. */
  readonly rule: string | null
}

export interface CertifyOutput {
  readonly passed: boolean
  readonly scoringHash: string | null
  readonly engineVersion: string
  readonly certifierVersion: string
  readonly checks: CertificateCheck[]
  readonly notCertified: { what: string; why: string }[]
  /** The whole certificate as JSON text: text crosses between threads at the cost of a copy. */
  readonly body: string
  /** Time it took on its thread. */
  readonly milliseconds: number
}

/** Certifies a stored candidate by the independent road. */
export function certifyCandidate({ key, vertices, heights, rule }: CertifyInput): CertifyOutput {
  const begun = performance.now()
  const certificate = certify({ vertices, heights, candidateKey: key, rule }, () => performance.now())
  const { passed, scoringHash, engineVersion, certifierVersion } = certificate
  return {
    passed,
    scoringHash,
    engineVersion,
    certifierVersion,
    checks: certificate.checks.map((check) => ({ ...check })),
    notCertified: certificate.notCertified.map(({ what, why }) => ({ what, why })),
    body: JSON.stringify(certificate),
    milliseconds: performance.now() - begun,
  }
}
