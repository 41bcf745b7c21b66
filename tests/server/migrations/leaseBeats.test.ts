import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { createDataSource } from '../../../server/data-source.ts'
import { migrations } from '../../../server/migrations/index.ts'
import { LeaseBeats1796300500000 } from '../../../server/migrations/1796300500000-leaseBeats.ts'

const place = migrations.indexOf(LeaseBeats1796300500000)
const at = '2026-01-01T00:00:00.000Z'

let source: DataSource
beforeEach(async () => {
  source = createDataSource(':memory:')
  source.setOptions({ migrations: migrations.slice(0, place) })
  await source.initialize()
  await source.runMigrations({ transaction: 'each' })
})
afterEach(() => source.destroy())

const migration = new LeaseBeats1796300500000()
const run = async (which: 'up' | 'down') => {
  const runner = source.createQueryRunner()
  await runner.startTransaction()
  await migration[which](runner)
  await runner.commitTransaction()
}

const read = () => source.query<Record<string, unknown>[]>('SELECT * FROM certification')

describe('the migration that counts the beats of leases', () => {
  it('keeps every row and its lease, up and down', async () => {
    const insert = (table: string, row: Record<string, unknown>) => {
      const names = Object.keys(row)
      const sql = `INSERT INTO "${table}" (${names.join(', ')}) VALUES (${names.map(() => '?').join(', ')})`
      return source.query(sql, Object.values(row))
    }
    await insert('account', { id: 'a', email: 'a@tests.example', name: 'A', demo: 0, createdAt: at })
    await insert('campaign', { id: 'c', name: 'C', description: '', createdAt: at })
    const lease = { leaseOwner: 'machine/1/word', leaseUntil: 1_796_000_000_000 }
    const row = { id: 'r', campaignId: 'c', state: 'running', authorId: 'a', createdAt: at }
    await insert('certification', { ...row, ...lease })
    const [before] = await read()
    await run('up')
    const { leaseUntil, ...rest } = before
    expect(await read()).toEqual([{ ...rest, leaseBeat: leaseUntil }])
    const columns = await source.query<{ name: string }[]>('PRAGMA table_info(search)')
    expect(columns.map(({ name }) => name)).toContain('leaseBeat')
    await run('down')
    expect(await read()).toEqual([before])
  })
})
