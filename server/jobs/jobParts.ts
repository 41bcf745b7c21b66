import type { Logger } from 'pino'
import type { DataSource } from 'typeorm'
import type { Streams } from '../streams.ts'
import type { WriteLock } from '../writeLock.ts'
import type { ComputePool } from './computePool.ts'
import type { Scheduler } from './scheduler.ts'

/** What the jobs work with. */
export interface JobParts {
  readonly source: DataSource
  readonly writes: WriteLock
  readonly streams: Streams
  readonly log: Logger
  readonly scheduler: Scheduler
  /** Threads for searches, null samples and the library, at lowered priority. */
  readonly background: ComputePool
  /** A thread for what somebody waits for: previews, imports, dossiers. */
  readonly interactive: ComputePool
  /** Aborted when the server shuts down. */
  readonly closing: AbortSignal
}
