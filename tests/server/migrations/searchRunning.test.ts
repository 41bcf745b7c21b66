import { afterEach, beforeEach, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { SearchRunning1796300100000 as Migration } from '../../../server/migrations/1796300100000-searchRunning.ts'
import { schemaBefore } from '../support/schemaBefore.ts'

let source: DataSource

/** The schema just before the migration, with a search in it. */
beforeEach(async () => {
  source = await schemaBefore(Migration)
  await source.query(
    `INSERT INTO account ("id", email, name, createdAt) VALUES ('a', 'a@b.example', 'Ada', '2026-01-01')`,
  )
  await source.query(`INSERT INTO campaign VALUES ('c', 'C', '', '2026-01-01')`)
  await source.query(`INSERT INTO target VALUES ('t', 'c', 'T', '2026-01-01')`)
  await source.query(`INSERT INTO target_version VALUES ('v', 't', 1, 'score 1', 'hash', 'a', '2026-01-01')`)
  await insert('old')
})
afterEach(() => source.destroy())

const insert = (id: string) =>
  source.query(
    `INSERT INTO search ("id", campaignId, targetVersionId, name, method, scope, polytopeKeys, scopeHash, budget,
       seed, islands, keep, scoringHash, engineVersion, state, progress, evaluations, workMilliseconds, authorId,
       createdAt)
     VALUES (?, 'c', 'v', 'S', 'annealing', '{}', '[]', '', 10, 1, 1, 1, 'hash', '1', 'finished', '{}', 7, 0, 'a',
       '2026-01-02')`,
    [id],
  )

it('leaves older searches as they were made, takes starts, and can be undone', async () => {
  const runner = source.createQueryRunner()
  const migration = new Migration()
  const before = await source.query('SELECT * FROM search')
  await migration.up(runner)
  expect(await source.query('SELECT settings, startsFrom, extensions, imported FROM search')).toEqual([
    { settings: '{}', startsFrom: null, extensions: '[]', imported: null },
  ])
  const start = `INSERT INTO search_start VALUES (?, 1, 'k', 'p', '[0]')`
  await source.query(start, ['old'])
  await expect(source.query(start, ['none'])).rejects.toThrow(/FOREIGN/)
  await insert('elsewhere')
  await source.query(`UPDATE search SET imported = '{}' WHERE "id" = 'elsewhere'`)
  await migration.down(runner)
  expect(await source.query('SELECT * FROM search')).toEqual(before)
  await migration.up(runner)
  expect(await source.query('SELECT * FROM search_start')).toEqual([])
})
