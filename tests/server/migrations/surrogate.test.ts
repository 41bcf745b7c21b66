import { expect, it } from 'vitest'
import { Surrogate1796300600000 as Migration } from '../../../server/migrations/1796300600000-surrogate.ts'
import { schemaBefore } from '../support/schemaBefore.ts'

it('older searches go on without a surrogate, and the step can be undone', async () => {
  const source = await schemaBefore(Migration)
  const runner = source.createQueryRunner()
  await source.query('PRAGMA foreign_keys = OFF')
  await source.query(
    `INSERT INTO search ("id", campaignId, targetVersionId, name, method, scope, polytopeKeys, scopeHash, budget,
       seed, islands, keep, scoringHash, engineVersion, state, progress, evaluations, workMilliseconds, authorId,
       createdAt)
     VALUES ('old', 'c', 'v', 'S', 'annealing', '{}', '[]', '', 10, 1, 1, 1, 'hash', '1', 'running', '{}', 7, 0,
       'a', '2026-01-02')`,
  )
  const migration = new Migration()
  await migration.up(runner)
  expect(await source.query('SELECT "id", surrogate FROM search')).toEqual([{ id: 'old', surrogate: 0 }])
  await migration.down(runner)
  const [row] = await source.query<Record<string, unknown>[]>('SELECT * FROM search')
  expect(row).toMatchObject({ id: 'old', evaluations: 7 })
  expect(row).not.toHaveProperty('surrogate')
  await migration.up(runner)
  expect(await source.query('SELECT surrogate FROM search')).toEqual([{ surrogate: 0 }])
  await source.destroy()
})
