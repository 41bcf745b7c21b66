import { afterEach, beforeEach, expect, it } from 'vitest'
import { DataSource } from 'typeorm'
import { FirstSchema1796100000000 } from '../../../server/migrations/1796100000000-firstSchema.ts'
import { ExactClassCounts1796200200001 } from '../../../server/migrations/1796200200001-exactClassCounts.ts'
import { RigidAndFibres1796200200002 } from '../../../server/migrations/1796200200002-rigidAndFibres.ts'
import { LibraryNumbers1796200200000 } from '../../../server/migrations/1796200200000-libraryNumbers.ts'

let source: DataSource
beforeEach(async () => {
  source = new DataSource({ type: 'better-sqlite3', database: ':memory:' })
  await source.initialize()
  await source.query('PRAGMA foreign_keys = ON')
})
afterEach(() => source.destroy())

const old = {
  key: '0123456789abcdef0123456789abcdef',
  name: 'quintic',
  origin: 'bundled',
  h11: 1,
  h21: 101,
  points: 5,
  vertices: 5,
  facets: 5,
  latticePoints: 6,
  dualLatticePoints: 126,
  favourable: 1,
  symmetryOrder: 120,
  weights: '[1,1,1,1,1]',
  side: 'fan',
  coordinates: '[[1,0,0,0],[0,1,0,0],[0,0,1,0],[0,0,0,1],[-1,-1,-1,-1]]',
}

it('keeps the polytopes and candidates of before, undescribed, and can be undone', async () => {
  const runner = source.createQueryRunner()
  await new FirstSchema1796100000000().up(runner)
  const names = Object.keys(old)
  await runner.query(
    `INSERT INTO polytope (${names.join(', ')}) VALUES (${names.map(() => '?').join(', ')})`,
    Object.values(old),
  )
  await runner.query(`INSERT INTO candidate (key, polytopeKey, heights) VALUES ('c', '${old.key}', '[1]')`)

  const migration = new LibraryNumbers1796200200000()
  await migration.up(runner)
  const [row] = await source.query<Record<string, unknown>[]>('SELECT * FROM polytope')
  expect(row).toMatchObject(old)
  expect(row).toMatchObject({ edges: null, planarSections: null, summaryVersion: null, classes: null })
  await source.query('UPDATE polytope SET edges = 10, summaryVersion = 1')
  expect(await source.query('SELECT * FROM collection')).toEqual([])

  const digits = new ExactClassCounts1796200200001()
  await source.query('UPDATE polytope SET classes = 12')
  await digits.up(runner)
  expect(await source.query('SELECT classes, classDigits FROM polytope')).toEqual([
    { classes: 12, classDigits: '12' },
  ])
  const rigid = new RigidAndFibres1796200200002()
  await rigid.up(runner)
  expect(await source.query('SELECT rigidRank, fibreTypes FROM polytope')).toEqual([
    { rigidRank: null, fibreTypes: null },
  ])
  await rigid.down(runner)
  await digits.down(runner)

  await migration.down(runner)
  expect(await source.query('SELECT * FROM polytope')).toEqual([old])
  expect(await source.query('SELECT key FROM candidate')).toEqual([{ key: 'c' }])
  await expect(source.query('SELECT * FROM collection')).rejects.toThrow(/no such table/)
  // And once more upwards: nothing was left behind.
  await migration.up(runner)
  await runner.release()
})
