import { fileURLToPath } from 'node:url'
import Piscina from 'piscina'
import type { BenchJob, BenchRun } from './benchThread.ts'

/** Runs the jobs of a bench, several at a time. */
export interface BenchThreads {
  run(job: BenchJob): Promise<BenchRun>
  close(): Promise<void>
}

export function benchThreads(count: number): BenchThreads {
  const pool = new Piscina({
    filename: fileURLToPath(new URL('./benchThread.ts', import.meta.url)),
    minThreads: count,
    maxThreads: count,
    execArgv: ['--import', import.meta.resolve('tsx')],
  })
  return {
    run: (job) => pool.run(job) as Promise<BenchRun>,
    close: () => pool.destroy(),
  }
}
