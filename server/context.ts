import type { Logger } from 'pino'
import type { DataSource } from 'typeorm'
import type { Config } from './config.ts'
import type { Jobs } from './jobs/jobs.ts'
import type { Library } from './library/library.ts'
import type { Streams } from './streams.ts'
import type { WriteLock } from './writeLock.ts'

/** What the server's parts share; built once at start (or once per test). */
export interface ServerContext {
  readonly config: Config
  readonly version: string
  readonly source: DataSource
  /** Every write goes through here. */
  readonly writes: WriteLock
  readonly log: Logger
  readonly streams: Streams
  readonly jobs: Jobs
  readonly library: Library
  /** Tests: every answer is checked against its schema before it is sent. */
  readonly checkAnswers: boolean
}
