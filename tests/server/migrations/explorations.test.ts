import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { DataSource } from 'typeorm'
import { SampledEvaluations1796300400000 as Sampled } from '../../../server/migrations/1796300400000-sampledEvaluations.ts'
import { Explorations1796300400001 as Explored } from '../../../server/migrations/1796300400001-explorations.ts'
import { schemaBefore } from '../support/schemaBefore.ts'

let source: DataSource

const insert = (table: string, values: Record<string, unknown>) =>
  source.query(
    `INSERT INTO "${table}" (${Object.keys(values)
      .map((name) => `"${name}"`)
      .join(', ')}) VALUES (${Object.keys(values)
      .map(() => '?')
      .join(', ')})`,
    Object.values(values),
  )

/** The schema just before the two migrations, with a search in it that ran under the older one. */
beforeEach(async () => {
  source = await schemaBefore(Sampled)
  const now = '2026-01-01T00:00:00.000Z'
  const rule = { number: 1, text: 'score 1', scoringHash: 'h', authorId: 'a', createdAt: now }
  await insert('account', { id: 'a', email: 'a@tests.example', name: 'A', createdAt: now })
  await insert('campaign', { id: 'c', name: 'C', description: '', createdAt: now })
  await insert('target', { id: 't', campaignId: 'c', name: 'T', createdAt: now })
  await insert('target_version', { id: 'v', targetId: 't', ...rule })
  await insert('search', {
    ...{ id: 's', campaignId: 'c', targetVersionId: 'v', name: 'S', method: 'random', scope: '{}' },
    ...{ polytopeKeys: '[]', scopeHash: 'x', budget: 1, seed: 1, islands: 1, keep: 1, scoringHash: 'h' },
    ...{ engineVersion: '1', state: 'finished', progress: '{}', evaluations: 1, workMilliseconds: 1 },
    ...{ authorId: 'a', createdAt: now },
  })
})
afterEach(() => source.destroy())

const candidate = { candidateKey: 'k', polytopeKey: 'p', heights: 'iAAAAAA==' }

describe('the migrations to explorations', () => {
  it('keep what is there; samples and columns go with the search they are of', async () => {
    const before = await source.query('SELECT * FROM search')
    const runner = source.createQueryRunner()
    await new Sampled().up(runner)
    await new Explored().up(runner)
    expect(await source.query('SELECT * FROM search')).toEqual(before)
    await insert('search_sample', { searchId: 's', island: 0, place: 0, ...candidate, kind: 7, value: 1.5 })
    const sample = { address: 'search:s:1', searchId: 's', drawn: 1, ended: 1, usedAt: 1 }
    await insert('explored_sample', { id: 'e', ...sample })
    await expect(insert('explored_sample', { id: 'f', ...sample })).rejects.toThrow(/UNIQUE/)
    await insert('explored_candidate', { sampleId: 'e', place: 0, ...candidate })
    await insert('explored_column', { id: 'o', sampleId: 'e', expressionHash: 'h', evaluated: 1 })
    await insert('explored_cells', { columnId: 'o', first: 0, cells: '[1]' })
    await source.query(`DELETE FROM search WHERE id = 's'`)
    for (const table of ['search_sample', 'explored_candidate', 'explored_cells'])
      expect(await source.query(`SELECT * FROM ${table}`)).toEqual([])
  })

  it('can be undone: only what can be computed again goes', async () => {
    const before = await source.query('SELECT * FROM search')
    const runner = source.createQueryRunner()
    await new Sampled().up(runner)
    await new Explored().up(runner)
    await insert('search_sample', { searchId: 's', island: 0, place: 0, ...candidate, kind: 7, value: 1.5 })
    await new Explored().down(runner)
    await new Sampled().down(runner)
    expect(await source.query('SELECT * FROM search')).toEqual(before)
    await expect(source.query('SELECT * FROM search_sample')).rejects.toThrow(/no such table/)
  })
})
