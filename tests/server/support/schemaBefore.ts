import type { DataSource, MigrationInterface } from 'typeorm'
import { createDataSource } from '../../../server/data-source.ts'
import { migrations } from '../../../server/migrations/index.ts'

/** A database in memory with the schema as it was just before a migration, foreign keys kept. */
export async function schemaBefore(migration: new () => MigrationInterface): Promise<DataSource> {
  const source = createDataSource(':memory:')
  await source.initialize()
  await source.query('PRAGMA foreign_keys = ON')
  const runner = source.createQueryRunner()
  for (const Earlier of migrations) {
    if (Earlier === migration) return source
    await new Earlier().up(runner)
  }
  throw new Error(`${migration.name} is not among the migrations.`)
}
