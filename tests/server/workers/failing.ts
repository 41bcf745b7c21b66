import type { CertifyOutput } from '../../../server/jobs/compute/certifyCandidate.ts'
import work from '../../../server/worker.ts'

/**
 * A worker that goes wrong in the second segment of an island, or over a certificate, in the way that the rule asks
 * for; all else it does properly.
 */
export default function failingWork(job: Parameters<typeof work>[0]): unknown {
  if (job.name === 'certify-candidate') return failingCertificate(job)
  if (job.name !== 'search-segment') return work(job)
  const { problem, state } = job.input as {
    readonly problem: { readonly rule: string }
    readonly state: string | null
  }
  if (state !== null) {
    if (problem.rule.includes('# dies')) process.exit(3)
    if (problem.rule.includes('# throws')) throw new Error('thrown on purpose')
    if (problem.rule.includes('# runs out of memory')) {
      const kept: number[][] = []
      for (;;) kept.push(new Array<number>(1_000_000).fill(kept.length + 0.5))
    }
  }
  return work(job)
}

function failingCertificate(job: Parameters<typeof work>[0]): unknown {
  const { rule } = job.input as { readonly rule: string | null }
  if (rule?.includes('# the certifier throws')) throw new Error('thrown on purpose')
  if (rule?.includes('# the certifier dies')) process.exit(3)
  if (rule?.includes('# the certifier never ends')) for (;;);
  const answer = work(job) as { ok: true; value: CertifyOutput }
  if (!rule?.includes('# the certificate fails')) return answer
  const [first, ...checks] = answer.value.checks
  return {
    ...answer,
    value: { ...answer.value, passed: false, checks: [{ ...first, result: 'fail' }, ...checks] },
  }
}
