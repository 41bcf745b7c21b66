import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { caution } from '../../shared/caution.ts'
import type { Exploration, ExplorationRows } from '../../shared/explorations.ts'
import type { Agent } from './support/testServer.ts'
import { huntScope, openSmallHunt, type SmallHunt } from './support/smallHunt.ts'

let hunt: SmallHunt
/** The account whose event stream is open. */
let reader: Agent
beforeAll(async () => {
  hunt = await openSmallHunt()
  reader = await hunt.server.signIn('reader')
})
afterAll(() => hunt.close())

const path = (rest = '') => hunt.path(`/explorations${rest}`)
const columns = ['log10(metric.divisor.top)', 'k3 = count(d in divisors : d.k3)', 'log10(h11 - 9)']
const nullOf = (size: number) => ({ kind: 'null', scope: huntScope, size })

async function start(agent: Agent, body: object): Promise<Exploration> {
  const answer = await agent.post(path()).send(body).expect(202)
  return answer.body as Exploration
}

/** The exploration at its end, as the reader's stream tells it. */
async function ended(body: object): Promise<Exploration> {
  const first = await start(reader, body)
  // What is cached altogether is in the first answer, and no event follows.
  if (first.state !== 'running') return first
  const { id } = first
  const event = await hunt.stream.event(
    (one) => one.kind === 'exploration' && one.exploration.id === id && one.exploration.state !== 'running',
  )
  if (event.kind !== 'exploration') throw new Error('not an exploration')
  return event.exploration
}

const rowsOf = async (id: string, from = 0): Promise<ExplorationRows> =>
  (await reader.get(path(`/${id}/rows?from=${from}`)).expect(200)).body as ExplorationRows

