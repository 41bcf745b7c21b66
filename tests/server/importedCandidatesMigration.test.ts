import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { ImportedCandidates1796200300000 as Migration } from '../../server/migrations/1796200300000-importedCandidates.ts'
import { schemaBefore } from './support/schemaBefore.ts'

let source: DataSource

/** The schema just before the migration, with a shortlist of a search in it. */
beforeEach(async () => {
  source = await schemaBefore(Migration)
  const now = '2026-01-01T00:00:00.000Z'
  const rows: [table: string, values: Record<string, unknown>][] = [
    ['account', { id: 'a', email: 'a@tests.example', name: 'A', createdAt: now }],
    ['campaign', { id: 'c', name: 'C', description: '', createdAt: now }],
    [
      'polytope',
      {
        ...{ key: 'p', name: 'P', origin: 'bundled', h11: 1, h21: 101, points: 5, vertices: 5, facets: 5 },
        ...{ latticePoints: 6, dualLatticePoints: 126, favourable: 1, symmetryOrder: 120, coordinates: '[]' },
      },
    ],
    ['candidate', { key: 'k', polytopeKey: 'p', heights: '[0,0,0,0,0]' }],
    ['target', { id: 't', campaignId: 'c', name: 'T', createdAt: now }],
    [
      'target_version',
      { id: 'v', targetId: 't', number: 1, text: 'score 1', scoringHash: 'h', authorId: 'a', createdAt: now },
    ],
    [
      'search',
      {
        ...{ id: 's', campaignId: 'c', targetVersionId: 'v', name: 'S', method: 'random', scope: '{}' },
        ...{ polytopeKeys: '[]', scopeHash: 'x', budget: 1, seed: 1, islands: 1, keep: 1, scoringHash: 'h' },
        ...{ engineVersion: '1', state: 'finished', progress: '{}', evaluations: 1, workMilliseconds: 1 },
        ...{ authorId: 'a', createdAt: now },
      },
    ],
    ['shortlist', shortlist('l', '["s"]', now)],
    [
      'shortlist_entry',
      { shortlistId: 'l', rank: 1, candidateKey: 'k', searchId: 's', outcome: '{"kind":1}' },
    ],
  ]
  for (const [table, values] of rows) await insert(table, values)
})
afterEach(() => source.destroy())

const shortlist = (id: string, searchIds: string, createdAt: string) => ({
  ...{ id, campaignId: 'c', targetVersionId: 'v', name: 'L', searchIds, columns: '[]', scoringHash: 'h' },
  ...{ engineVersion: '1', authorId: 'a', createdAt },
})

const insert = (table: string, values: Record<string, unknown>) =>
  source.query(
    `INSERT INTO "${table}" (${Object.keys(values)
      .map((name) => `"${name}"`)
      .join(', ')}) VALUES (${Object.keys(values)
      .map(() => '?')
      .join(', ')})`,
    Object.values(values),
  )

const entries = () => source.query('SELECT * FROM shortlist_entry ORDER BY shortlistId')
const imported = { shortlistId: 'm', rank: 1, candidateKey: 'k', searchId: null, outcome: '{}' }

describe('the migration to imported candidates', () => {
  it('keeps the places of shortlists that are there, and takes places without a search', async () => {
    const before = await entries()
    await insert('shortlist', shortlist('m', '[]', 'now'))
    await expect(insert('shortlist_entry', imported)).rejects.toThrow(/NOT NULL/)
    await new Migration().up(source.createQueryRunner())
    expect(await entries()).toEqual(before)
    await insert('shortlist_entry', imported)
    const record = { candidateKey: 'k', name: 'n', source: 's', line: 1, authorId: 'a', createdAt: 'now' }
    await insert('imported_candidate', { campaignId: 'c', ...record })
    await expect(insert('imported_candidate', { campaignId: 'none', ...record })).rejects.toThrow(/FOREIGN/)
  })

  it('can be undone: places without a search go, the others stay', async () => {
    const before = await entries()
    await new Migration().up(source.createQueryRunner())
    await insert('shortlist', shortlist('m', '[]', 'now'))
    await insert('shortlist_entry', imported)
    await new Migration().down(source.createQueryRunner())
    expect(await entries()).toEqual(before)
    expect(await source.query('SELECT id FROM shortlist')).toEqual([{ id: 'l' }])
    await expect(insert('shortlist_entry', { ...imported, shortlistId: 'l', rank: 2 })).rejects.toThrow(
      /NOT NULL/,
    )
    // A search that goes takes its places with it, as before.
    await source.query(`DELETE FROM search WHERE id = 's'`)
    expect(await entries()).toEqual([])
  })
})
