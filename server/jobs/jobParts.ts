import type { Logger } from 'pino'
import type { DataSource } from 'typeorm'
import type { Streams } from '../streams.ts'
import type { WriteLock } from '../writeLock.ts'
import type { ComputePool } from './computePool.ts'
import type { Scheduler } from './scheduler.ts'
import type { StorageGate } from './storageGate.ts'

/** What the jobs work with. */
export interface JobParts {
  readonly source: DataSource
  readonly writes: WriteLock
  readonly streams: Streams
  readonly log: Logger
  readonly scheduler: Scheduler
  /** What jobs have computed is written through here: it waits while the disk is full. */
  readonly storage: StorageGate
  /** Threads for searches, null samples and the library, at lowered priority. */
  readonly background: ComputePool
  /** A thread for what somebody waits for: previews, imports, dossiers. */
  readonly interactive: ComputePool
  /** See `segmentMilliseconds` in `pace.ts`. */
  readonly segmentMilliseconds: number
  /** How long a piece of a search or null sample may take before its thread is taken for stuck. */
  readonly pieceLimitMilliseconds: number
  /** Aborted when the server shuts down. */
  readonly closing: AbortSignal
}
