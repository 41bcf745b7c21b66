import connectSqlite from 'connect-sqlite3'
import session from 'express-session'
import type { RequestHandler } from 'express'
import type { Config } from '../config.ts'

const lifetimeMilliseconds = 14 * 24 * 3600 * 1000

export interface SessionStore {
  readonly store: session.Store
  close(): Promise<void>
}

/**
 * Sessions have a database file of their own. Its driver is an optional dependency whose failed build would show
 * only later, so it is opened here, at start.
 *
 * @param folder DATA_DIR, or ':memory:'
 */
export async function openSessionStore(folder: string): Promise<SessionStore> {
  const Store = connectSqlite(session)
  const place =
    folder === ':memory:' ? { db: ':memory:' } : { dir: folder, db: 'sessions.sqlite', concurrentDb: true }
  const store = new Store(place)
  await new Promise<void>((resolve, reject) => {
    store.client.once('connect', () => resolve())
    store.db.once('error', reject)
  })
  return {
    store,
    close: () =>
      new Promise((resolve, reject) => store.db.close((error) => (error ? reject(error) : resolve()))),
  }
}

/** The cookie is never readable by scripts, never sent along from other sites, and over https only if we are. */
export function sessionCookie(config: Config, store: session.Store, secret: string): RequestHandler {
  const secure = config.baseUrl.startsWith('https:')
  return session({
    store,
    secret,
    name: secure ? '__Host-tessellary' : 'tessellary',
    resave: false,
    saveUninitialized: false,
    rolling: false,
    cookie: { path: '/', httpOnly: true, sameSite: 'lax', secure, maxAge: lifetimeMilliseconds },
  })
}
