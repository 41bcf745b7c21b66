import { certify } from '../certificates/certify.ts'
import { recheck, type Recheck } from '../certificates/recheck.ts'
import { certificateRequest } from '../certificates/requestOfInput.ts'
import type { Certificate } from '../certificates/schema.ts'

/** What the command prints, and how it ends: 0 passed, 1 failed, 2 no certificate at all. */
export interface CertifyReport<T> {
  readonly output: T
  readonly status: 0 | 1 | 2
}

/** What re-checking prints. */
export interface RecheckOutput extends Recheck {
  readonly schema: 'tessellary.recheck/1'
}

/** Re-checks a certificate file. A file that is no certificate has problems and no checks. */
export function recheckFile(input: unknown): CertifyReport<RecheckOutput> {
  const result = recheck(input, () => performance.now())
  const status = result.passed ? 0 : result.checks.length === 0 ? 2 : 1
  return { output: { schema: 'tessellary.recheck/1', ...result }, status }
}

/**
 * Makes a certificate from an input of the headless evaluation.
 * @throws InputError as `certificateRequest`
 */
export function makeCertificate(input: unknown): CertifyReport<Certificate> {
  const output = certify(certificateRequest(input), () => performance.now())
  return { output, status: output.passed ? 0 : 1 }
}
