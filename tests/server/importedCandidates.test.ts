import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { evaluateInput } from '../../scoring/index.ts'
import type { CandidateRecord } from '../../shared/candidates.ts'
import type { CandidateImportReport } from '../../shared/importedCandidates.ts'
import type { ImportReport } from '../../shared/polytopes.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
/** Another team's server, which takes twelve candidates at a time. */
let elsewhere: TestServer
let outsider: Agent
let lead: Agent
let investigator: Agent
let reviewer: Agent
let stranger: Agent

beforeAll(async () => {
  server = await openTestServer()
  elsewhere = await openTestServer({ environment: { IMPORT_LIMIT: '12' } })
  outsider = await elsewhere.signIn('lead')
  lead = await server.signIn('lead')
  investigator = await server.signIn('investigator')
  reviewer = await server.signIn('reviewer')
  stranger = await server.signIn('stranger')
  await loadEntries(
    server,
    bundledEntries('small', (id) => id.startsWith('r1-')),
  )
})
afterAll(async () => {
  await server.close()
  await elsewhere.close()
})

const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`
const importText = async (text: string, options: object = {}): Promise<CandidateImportReport> => {
  const { body } = await investigator
    .post(path('/imported-candidates'))
    .send({ text, ...options })
    .expect(201)
  return body as CandidateImportReport
}

const quintic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -1'
/** Weights (1,1,2,2,2), h = (2, 86): one class (Candelas, de la Ossa, Font, Katz, Morrison 1993). */
const octic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-2 -2 -2 -1\n-1 -1 -1 0'

/** A polytope with several classes; heights of two of them, from the headless evaluation. */
const input = { weights: [3, 3, 4, 5, 7], side: 'newton' } as const
const evaluations = [1, 2].map((seed) => evaluateInput({ ...input, heights: { seed, noise: 0.4 }, show: [] }))

describe('imported candidates', () => {
  it('are stored under their permanent address, and only for the campaign', async () => {
    const report = await importText(`candidate the quintic\nvertices\n${quintic}\nheights 0 0 0 0 0`, {
      source: 'notes of today',
    })
    expect(report).toMatchObject({ format: 'text in sections', question: null, problems: [], skipped: [] })
    const evaluated = evaluateInput({ weights: [1, 1, 1, 1, 1], side: 'fan', show: [] })
    expect(report.imported).toEqual([
      expect.objectContaining({
        key: evaluated.classKey,
        name: 'the quintic',
        line: 1,
        h11: 1,
        h21: 101,
        polytopeKnown: true,
        known: null,
        verdicts: [],
      }),
    ])
    const { body } = await reviewer.get(path('/imported-candidates')).expect(200)
    expect(body).toMatchObject({
      total: 1,
      rows: [
        { key: evaluated.classKey, name: 'the quintic', source: 'notes of today', author: 'Investigator' },
      ],
    })
    await reviewer.get(`/api/candidates/${evaluated.classKey}`).expect(200)
    const record = (await reviewer.get(path(`/candidates/${evaluated.classKey}`)).expect(200))
      .body as CandidateRecord
    expect(record.imported).toMatchObject({ source: 'notes of today', line: 1, author: 'Investigator' })
    expect(record.appearances).toEqual([])
  })

  it('bring their polytope with them, which strangers do not see', async () => {
    const { imported } = await importText(`${octic}\n\n3 1 4 1 5 0`, { name: 'octic' })
    expect(imported).toEqual([
      expect.objectContaining({ name: 'octic', h11: 2, h21: 86, polytopeKnown: false, known: null }),
    ])
    const [{ key, polytopeKey }] = imported
    await reviewer.get(`/api/polytopes/${polytopeKey}`).expect(200)
    await stranger.get(`/api/polytopes/${polytopeKey}`).expect(404)
    await stranger.get(`/api/candidates/${key}`).expect(404)
  })

  it('are recognised in other coordinates, with the point order changed', async () => {
    // The octic sheared by x2 += 3 x1, its points turned around.
    const sheared = '-1 -4 -1 0\n-2 -8 -2 -1\n0 0 0 1\n0 0 1 0\n0 1 0 0\n1 3 0 0'
    const { imported } = await importText(`${sheared}\n\n0 5 1 4 1 3`)
    expect(imported).toEqual([
      expect.objectContaining({ name: 'octic', known: 'imported', polytopeKnown: true, line: 1 }),
    ])
  })

  it('come from the output of an evaluation, and several classes of one polytope stay apart', async () => {
    const { imported, problems, format } = await importText(JSON.stringify(evaluations, null, 1))
    expect(problems).toEqual([])
    expect(format).toBe('tessellary.evaluation/1, JSON')
    expect(imported.map(({ key }) => key)).toEqual(evaluations.map(({ classKey }) => classKey))
    expect(new Set(imported.map(({ key }) => key)).size).toBe(2)
  })

  it('nothing is lost when some fail, and each failure has its line', async () => {
    const text = [quintic, '', '0 0 0 0 0 0', '', 'what is this', '', octic, '', '3 1 4 1 5 0'].join('\n')
    const { imported, problems, skipped } = await importText(text)
    expect(imported.map(({ name, known }) => [name, known])).toEqual([['octic', 'imported']])
    expect(problems.map(({ line, code }) => [line, code])).toEqual([[7, 'heights.wrong-count']])
    expect(skipped).toEqual([{ line: 9, text: 'what is this' }])
  })

  it('are asked about where a matrix can be read both ways; nothing is imported before', async () => {
    const lifted = `lifted points\n${quintic.replaceAll(/$/gm, ' 7')}`
    const before = (await reviewer.get(path('/imported-candidates'))).body.total as number
    const asked = await importText(lifted)
    expect(asked.imported).toEqual([])
    expect(asked.question).toEqual({
      kind: 'orientation',
      matrices: [{ line: 2, what: 'lifted points' }],
    })
    expect((await reviewer.get(path('/imported-candidates'))).body.total).toBe(before)
    const answered = await importText(lifted, { orientation: 'rows' })
    expect(answered.imported).toHaveLength(1)
    const wrongly = await importText(lifted, { orientation: 'columns' })
    expect(wrongly.problems).toHaveLength(1)
  })

  it('may name a polytope of the library by its key, or a known candidate by its own', async () => {
    const [{ key, polytopeKey }] = (await importText(`${octic}\n\n3 1 4 1 5 0`)).imported
    const byKey = await importText(JSON.stringify([{ polytope: polytopeKey, candidate: key }]))
    expect(byKey.imported).toEqual([expect.objectContaining({ key, known: 'imported' })])
    const table = await importText(`name,polytope,heights\nagain,${polytopeKey},3 1 4 1 5 0\n`)
    expect(table.imported).toEqual([expect.objectContaining({ key })])
    const unknown = await importText(JSON.stringify([{ polytope: key, heights: [1, 2] }]))
    expect(unknown.problems).toEqual([
      expect.objectContaining({ code: 'polytope.not-known', entry: '[0].polytope' }),
    ])
    const elsewhere = 'f'.repeat(32)
    const missing = await importText(JSON.stringify([{ polytope: polytopeKey, candidate: elsewhere }]))
    expect(missing.problems).toEqual([expect.objectContaining({ code: 'candidate.not-stored' })])
  })

  it('come from a file, which is named as the source', async () => {
    const { body } = await investigator
      .post(path('/imported-candidates/upload'))
      .field('name', 'from the file')
      .attach('file', Buffer.from(JSON.stringify({ ...input, heights: { seed: 5 } })), 'häufen.json')
      .expect(201)
    expect((body as CandidateImportReport).imported).toEqual([
      expect.objectContaining({ name: 'from the file', h11: 28 }),
    ])
    const { body: page } = await reviewer.get(path('/imported-candidates?text=häufen')).expect(200)
    expect(page.rows.map(({ source }: { source: string }) => source)).toEqual(['häufen.json'])
  }, 120_000)

  it('must be there, and not too many', async () => {
    const none = await investigator.post(path('/imported-candidates')).send({ text: ' \n' })
    expect([none.status, none.body.code]).toEqual([422, 'no-candidates'])
    const many = await outsider
      .post(`/api/campaigns/${elsewhere.campaignId}/imported-candidates`)
      .send({ text: `${quintic}\n\n${'0 0 0 0 0\n\n'.repeat(13)}` })
    expect([many.status, many.body.code, many.body.found]).toEqual([422, 'too-many-candidates', 13])
  })
})

describe('a shortlist of imported candidates', () => {
  let list: ShortlistDetail
  let versionId: string

  beforeAll(async () => {
    const { body } = await lead
      .post(path('/targets'))
      .send({ name: 'Volumes', text: 'score volume\nreport h11' })
      .expect(201)
    versionId = body.versions[0].id as string
    const made = await lead
      .post(path('/imported-candidates/shortlists'))
      .send({ name: 'From elsewhere', targetVersionId: versionId })
      .expect(201)
    list = made.body as ShortlistDetail
  }, 120_000)

  it('ranks them by the score that the engine computes', async () => {
    const evaluated = evaluateInput({ weights: [1, 1, 1, 1, 1], side: 'fan', rule: 'score volume' })
    const quinticRow = list.rows.find(({ candidateKey }) => candidateKey === evaluated.classKey)
    expect(quinticRow?.outcome).toMatchObject({ kind: 'feasible', score: evaluated.score?.value })
    const scores = list.rows.map(({ outcome }) => (outcome.kind === 'feasible' ? outcome.score : NaN))
    expect(scores).toEqual([...scores].sort((a, b) => b - a))
    expect(list).toMatchObject({ searches: [], columns: ['h11'] })
    expect(list.rows.every(({ searchId }) => searchId === null)).toBe(true)
    const { body } = await reviewer.get(path('/imported-candidates')).expect(200)
    expect(list.rows).toHaveLength(body.total as number)
  })

  it('takes the ones chosen, and refuses strangers', async () => {
    const { candidateKey } = list.rows[1]
    const some = await lead
      .post(path('/imported-candidates/shortlists'))
      .send({ name: 'One', targetVersionId: versionId, candidateKeys: [candidateKey] })
      .expect(201)
    expect((some.body as ShortlistDetail).rows.map((row) => row.candidateKey)).toEqual([candidateKey])
    const { status, body } = await lead
      .post(path('/imported-candidates/shortlists'))
      .send({ name: 'x', targetVersionId: versionId, candidateKeys: ['0'.repeat(32)] })
    expect([status, body.code]).toEqual([422, 'no-such-import'])
  })

  it('holds candidates one can decide on; a later import says what was decided', async () => {
    const [{ candidateKey }] = list.rows
    await reviewer
      .post(path(`/candidates/${candidateKey}/verdicts`))
      .send({ targetVersionId: versionId, value: 'rejected', reason: 'too large' })
      .expect(201)
    const record = (await reviewer.get(path(`/candidates/${candidateKey}`)).expect(200))
      .body as CandidateRecord
    expect(record.appearances[0]).toMatchObject({ search: null, rank: 1 })
    const { body: page } = await reviewer.get(path('/imported-candidates')).expect(200)
    const row = (page.rows as { key: string; verdicts: object[] }[]).find(({ key }) => key === candidateKey)
    expect(row?.verdicts).toEqual([expect.objectContaining({ value: 'rejected', targetName: 'Volumes' })])
    const again = await importText(JSON.stringify(evaluations[0]))
    const twice = await importText(
      JSON.stringify({ polytope: list.rows[0].polytopeKey, candidate: candidateKey }),
    )
    expect(twice.imported[0]).toMatchObject({ known: 'imported', verdicts: [{ value: 'rejected' }] })
    expect(again.imported[0].known).toBe('imported')
  })

  it('is not needed to learn a score and decide: a target version scores any candidate of the campaign', async () => {
    const [{ candidateKey, outcome }] = list.rows
    const query = `/candidates/${candidateKey}/score?version=${versionId}`
    const { body } = await reviewer.get(path(query)).expect(200)
    expect(body).toMatchObject({ targetName: 'Volumes', targetVersionId: versionId, outcome })
    await outsider.get(`/api/campaigns/${elsewhere.campaignId}${query}`).expect(404)
    await reviewer.get(path(`/candidates/${candidateKey}/score?version=none`)).expect(404)
  })

  it('is exported with all that another campaign needs to import it', async () => {
    const { text } = await reviewer.get(path(`/shortlists/${list.id}/export.json`)).expect(200)
    const { body } = await outsider
      .post(`/api/campaigns/${elsewhere.campaignId}/imported-candidates`)
      .send({ text })
      .expect(201)
    const { imported, problems, format } = body as CandidateImportReport
    expect([problems, format]).toEqual([[], 'tessellary.shortlist/2, JSON'])
    expect(imported.map(({ key }) => key)).toEqual(list.rows.map(({ candidateKey }) => candidateKey))
    expect(imported.every(({ known }) => known === null)).toBe(true)
  })

  it('survives that an import is taken off the list', async () => {
    const { candidateKey } = list.rows[0]
    await investigator.delete(path(`/imported-candidates/${candidateKey}`)).expect(204)
    await investigator.delete(path(`/imported-candidates/${candidateKey}`)).expect(404)
    await reviewer.get(path(`/candidates/${candidateKey}`)).expect(200)
    const { body } = await reviewer.get(path(`/shortlists/${list.id}`)).expect(200)
    expect((body as ShortlistDetail).rows[0].candidateKey).toBe(candidateKey)
    // Known to the campaign from its shortlist now.
    const again = await importText(
      JSON.stringify({ polytope: list.rows[0].polytopeKey, candidate: candidateKey }),
    )
    expect(again.imported[0].known).toBe('found')
  })
})

describe('weight systems, a line each', () => {
  it('become polytopes; each line is reported', async () => {
    const text = '1 1 1 1 2 # the sextic\n\n[1,1,1,6,9]\n1 1 1 1\n1 1 1 1 100\n1 1 2 2 2\n1 1 -2 2 2\n'
    const { body } = await investigator
      .post(path('/polytopes/weight-lines'))
      .send({ text, side: 'fan' })
      .expect(201)
    const { imported, problems } = body as ImportReport
    // Hodge numbers: Klemm, Theisen 1992; Candelas, Font, Katz, Morrison 1994; Candelas et al. 1993.
    expect(imported.map(({ line, name, h11, h21, known }) => [line, name, h11, h21, known])).toEqual([
      [1, expect.stringMatching(/^r1-/), 1, 103, true],
      [3, '1 1 1 6 9 fan', 2, 272, false],
      [6, expect.any(String), 2, 86, true],
    ])
    expect(problems.map(({ line, code }) => [line, code])).toEqual([
      [4, 'weights.wrong-count'],
      [5, expect.stringMatching(/^weights\./)],
      [7, 'weights.not-positive-integers'],
    ])
    const none = await investigator.post(path('/polytopes/weight-lines')).send({ text: '', side: 'fan' })
    expect([none.status, none.body.code]).toEqual([422, 'no-weights'])
  })
})
