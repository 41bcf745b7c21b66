import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { createDataSource } from '../../server/data-source.ts'
import { migrations } from '../../server/migrations/index.ts'
import { Certificates1796200100000 } from '../../server/migrations/1796200100000-certificates.ts'

const place = migrations.indexOf(Certificates1796200100000)
const at = '2026-01-01T00:00:00.000Z'

let source: DataSource
beforeEach(async () => {
  source = createDataSource(':memory:')
  source.setOptions({ migrations: migrations.slice(0, place) })
  await source.initialize()
  await source.query('PRAGMA foreign_keys = ON')
  await source.runMigrations({ transaction: 'each' })
})
afterEach(() => source.destroy())

const migration = new Certificates1796200100000()
const run = async (which: 'up' | 'down') => {
  const runner = source.createQueryRunner()
  await runner.startTransaction()
  await migration[which](runner)
  await runner.commitTransaction()
}

/** Two verdicts as the release before kept them, with all they stand on. */
async function insertOldRows(): Promise<void> {
  const insert = (table: string, row: Record<string, unknown>) => {
    const columns = Object.keys(row)
    return source.query(
      `INSERT INTO "${table}" (${columns.map((name) => `"${name}"`).join(', ')})
       VALUES (${columns.map(() => '?').join(', ')})`,
      Object.values(row),
    )
  }
  await insert('account', { id: 'a', email: 'a@tests.example', name: 'A', demo: 0, createdAt: at })
  await insert('campaign', { id: 'c', name: 'C', description: '', createdAt: at })
  const columns = await source.query<{ name: string; type: string; notnull: number }[]>(
    'PRAGMA table_info(polytope)',
  )
  const needed = columns.filter(({ notnull }) => notnull === 1)
  await insert(
    'polytope',
    Object.fromEntries(
      needed.map(({ name, type }) => [name, type === 'varchar' ? 'p' : type === 'text' ? '[]' : 1]),
    ),
  )
  await insert('candidate', { key: 'k', polytopeKey: 'p', heights: '[1]' })
  await insert('target', { id: 't', campaignId: 'c', name: 'T', createdAt: at })
  const version = { id: 'v', targetId: 't', number: 1, text: 'score volume', scoringHash: 'h' }
  await insert('target_version', { ...version, authorId: 'a', createdAt: at })
  for (const [id, value, override] of [
    [3, 'verified', 1],
    [7, 'rejected', 0],
  ]) {
    const verdict = { id, value, override, campaignId: 'c', candidateKey: 'k', targetVersionId: 'v' }
    await insert('verdict', { ...verdict, reason: 'by hand', authorId: 'a', createdAt: at })
  }
}

const verdicts = () => source.query<Record<string, unknown>[]>('SELECT * FROM verdict ORDER BY id')

describe('the migration that brings certificates', () => {
  it('keeps every verdict, overrides as overrides, and their numbering', async () => {
    await insertOldRows()
    const before = await verdicts()
    await run('up')
    expect(await verdicts()).toEqual(before.map((row) => ({ ...row, certificateId: null })))
    await source.query(
      `INSERT INTO verdict (campaignId, candidateKey, targetVersionId, value, reason, override, authorId, createdAt)
       VALUES ('c', 'k', 'v', 'undecided', '', 0, 'a', ?)`,
      [at],
    )
    expect((await verdicts()).map(({ id }) => id)).toEqual([3, 7, 8])
    await expect(source.query("UPDATE verdict SET certificateId = 'nothing' WHERE id = 3")).rejects.toThrow(
      /FOREIGN KEY/,
    )
  })

  it('is taken back without losing a verdict', async () => {
    await insertOldRows()
    const before = await verdicts()
    await run('up')
    await run('down')
    expect(await verdicts()).toEqual(before)
    const left = await source.query<{ name: string }[]>(
      "SELECT name FROM sqlite_master WHERE name LIKE 'certific%' OR name LIKE 'new_%'",
    )
    expect(left).toEqual([])
    await run('up')
    expect(await source.query('PRAGMA foreign_key_check')).toEqual([])
  })
})
