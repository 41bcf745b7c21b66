import work from '../../../server/worker.ts'

/**
 * A worker that goes wrong in the second segment of an island, in the way that the search's rule asks for; all else
 * it does properly.
 */
export default function failingWork(job: Parameters<typeof work>[0]): unknown {
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
