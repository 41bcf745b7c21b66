declare module 'connect-sqlite3' {
  import type session from 'express-session'
  import type { EventEmitter } from 'node:events'

  interface SqliteDatabase extends EventEmitter {
    close(done: (error: Error | null) => void): void
  }

  interface SqliteStore extends session.Store {
    readonly client: EventEmitter
    readonly db: SqliteDatabase
  }

  interface Place {
    readonly db: string
    readonly dir?: string
    readonly concurrentDb?: boolean
  }

  export default function connect(module: typeof session): new (place: Place) => SqliteStore
}
