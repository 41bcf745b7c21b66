import { fileURLToPath } from 'node:url'
import Piscina from 'piscina'
import { JobSession, segmentJob, type SegmentInput, type SegmentOutput } from '../search/jobs.ts'

/** Runs segments, several at a time. */
export interface SegmentThreads {
  run(input: SegmentInput): Promise<SegmentOutput>
  close(): Promise<void>
}

/** One thread: this one. */
export function inPlace(): SegmentThreads {
  const session = new JobSession()
  return {
    // Behind a turn of the event loop, so that output and signals get theirs between segments.
    run: (input) => new Promise((resolve) => setImmediate(() => resolve(segmentJob(input, session)))),
    close: () => Promise.resolve(),
  }
}

/** Worker threads; a segment waits for a free one. A thread that dies fails its segment. */
export function workerThreads(count: number): SegmentThreads {
  const source = import.meta.url.endsWith('.ts')
  const pool = new Piscina({
    filename: fileURLToPath(new URL(`./segmentThread${source ? '.ts' : '.js'}`, import.meta.url)),
    minThreads: count,
    maxThreads: count,
    // Source needs the loader; the build needs nothing.
    execArgv: source ? ['--import', import.meta.resolve('tsx')] : [],
  })
  // Without a listener a thread that fails while idle would end the process; its next segment reports it.
  pool.on('error', () => undefined)
  return {
    run: (input) => pool.run(input) as Promise<SegmentOutput>,
    close: () => pool.destroy(),
  }
}
