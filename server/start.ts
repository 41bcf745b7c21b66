import { createServer, type Server } from 'node:http'
import { join } from 'node:path'
import type { Express } from 'express'
import { buildApp } from './app.ts'
import { isLoopback, StartError, type Config } from './config.ts'
import type { ServerContext } from './context.ts'
import { openDataSource } from './data-source.ts'
import { openSessionStore } from './http/sessions.ts'
import { recheckMilliseconds, whyClosed } from './http/streamAccess.ts'
import { openJobs, type JobOptions } from './jobs/jobs.ts'
import { hasDemo } from './library/demo.ts'
import { Library } from './library/library.ts'
import { createLog } from './logging.ts'
import { Streams } from './streams.ts'
import { readVersion } from './version.ts'
import { WriteLock } from './writeLock.ts'

export interface OpenServer {
  readonly context: ServerContext
  readonly app: Express
  /** Ends the event streams whose owners may not read them any more; done once a minute. */
  recheckStreams(): Promise<void>
  /** Lets go of everything, in an order in which nothing is cut off half way. */
  close(): Promise<void>
}

export interface OpenOptions {
  /** Keep the databases in memory (tests). */
  readonly inMemory?: boolean
  readonly checkAnswers?: boolean
  readonly jobs?: JobOptions
}

/** Opens databases, job pools and the application, without listening yet. */
export async function openServer(config: Config, options: OpenOptions = {}): Promise<OpenServer> {
  const log = createLog(config.logLevel)
  const file = options.inMemory ? ':memory:' : join(config.dataDirectory, 'tessellary.sqlite')
  const source = await openDataSource(file)
  const writes = new WriteLock(source)
  const streams = new Streams()
  const sessions = await openSessionStore(options.inMemory ? ':memory:' : config.dataDirectory)
  const jobs = openJobs({ source, writes, streams, log, workers: config.workers }, options.jobs)
  const library = new Library({
    source,
    writes,
    streams,
    log,
    scheduler: jobs.scheduler,
    storage: jobs.storage,
    pool: jobs.background,
  })
  const context: ServerContext = {
    config,
    version: readVersion(),
    source,
    writes,
    log,
    streams,
    jobs,
    library,
    checkAnswers: options.checkAnswers ?? false,
  }
  const app = buildApp(context, sessions.store)
  const recheckStreams = () => streams.recheck((owner) => whyClosed(source, sessions.store, owner))
  const rechecks = setInterval(() => {
    recheckStreams().catch((error: unknown) => log.error({ err: error }, 'open streams were not checked'))
  }, recheckMilliseconds)
  rechecks.unref()
  return {
    context,
    app,
    recheckStreams,
    close: async () => {
      clearInterval(rechecks)
      streams.closeAll()
      await jobs.close()
      await writes.idle()
      await source.destroy()
      await sessions.close()
    },
  }
}

/** @throws StartError when demo accounts, whose passwords are public, would be reachable from elsewhere */
export async function refuseExposedDemo(context: ServerContext): Promise<void> {
  const { config } = context
  if (isLoopback(config.host)) return
  if (await hasDemo(context)) {
    throw new StartError(
      `HOST is ${config.host}, but the database holds demo accounts with a public password. ` +
        'Listen on 127.0.0.1, or start with another DATA_DIR.',
    )
  }
}

export async function listen(app: Express, { port, host }: Config): Promise<Server> {
  const server = createServer(app)
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, host, () => resolve())
  }).catch((error: unknown) => {
    const code = error instanceof Error && 'code' in error ? error.code : undefined
    if (code === 'EADDRINUSE')
      throw new StartError(`Port ${port} on ${host} is in use: set PORT to another one.`)
    throw error
  })
  return server
}
