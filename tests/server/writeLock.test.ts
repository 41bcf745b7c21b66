import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { DataSource, EntityManager } from 'typeorm'
import { afterEach, beforeEach, expect, it } from 'vitest'
import { openDataSource } from '../../server/data-source.ts'
import { WriteLock } from '../../server/writeLock.ts'

let folder: string
let source: DataSource
let other: DataSource
let writes: WriteLock

beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tessellary-writes-'))
  source = await openDataSource(join(folder, 'x.sqlite'))
  other = await openDataSource(join(folder, 'x.sqlite'))
  await source.query('CREATE TABLE parent (id INTEGER PRIMARY KEY)')
  await source.query(
    'CREATE TABLE child (parentId INTEGER REFERENCES parent (id) DEFERRABLE INITIALLY DEFERRED)',
  )
  writes = new WriteLock(source)
})
afterEach(async () => {
  await source.destroy()
  await other.destroy()
  rmSync(folder, { recursive: true, force: true })
})

/** What a full disk can do to a transaction: SQLite ends it while it works. */
const endedBySqlite = async (manager: EntityManager) => {
  await manager.query('INSERT INTO parent VALUES (1)')
  await manager.query('ROLLBACK')
  throw new Error('the disk is full')
}
/** The other: its commit fails. */
const notCommitted = (manager: EntityManager) => manager.query('INSERT INTO child VALUES (99)')

it('commits what comes after failures so that another connection sees it', async () => {
  for (const failing of [endedBySqlite, notCommitted, endedBySqlite, endedBySqlite, notCommitted]) {
    await expect(writes.transaction(failing)).rejects.toThrow()
  }
  await writes.transaction((manager) => manager.query('INSERT INTO parent VALUES (7)'))
  expect(await other.query('SELECT id FROM parent')).toEqual([{ id: 7 }])
  expect(await other.query('SELECT * FROM child')).toEqual([])
})