describe('an exploration of a null sample', { timeout: 180_000 }, () => {
  it('evaluates columns on candidates nobody selected, with reasons for what is undefined', async () => {
    const done = await ended({ source: nullOf(40), columns })
    expect(done).toMatchObject({ state: 'done', size: 40, evaluated: 40, polytopes: 3, search: null })
    expect(done.columns).toEqual([
      expect.objectContaining({ name: 'log10(metric.divisor.top)', type: 'number', stage: 'metric' }),
      expect.objectContaining({ name: 'k3', type: 'integer', expression: 'count(d in divisors : d.k3)' }),
      expect.objectContaining({ name: 'log10(h11 - 9)', unit: null }),
    ])
    const { rows, polytopes } = await rowsOf(done.id)
    expect(rows).toHaveLength(40)
    expect(new Set(rows.map(({ candidateKey }) => candidateKey)).size).toBe(40)
    expect(polytopes.map(({ h11 }) => h11).sort()).toEqual([10, 20, 9].sort())
    for (const { polytope, cells } of rows) {
      expect(cells[0]).toEqual(expect.any(Number))
      const { h11 } = polytopes[polytope]
      if (h11 === 9)
        expect(cells[2]).toEqual({
          undefined: expect.stringMatching(/^log10 needs a positive number \(column 1\)$/),
        })
      else expect(cells[2]).toBeCloseTo(Math.log10(h11 - 9), 12)
    }
    const rest = await rowsOf(done.id, 30)
    const values = (list: typeof rows) => list.map(({ candidateKey, cells }) => [candidateKey, cells])
    expect(values(rest.rows)).toEqual(values(rows.slice(30)))
  })

  it('agrees to the bit with what a rule says of the same sample', async () => {
    const done = await ended({ source: nullOf(40), columns: columns.slice(0, 1) })
    const { rows } = await rowsOf(done.id)
    const text = `score ${columns[0]}`
    const preview = await reader.post(hunt.path('/previews')).send({ text, scope: huntScope, size: 40 })
    const event = await hunt.stream.event(
      (one) => one.kind === 'preview' && one.preview.id === preview.body.id && one.preview.state === 'done',
    )
    if (event.kind !== 'preview') throw new Error('not a preview')
    const [best] = event.preview.best
    const values = rows.map(({ cells }) => cells[0])
    const same = rows.find(({ candidateKey }) => candidateKey === best.candidateKey)
    expect(best.outcome).toMatchObject({ kind: 'feasible', score: same?.cells[0] })
    expect(Math.max(...values.map(Number))).toBe(same?.cells[0])
  })

  it('finds what was computed before, whoever asked for it', async () => {
    await ended({ source: nullOf(40), columns })
    // All of it is cached: the first answer is complete, of fewer rows and other columns among them, too.
    const again = await start(hunt.lead, {
      source: nullOf(25),
      columns: ['renamed = count(d in divisors:d.k3)'],
    })
    expect(again).toMatchObject({ state: 'done', evaluated: 25, size: 25 })
    const larger = await ended({ source: nullOf(50), columns: ['count(d in divisors : d.k3)', 'h21'] })
    const before = await ended({ source: nullOf(40), columns: ['count(d in divisors : d.k3)'] })
    const [more, first] = [await rowsOf(larger.id), await rowsOf(before.id)]
    expect(more.rows).toHaveLength(50)
    expect(more.rows.slice(0, 40).map(({ candidateKey, cells }) => [candidateKey, cells[0]])).toEqual(
      first.rows.map(({ candidateKey, cells }) => [candidateKey, cells[0]]),
    )
  })

  it('takes quantities at the place that is asked for', async () => {
    const at = { kind: 'volume', value: 100 }
    const done = await ended({ source: nullOf(20), at, columns: ['volume'] })
    for (const { cells } of (await rowsOf(done.id)).rows) expect(cells[0]).toBeCloseTo(100, 9)
  })

  it('says when the scope holds fewer candidates than were asked for', async () => {
    const scope = { kind: 'filter', filter: { h11Min: 10, h11Max: 10 } }
    const done = await ended({ source: { kind: 'null', scope, size: 300 }, columns: ['h11'] })
    expect(done).toMatchObject({ state: 'done', evaluated: done.size })
    expect(done.size).toBeLessThan(300)
  })

  it('is stopped on request, and goes on from there when it is asked for again', async () => {
    const body = { source: nullOf(200), columns: ['metric.divisor.top'] }
    const { id } = await start(reader, body)
    await reader.delete(path(`/${id}`)).expect(204)
    const { body: stopped } = await reader.get(path(`/${id}`)).expect(200)
    expect(['stopped', 'done']).toContain(stopped.state)
    expect(await ended(body)).toMatchObject({ state: 'done', evaluated: 200 })
  })

  it('opens the pages of its candidates, and of no others', async () => {
    const done = await ended({ source: nullOf(20), columns: ['h11'] })
    const [first] = (await rowsOf(done.id)).rows
    const keys = [first.candidateKey]
    const page = `/api/candidates/${first.candidateKey}`
    await reader
      .post(path(`/${done.id}/candidates`))
      .send({ keys })
      .expect(204)
    await reader
      .post(path(`/${done.id}/candidates`))
      .send({ keys })
      .expect(204)
    const { body } = await reader.get(page).expect(200)
    expect(body.key).toBe(first.candidateKey)
    const other = await reader.post(path(`/${done.id}/candidates`)).send({ keys: ['0'.repeat(32)] })
    expect(other).toMatchObject({ status: 422, body: { code: 'not-in-sample', path: 'keys' } })
  })

  it('is its account’s own', async () => {
    const { id } = await start(reader, { source: nullOf(20), columns: ['h11'] })
    for (const rest of ['', '/rows', '/export.csv', '/export.json'])
      await hunt.lead.get(path(`/${id}${rest}`)).expect(404)
    await hunt.lead.delete(path(`/${id}`)).expect(404)
  })

  it.each([
    [['h11', 'volum'], 'column-invalid', 'columns.1'],
    [['h11', 'h11'], 'column-twice', 'columns.1'],
    [['volume require favourable'], 'column-invalid', 'columns.0'],
  ])('refuses the columns %j (%s)', async (texts, code, place) => {
    const { status, body } = await reader.post(path()).send({ source: nullOf(20), columns: texts })
    expect({ status, code: body.code, path: body.path }).toEqual({ status: 422, code, path: place })
    if (code === 'column-invalid') expect(body.issues[0]).toMatchObject({ severity: 'error', line: 1 })
  })

  it('refuses sizes and numbers of columns beyond the limits, and scopes it does not know', async () => {
    const nine = Array.from({ length: 9 }, (_, n) => `h11 + ${n}`)
    for (const body of [
      { source: nullOf(2_001), columns: ['h11'] },
      { source: nullOf(20), columns: nine },
      { source: nullOf(20), columns: [] },
      { source: { kind: 'null', scope: { kind: 'polytopes', keys: ['0'.repeat(32)] } }, columns: ['h11'] },
    ])
      await reader.post(path()).send(body).expect(422)
  })
})

