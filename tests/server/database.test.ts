import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { openDataSource } from '../../server/data-source.ts'
import { Campaign } from '../../server/entities/campaign.ts'
import { Membership } from '../../server/entities/membership.ts'
import { WriteLock } from '../../server/writeLock.ts'

const campaign = (id: string) => ({ id, name: id, description: '', createdAt: '2026-01-01T00:00:00.000Z' })
const pause = () => new Promise((resolve) => setImmediate(resolve))

let source: DataSource
beforeEach(async () => {
  source = await openDataSource(':memory:')
})
afterEach(() => source.destroy())

describe('the schema', () => {
  it('made by the migrations is the one the entities describe', async () => {
    const { upQueries } = await source.driver.createSchemaBuilder().log()
    expect(upQueries.map(({ query }) => query)).toEqual([])
  })

  it('can be taken back to nothing', async () => {
    for (let left = source.migrations.length; left > 0; left--) await source.undoLastMigration()
    const tables = await source.query<{ name: string }[]>(
      "SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT IN ('migrations', 'sqlite_sequence')",
    )
    expect(tables).toEqual([])
  })

  it('enforces foreign keys', async () => {
    await expect(
      source.manager.insert(Membership, { campaignId: 'none', accountId: 'none', role: 'lead' }),
    ).rejects.toThrow(/FOREIGN KEY/)
  })
})

describe('the write lock', () => {
  it('is needed: without it two transactions at once fail on the one connection', async () => {
    const plain = (id: string) =>
      source.transaction(async (manager) => {
        await manager.insert(Campaign, campaign(id))
        await pause()
      })
    const results = await Promise.allSettled([plain('a'), plain('b')])
    expect(results.some(({ status }) => status === 'rejected')).toBe(true)
  })

  it('lets transactions pass one at a time, in order', async () => {
    const writes = new WriteLock(source)
    const order: string[] = []
    await Promise.all(
      ['a', 'b', 'c'].map((id) =>
        writes.transaction(async (manager) => {
          order.push(`begin ${id}`)
          await manager.insert(Campaign, campaign(id))
          await pause()
          order.push(`end ${id}`)
        }),
      ),
    )
    expect(order).toEqual(['begin a', 'end a', 'begin b', 'end b', 'begin c', 'end c'])
    expect(await source.manager.count(Campaign)).toBe(3)
  })

  it("keeps a write that was asked for while another's transaction was about to roll back", async () => {
    const writes = new WriteLock(source)
    const failing = writes.transaction(async (manager) => {
      await manager.insert(Campaign, campaign('lost'))
      await pause()
      throw new Error('on purpose')
    })
    const kept = writes.transaction((manager) => manager.insert(Campaign, campaign('kept')))
    await expect(failing).rejects.toThrow('on purpose')
    await kept
    expect((await source.manager.find(Campaign)).map(({ id }) => id)).toEqual(['kept'])
  })

  it('goes on after a failure', async () => {
    const writes = new WriteLock(source)
    await expect(writes.transaction(() => Promise.reject(new Error('on purpose')))).rejects.toThrow(
      'on purpose',
    )
    await expect(writes.transaction(async () => 'fine')).resolves.toBe('fine')
  })

  it('refuses a transaction inside a transaction instead of waiting for itself for ever', async () => {
    const writes = new WriteLock(source)
    const nested = writes.transaction(() => writes.transaction(async () => undefined))
    await expect(nested).rejects.toThrow(/inside another/)
  })
})
