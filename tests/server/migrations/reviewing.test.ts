import { afterEach, beforeEach, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { SecondReader1796400000000 } from '../../../server/migrations/1796400000000-secondReader.ts'
import { Reviewing1796400000001 } from '../../../server/migrations/1796400000001-reviewing.ts'
import { Reissues1796400000002 } from '../../../server/migrations/1796400000002-reissues.ts'
import { schemaBefore } from '../support/schemaBefore.ts'

let source: DataSource

/** The schema just before, with a list of one place and a verdict on it. */
beforeEach(async () => {
  source = await schemaBefore(SecondReader1796400000000)
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
    `INSERT INTO verdict (campaignId, candidateKey, targetVersionId, value, reason, override, authorId, createdAt)
     VALUES ('c', 'k', 'v', 'verified', 'by hand', 1, 'a', '')`,
  ]) {
    await source.query(statement)
  }
})
afterEach(() => source.destroy())

it('keeps old verdicts and lists, and can be undone with newer ones in place', async () => {
  const runner = source.createQueryRunner()
  const steps = [new SecondReader1796400000000(), new Reviewing1796400000001(), new Reissues1796400000002()]
  const verdicts = await source.query<{ id: number }[]>('SELECT * FROM verdict')
  const lists = await source.query('SELECT * FROM shortlist')
  for (const step of steps) await step.up(runner)
  expect(await source.query('SELECT secondReader FROM campaign')).toEqual([{ secondReader: 0 }])
  expect(await source.query('SELECT readers, undoesId, restoresId FROM verdict')).toEqual([
    { readers: null, undoesId: null, restoresId: null },
  ])
  expect(await source.query('SELECT reissueOfId, issue FROM shortlist')).toEqual([
    { reissueOfId: null, issue: 1 },
  ])
  for (const statement of [
    `UPDATE campaign SET secondReader = 1`,
    `INSERT INTO verdict (campaignId, candidateKey, targetVersionId, value, reason, override, authorId, createdAt,
       readers, undoesId, restoresId) VALUES ('c', 'k', 'v', 'undecided', '', 0, 'a', '', NULL, 1, NULL)`,
    `INSERT INTO assignment (targetId, candidateKey, campaignId, reviewerId, authorId, createdAt)
     VALUES ('t', 'k', 'c', 'a', 'a', '')`,
    `INSERT INTO shortlist_view (id, campaignId, shortlistId, name, address, authorId, createdAt)
     VALUES ('w', 'c', 'l', 'W', 'hits=yes', 'a', '')`,
    `UPDATE shortlist SET issue = 2, reissueOfId = 'l'`,
  ]) {
    await source.query(statement)
  }
  for (const step of [...steps].reverse()) await step.down(runner)
  expect((await source.query<{ id: number }[]>('SELECT * FROM verdict')).slice(0, 1)).toEqual(verdicts)
  expect(await source.query('SELECT COUNT(*) AS count FROM verdict')).toEqual([{ count: 2 }])
  expect(await source.query('SELECT * FROM shortlist')).toEqual(lists)
  for (const step of steps) await step.up(runner)
  await source.query('DELETE FROM campaign')
})
