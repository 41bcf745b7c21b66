import { randomBytes } from 'node:crypto'
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { availableParallelism } from 'node:os'
import { join, resolve } from 'node:path'
import { z } from 'zod'

/** A start that cannot go on, with a message for the person at the terminal. */
export class StartError extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'StartError'
  }
}

const environmentSchema = z.object({
  /** Port to listen on. */
  PORT: z.coerce.number().int().min(0).max(65535).default(4280),
  /** Address to listen on. Another than loopback is refused while demo accounts exist. */
  HOST: z.string().min(1).default('127.0.0.1'),
  /** Folder of the databases and of the local secret. */
  DATA_DIR: z.string().min(1).default('./var'),
  NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
  /** Signs session cookies. Generated once into DATA_DIR for local use; required in production. */
  SESSION_SECRET: z.string().min(32, 'must have at least 32 characters').optional(),
  /**
   * Address under which people reach the server; used in links and to tell our own origin. (BASE_URL would be the
   * obvious name, but the build tools set that one to a path.)
   */
  PUBLIC_URL: z.url({ protocol: /^https?$/ }).optional(),
  /** Number of reverse proxies in front, whose X-Forwarded-* headers are believed. */
  TRUST_PROXY: z.coerce.number().int().min(0).max(10).default(0),
  /** Worker threads for searches; interactive work has one more of its own. */
  WORKERS: z.coerce.number().int().min(1).max(128).optional(),
  /** Polytopes, weight systems or candidates in one import. */
  IMPORT_LIMIT: z.coerce.number().int().min(1).max(100_000).default(5_000),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
})

export interface Config {
  readonly port: number
  readonly host: string
  readonly dataDirectory: string
  readonly production: boolean
  readonly sessionSecret: string | null
  readonly baseUrl: string
  readonly trustProxy: number
  readonly workers: number
  readonly importLimit: number
  readonly logLevel: string
}

/**
 * The checked environment. Empty variables count as not set.
 *
 * @throws StartError that names every variable that is wrong
 */
export function readConfig(environment: Record<string, string | undefined>): Config {
  const present = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''))
  const parsed = environmentSchema.safeParse(present)
  if (!parsed.success) {
    const lines = parsed.error.issues.map(
      (issue) =>
        `  ${issue.path.join('.')}: ${issue.message} (found "${present[String(issue.path[0])] ?? ''}")`,
    )
    throw new StartError(`The configuration is wrong:\n${lines.join('\n')}`)
  }
  const values = parsed.data
  return {
    port: values.PORT,
    host: values.HOST,
    dataDirectory: resolve(values.DATA_DIR),
    production: values.NODE_ENV === 'production',
    sessionSecret: values.SESSION_SECRET ?? null,
    baseUrl: (values.PUBLIC_URL ?? `http://${urlHost(values.HOST)}:${values.PORT}`).replace(/\/$/, ''),
    trustProxy: values.TRUST_PROXY,
    workers: values.WORKERS ?? Math.max(1, availableParallelism()),
    importLimit: values.IMPORT_LIMIT,
    logLevel: values.LOG_LEVEL,
  }
}

function urlHost(host: string): string {
  return host.includes(':') ? `[${host}]` : host
}

/**
 * The secret that signs session cookies: from the environment, or, outside production, generated once into
 * DATA_DIR with mode 0600.
 */
export function sessionSecret(config: Config): string {
  if (config.sessionSecret !== null) return config.sessionSecret
  if (config.production) {
    throw new StartError('SESSION_SECRET is not set. In production it must be: 32 or more random characters.')
  }
  mkdirSync(config.dataDirectory, { recursive: true })
  const file = join(config.dataDirectory, 'session-secret')
  try {
    writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600, flag: 'wx' })
  } catch (error) {
    if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error
  }
  return readFileSync(file, 'utf8').trim()
}

/** True for addresses that only this machine can reach. */
export function isLoopback(host: string): boolean {
  return host === 'localhost' || host === '::1' || /^127(\.\d{1,3}){3}$/.test(host)
}
