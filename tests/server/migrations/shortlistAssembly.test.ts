import { afterEach, beforeEach, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { ExternalTables1796300300001 } from '../../../server/migrations/1796300300001-externalTables.ts'
import { ShortlistAssembly1796300300000 } from '../../../server/migrations/1796300300000-shortlistAssembly.ts'
import { schemaBefore } from '../support/schemaBefore.ts'

let source: DataSource

/** The schema just before, with a list of one place in it. */
beforeEach(async () => {
  source = await schemaBefore(ShortlistAssembly1796300300000)
  for (const statement of [
    `INSERT INTO account (id, email, name, demo, createdAt) VALUES ('a', 'a@tests.example', 'A', 0, '')`,
    `INSERT INTO campaign (id, name, description, createdAt) VALUES ('c', 'C', '', '')`,
    `INSERT INTO target (id, campaignId, name, createdAt) VALUES ('t', 'c', 'T', '')`,
    `INSERT INTO target_version (id, targetId, number, text, scoringHash, authorId, createdAt)
     VALUES ('v', 't', 1, 'score 1', 'h', 'a', '')`,
    `INSERT INTO polytope ("key", name, origin, h11, h21, points, vertices, facets, latticePoints,
       dualLatticePoints, favourable, symmetryOrder, coordinates)
     VALUES ('p', 'P', 'bundled', 1, 101, 5, 5, 5, 6, 126, 1, 120, '[]')`,
    `INSERT INTO candidate ("key", polytopeKey, heights) VALUES ('k', 'p', '[0,0,0,0,0]')`,
    `INSERT INTO shortlist (id, campaignId, targetVersionId, name, searchIds, columns, scoringHash, engineVersion,
       authorId, createdAt) VALUES ('l', 'c', 'v', 'L', '[]', '[]', 'h', '1', 'a', '')`,
    `INSERT INTO shortlist_entry (shortlistId, rank, candidateKey, searchId, outcome)
     VALUES ('l', 1, 'k', NULL, '{"kind":"undefined","reason":"","stage":"cone"}')`,
  ]) {
    await source.query(statement)
  }
})
afterEach(() => source.destroy())

it('keeps old lists, without a provenance, and can be undone with newer ones in place', async () => {
  const runner = source.createQueryRunner()
  const [assembly, external] = [new ShortlistAssembly1796300300000(), new ExternalTables1796300300001()]
  const before = await source.query('SELECT * FROM shortlist_entry')
  await assembly.up(runner)
  await external.up(runner)
  expect(await source.query('SELECT id, provenance FROM shortlist')).toEqual([{ id: 'l', provenance: null }])
  expect(
    await source.query('SELECT rank, front, previousRank, previousOutcome FROM shortlist_entry'),
  ).toEqual([{ rank: 1, front: null, previousRank: null, previousOutcome: null }])
  await source.query(`UPDATE shortlist SET provenance = '{}'`)
  await source.query(`UPDATE shortlist_entry SET front = 2, previousRank = 3, previousOutcome = '{}'`)
  await source.query(
    `INSERT INTO rescoring (id, campaignId, targetVersionId, name, origin, assembly, entrants, total, finds, state,
       broken, authorId, createdAt) VALUES ('r', 'c', 'v', 'R', '{}', '{}', '[]', 0, 0, 'queued', 0, 'a', '')`,
  )
  await source.query(
    `INSERT INTO external_table (id, campaignId, shortlistId, name, columns, rowCount, authorId, createdAt)
     VALUES ('x', 'c', 'l', 'X', '[]', 1, 'a', '')`,
  )
  await source.query(`INSERT INTO external_row (tableId, candidateKey, "values") VALUES ('x', 'any', '[]')`)
  await external.down(runner)
  await assembly.down(runner)
  expect(await source.query('SELECT * FROM shortlist_entry')).toEqual(before)
  expect(await source.query('SELECT id FROM shortlist')).toEqual([{ id: 'l' }])
  await assembly.up(runner)
  await external.up(runner)
})

it('lets tables go with their list or campaign', async () => {
  const runner = source.createQueryRunner()
  await new ShortlistAssembly1796300300000().up(runner)
  await new ExternalTables1796300300001().up(runner)
  const table = (id: string, list: string) =>
    source.query(
      `INSERT INTO external_table (id, campaignId, shortlistId, name, columns, rowCount, authorId, createdAt)
       VALUES ('${id}', 'c', ${list}, 'X', '[]', 1, 'a', '')`,
    )
  await table('x', "'l'")
  await table('y', 'NULL')
  await source.query(`INSERT INTO external_row (tableId, candidateKey, "values") VALUES ('x', 'k', '[]')`)
  await source.query(`DELETE FROM shortlist`)
  expect(await source.query('SELECT id FROM external_table')).toEqual([{ id: 'y' }])
  expect(await source.query('SELECT * FROM external_row')).toEqual([])
})
