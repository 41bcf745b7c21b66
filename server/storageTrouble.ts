import { QueryFailedError } from 'typeorm'

/** The database cannot be written just now, through no fault of the data: it passes, and a later try may succeed. */
export interface StorageTrouble {
  readonly code: 'storage-full' | 'storage-busy' | 'storage-failed'
  readonly message: string
}

/** What SQLite's result codes say; extended codes begin with the name of the primary one. */
const troubles: readonly (readonly [prefix: string, trouble: StorageTrouble])[] = [
  [
    'SQLITE_FULL',
    {
      code: 'storage-full',
      message: 'The disk is full. Nothing is lost; work goes on by itself when there is room again.',
    },
  ],
  [
    'SQLITE_BUSY',
    {
      code: 'storage-busy',
      message: 'Another program keeps the database locked. Work goes on by itself when it lets go.',
    },
  ],
  ...['SQLITE_IOERR', 'SQLITE_READONLY', 'SQLITE_CANTOPEN', 'SQLITE_NOMEM', 'SQLITE_LOCKED'].map(
    (prefix): readonly [string, StorageTrouble] => [
      prefix,
      {
        code: 'storage-failed',
        message:
          'The database cannot be written just now. Nothing is lost; writing is tried again and again.',
      },
    ],
  ),
]

/** The trouble with the storage behind an error; null for errors of any other kind. */
export function storageTrouble(error: unknown): StorageTrouble | null {
  const cause: unknown = error instanceof QueryFailedError ? error.driverError : error
  if (!(cause instanceof Error) || !('code' in cause) || typeof cause.code !== 'string') return null
  const { code } = cause
  return troubles.find(([prefix]) => code.startsWith(prefix))?.[1] ?? null
}
