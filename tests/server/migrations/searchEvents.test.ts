import { afterEach, beforeEach, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { SearchEvents1796300200000 as Migration } from '../../../server/migrations/1796300200000-searchEvents.ts'
import { schemaBefore } from '../support/schemaBefore.ts'

let source: DataSource

/** The schema just before the migration, with searches in every state of an ended one and a running one. */
beforeEach(async () => {
  source = await schemaBefore(Migration)
  await source.query(
    `INSERT INTO account ("id", email, name, createdAt) VALUES ('a', 'a@b.example', 'Ada', '2026-01-01')`,
  )
  await source.query(`INSERT INTO campaign VALUES ('c', 'C', '', '2026-01-01')`)
  await source.query(`INSERT INTO target VALUES ('t', 'c', 'T', '2026-01-01')`)
  await source.query(`INSERT INTO target_version VALUES ('v', 't', 1, 'score 1', 'hash', 'a', '2026-01-01')`)
  for (const [id, state, finishedAt, failure] of [
    ['ended', 'finished', '2026-01-03', null],
    ['broken', 'failed', '2026-01-04', 'Too many classes.'],
    ['going', 'running', null, null],
  ])
    await source.query(
      `INSERT INTO search ("id", campaignId, targetVersionId, name, method, scope, polytopeKeys, scopeHash, budget,
         seed, islands, keep, scoringHash, engineVersion, state, failureMessage, progress, evaluations,
         workMilliseconds, authorId, createdAt, finishedAt)
       VALUES (?, 'c', 'v', 'S', 'annealing', '{}', '[]', '', 10, 1, 1, 1, 'hash', '1', ?, ?, '{}', 7, 0, 'a',
         '2026-01-02', ?)`,
      [id, state, failure, finishedAt],
    )
})
afterEach(() => source.destroy())

it('begins the log of older searches with what is known, refuses changes, and can be undone', async () => {
  const runner = source.createQueryRunner()
  const migration = new Migration()
  await migration.up(runner)
  const log = (searchId: string): Promise<unknown[]> =>
    source.query('SELECT kind, at, accountId, note FROM search_event WHERE searchId = ? ORDER BY id', [
      searchId,
    ])
  const queued = { kind: 'queued', at: '2026-01-02', accountId: 'a', note: null }
  expect(await log('going')).toEqual([queued])
  expect(await log('ended')).toEqual([
    queued,
    { kind: 'finished', at: '2026-01-03', accountId: null, note: null },
  ])
  expect(await log('broken')).toEqual([
    queued,
    { kind: 'failed', at: '2026-01-04', accountId: null, note: 'Too many classes.' },
  ])
  await expect(source.query(`UPDATE search_event SET kind = 'paused'`)).rejects.toThrow(/never changed/)
  await source.query(`DELETE FROM search WHERE "id" = 'ended'`)
  expect(await log('ended')).toEqual([])
  await migration.down(runner)
  expect(await source.query('SELECT "id" FROM search ORDER BY "id"')).toEqual([
    { id: 'broken' },
    { id: 'going' },
  ])
  await migration.up(runner)
  expect(await log('going')).toEqual([queued])
})
