import { type MigrationInterface, type QueryRunner } from 'typeorm'

/**
 * Leases are told alive by the holder's beats and no longer by a time of day. Old times stay as numbers that nobody
 * counts on: only a change matters.
 */
export class LeaseBeats1796300500000 implements MigrationInterface {
  readonly name = 'LeaseBeats1796300500000'

  async up(runner: QueryRunner): Promise<void> {
    await rename(runner, 'leaseUntil', 'leaseBeat')
  }

  /** The version before takes small numbers for times long past: its leases are then free at once. */
  async down(runner: QueryRunner): Promise<void> {
    await rename(runner, 'leaseBeat', 'leaseUntil')
  }
}

/** In every table that has such a column. */
async function rename(runner: QueryRunner, from: string, to: string): Promise<void> {
  const tables = (await runner.query(
    `SELECT t.name FROM sqlite_master t JOIN pragma_table_info(t.name) c
     WHERE t.type = 'table' AND c.name = ? ORDER BY t.name`,
    [from],
  )) as { name: string }[]
  for (const { name } of tables)
    await runner.query(`ALTER TABLE "${name}" RENAME COLUMN "${from}" TO "${to}"`)
}
