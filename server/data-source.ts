import 'reflect-metadata'
import { mkdirSync } from 'node:fs'
import { dirname } from 'node:path'
import { DataSource } from 'typeorm'
import { entities } from './entities/index.ts'
import { migrations } from './migrations/index.ts'

/**
 * The application's database. Write-ahead logging, so that the command line may read and write beside a running
 * server; foreign keys are enforced. The schema changes by migrations only.
 *
 * @param file path of the SQLite file, or ':memory:'
 */
export function createDataSource(file: string): DataSource {
  if (file !== ':memory:') mkdirSync(dirname(file), { recursive: true })
  return new DataSource({
    type: 'better-sqlite3',
    database: file,
    entities,
    migrations,
    synchronize: false,
    migrationsRun: false,
    enableWAL: file !== ':memory:',
    timeout: 5000,
    logging: false,
  })
}

/** Opens the database and brings its schema up to date. */
export async function openDataSource(file: string): Promise<DataSource> {
  const source = createDataSource(file)
  await source.initialize()
  await source.query('PRAGMA foreign_keys = ON')
  await source.query('PRAGMA synchronous = NORMAL')
  await source.runMigrations({ transaction: 'each' })
  return source
}
