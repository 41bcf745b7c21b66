import { afterEach, beforeEach, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { CandidateInvariants1796200400000 as Migration } from '../../server/migrations/1796200400000-candidateInvariants.ts'
import { schemaBefore } from './support/schemaBefore.ts'

let source: DataSource

/** The schema just before the migration, with a candidate in it. */
beforeEach(async () => {
  source = await schemaBefore(Migration)
  await source.query(
    `INSERT INTO polytope ("key", name, origin, h11, h21, points, vertices, facets, latticePoints,
       dualLatticePoints, favourable, symmetryOrder, coordinates)
     VALUES ('p', 'P', 'bundled', 1, 101, 5, 5, 5, 6, 126, 1, 120, '[]')`,
  )
  await source.query(`INSERT INTO candidate ("key", polytopeKey, heights) VALUES ('k', 'p', '[0,0,0,0,0]')`)
})
afterEach(() => source.destroy())

it('keeps candidates, adds an empty table that goes with them, and can be undone', async () => {
  const runner = source.createQueryRunner()
  const migration = new Migration()
  await migration.up(runner)
  expect(await source.query('SELECT * FROM candidate_invariants')).toEqual([])
  await source.query(
    `INSERT INTO candidate_invariants (candidateKey, wallKey, version, h11, h21, invariants)
     VALUES ('k', 'w', 1, 1, 101, '{}')`,
  )
  await expect(
    source.query(
      `INSERT INTO candidate_invariants (candidateKey, wallKey, version, h11, h21, invariants)
       VALUES ('none', 'w', 1, 1, 101, '{}')`,
    ),
  ).rejects.toThrow(/FOREIGN KEY/)
  await migration.down(runner)
  expect(await source.query('SELECT "key" FROM candidate')).toEqual([{ key: 'k' }])
  await migration.up(runner)
  await source.query(`INSERT INTO candidate_invariants VALUES ('k', 'w', 1, 1, 101, '{}')`)
  await source.query('DELETE FROM candidate')
  expect(await source.query('SELECT * FROM candidate_invariants')).toEqual([])
})