describe('tables', { timeout: 180_000 }, () => {
  it('carry caution, units, provenance and the chosen columns', async () => {
    const done = await ended({ source: nullOf(20), columns })
    const csv = await reader.get(path(`/${done.id}/export.csv`)).expect(200)
    expect(csv.headers['content-disposition']).toContain('null-sample.csv')
    const lines = csv.text.trimEnd().split('\r\n')
    const remarks = lines.filter((line) => line.startsWith('#'))
    expect(remarks).toContain(`# ${caution}`)
    expect(remarks.join('\n')).toMatch(
      /seed: 1[\s\S]*rows: 20[\s\S]*Column k3: count\(d in divisors : d\.k3\)/,
    )
    const [head, ...rows] = lines.filter((line) => !line.startsWith('#'))
    expect(head).toBe(`candidate,polytope,polytopeName,h11,h21,${columns[0]},k3,log10(h11 - 9)`)
    expect(rows).toHaveLength(20)
    const { body } = await reader.get(path(`/${done.id}/export.json`)).expect(200)
    expect(body).toMatchObject({ schema: 'tessellary.exploration/1', caution, provenance: { seed: 1 } })
    expect(body.rows.map(({ candidate }: { candidate: string }) => candidate)).toEqual(
      rows.map((row) => row.split(',')[0]),
    )
    const cell = body.rows[0].cells[0] as number
    expect(rows[0].split(',')[5]).toBe(String(cell))
    // Enough to build the candidate again, by another road.
    const [row] = body.rows
    const given = { polytope: row.polytope, heights: row.heights }
    const imported = await hunt.lead
      .post(hunt.path('/imported-candidates'))
      .send({ text: JSON.stringify(given), source: 'an exported table' })
    expect(JSON.stringify(imported.body)).toContain(row.candidate)
  })

  it('are made of the uniform sample of a search’s evaluations', async () => {
    const { id } = await hunt.start({ name: 'For the table' })
    const search = await hunt.finished(id)
    const done = await ended({
      source: { kind: 'search', search: id },
      columns: ['log10(metric.divisor.top)'],
    })
    expect(done).toMatchObject({
      state: 'done',
      size: 60,
      search: { id, islands: [{ rows: 30 }, { rows: 30 }] },
    })
    const { rows } = await rowsOf(done.id)
    expect(rows.filter(({ island }) => island === 1)).toHaveLength(30)
    // The rule of the hunt scores by this very column.
    for (const { score, cells } of rows) expect(score).toBe(cells[0])
    expect(Math.max(...rows.map(({ score }) => Number(score)))).toBe(search.best)
    const csv = await reader.get(path(`/${done.id}/export.csv`)).expect(200)
    expect(csv.headers['content-disposition']).toContain('evaluations-for-the-table.csv')
    expect(csv.text).toMatch(/islands: 1: 30 of 30 evaluations; 2: 30 of 30 evaluations/)
  })

  it('say what to do about a search that kept no heights', async () => {
    const { id } = await hunt.start()
    await hunt.finished(id)
    await hunt.server.context.source.query('DELETE FROM search_sample WHERE searchId = ?', [id])
    const { status, body } = await reader
      .post(path())
      .send({ source: { kind: 'search', search: id }, columns: ['h11'] })
    expect({ status, code: body.code }).toEqual({ status: 422, code: 'no-sample' })
    const none = await reader
      .post(path())
      .send({ source: { kind: 'search', search: 'none' }, columns: ['h11'] })
    expect(none.status).toBe(404)
  })
})
