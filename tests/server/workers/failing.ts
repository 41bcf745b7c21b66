import { existsSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { findObservable } from '../../../scoring/observables/registry.ts'
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
    readonly problem: { readonly rule: string; readonly island: number }
    readonly state: string | null
  }
  volumeIsBroken = state !== null && problem.rule.includes('# an observable throws')
  if (state !== null) {
    const [, folder] = /# dies now and then (\S+)/.exec(problem.rule) ?? []
    if (folder !== undefined) dieOnce(folder, problem.island, state)
    if (problem.rule.includes('# never returns')) for (;;) Atomics.wait(nobody, 0, 0)
    if (/# dies$/m.test(problem.rule)) process.exit(3)
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

const nobody = new Int32Array(new SharedArrayBuffer(4))

let volumeIsBroken = false
const volume = findObservable('volume')
if (volume?.kind !== 'scalar') throw new Error('There is no observable named volume.')
const readVolume = volume.read.bind(volume)
volume.read = (candidate, scale) => {
  if (volumeIsBroken) throw new Error('a bug in an observable')
  return readVolume(candidate, scale)
}

/** Ends the thread, once for every thirty evaluations of an island, before a segment that is not its first. */
function dieOnce(folder: string, island: number, state: string): void {
  const { evaluations } = JSON.parse(state) as { readonly evaluations: number }
  const stretch = Math.floor(evaluations / 30)
  const mark = join(folder, `${island}-${stretch}`)
  if (existsSync(mark)) return
  writeFileSync(mark, '')
  process.exit(3)
}
